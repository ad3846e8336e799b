import { ChevronRight } from 'lucide-react';
import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

import { useRailState, type RailSectionName } from './rail-state';

interface RailSectionProps {
  readonly name: RailSectionName;
  readonly title: string;
  /** A few quiet words at the right of the heading. */
  readonly aside?: ReactNode;
  readonly actions?: ReactNode;
  readonly children: ReactNode;
}

export function RailSection({ name, title, aside, actions, children }: RailSectionProps) {
  const open = useRailState((state) => !state.closed.has(name));
  const toggle = useRailState((state) => state.toggle);
  const id = `rail-${name}`;
  return (
    <section aria-labelledby={`${id}-title`} className="border-b border-hairline px-4 py-3 last:border-b-0">
      <div className="flex min-h-8 items-center gap-2">
        <h2 id={`${id}-title`} className="shrink-0 text-lg">
          <button
            type="button"
            aria-expanded={open}
            aria-controls={id}
            className="flex items-center gap-1 rounded"
            onClick={() => toggle(name, !open)}
          >
            <ChevronRight
              size={15}
              aria-hidden
              className={joinClasses('-ml-1 text-muted transition-transform', open && 'rotate-90')}
            />
            {title}
          </button>
        </h2>
        <span className="min-w-0 flex-1 truncate text-right text-sm text-muted">{aside}</span>
        {open ? actions : null}
      </div>
      <div id={id} hidden={!open} className="pt-2">
        {open ? children : null}
      </div>
    </section>
  );
}
