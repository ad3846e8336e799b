import { useDeferredValue } from 'react';

import { TextAreaField } from '@/components/fields/text-area-field';
import { Markdown } from '@/components/markdown/markdown';
import { ASSIGNED_LIMITS } from '@/contract/assigned-sweeps';

import { SetSection } from './set-section';
import type { SetPart } from './set-view';

/** The brief as it is written, and as it will be read. */
export function BriefSection({ view, onChange }: SetPart) {
  const shown = useDeferredValue(view.brief);
  return (
    <SetSection
      title="Brief"
      note="Markdown, with mathematics between dollars: $\lambda = \alpha \pm i\omega$."
    >
      <div className="grid gap-4 lg:grid-cols-2">
        <TextAreaField
          label="Brief"
          visibleLabel={false}
          rows={14}
          maxLength={ASSIGNED_LIMITS.briefLength}
          placeholder="What is to be done, and why it matters."
          inputClassName="figures text-sm"
          value={view.brief}
          onChange={(brief) => onChange({ brief })}
        />
        <div
          role="region"
          aria-label="Preview of the brief"
          tabIndex={0}
          className="max-h-96 min-h-24 overflow-y-auto rounded-md border border-dashed p-3"
        >
          {shown.trim() ? (
            <Markdown text={shown} />
          ) : (
            <p className="text-muted">The brief appears here as it will be read.</p>
          )}
        </div>
      </div>
    </SetSection>
  );
}
