import { useState } from 'react';

import { Popover } from '@/components/ui/popover';
import { joinClasses } from '@/lib/join-classes';

import { useWorkbench } from '../../state/store';
import { useDiagnostics } from '../use-diagnostics';
import { TraitSettings } from './trait-settings';

/** Heading of a trait: its name, symbol and unit; its settings behind it. */
export function TraitHeader({
  index,
  align = 'right',
}: {
  readonly index: number;
  readonly align?: 'left' | 'right';
}) {
  const trait = useWorkbench((state) => state.document.traits[index]);
  const [open, setOpen] = useState(false);
  const troubled = useDiagnostics(['traits', index]).length > 0;
  if (!trait) return null;
  return (
    <Popover
      open={open}
      onOpenChange={setOpen}
      label={`Settings of ${trait.name || trait.symbol}`}
      width="wide"
      trigger={
        <button
          type="button"
          data-path={`traits.${index}`}
          title={trait.meaning || undefined}
          className={joinClasses(
            'grid w-full rounded px-1 py-0.5 leading-tight font-normal hover:bg-raised',
            align === 'right' ? 'text-right' : 'text-left',
            troubled && 'underline decoration-caution decoration-wavy underline-offset-2',
          )}
        >
          <span className="text-sm text-ink">
            {trait.name || trait.symbol} <span className="figures text-muted italic">{trait.symbol}</span>
          </span>
          <span className="text-xs text-muted">
            {trait.unit || (trait.domain === 'share' ? 'share' : '')}
          </span>
        </button>
      }
    >
      <TraitSettings index={index} onClose={() => setOpen(false)} />
    </Popover>
  );
}
