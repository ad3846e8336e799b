import { Button } from '@/components/ui/button';
import { ASSIGNED_LIMITS, type WantedFinding } from '@/contract/assigned-sweeps';

import { FindingRow } from './finding-row';
import { SetSection } from './set-section';
import { referenceFor, type SetPart } from './set-view';

const TOLERANCE = { kind: 'relative', amount: 0.01 } as const;

type Kind = WantedFinding['kind'];

function blank(kind: Kind): WantedFinding {
  const id = crypto.randomUUID();
  if (kind === 'special point')
    return { id, kind, label: 'Onset of cycles', point: 'Hopf', of: 'split', tolerance: TOLERANCE };
  if (kind === 'number') return { id, kind, label: 'A number', unit: '', tolerance: TOLERANCE };
  return { id, kind, label: 'What you read in it' };
}

const ADD: readonly { readonly kind: Kind; readonly label: string }[] = [
  { kind: 'special point', label: 'Add a special point' },
  { kind: 'number', label: 'Add a number' },
  { kind: 'reading', label: 'Add a reading' },
];

/** What is to be found and handed in. */
export function FindingsSection({ view, fixed, onChange }: SetPart) {
  const { wanted } = view;
  const put = (next: readonly WantedFinding[]) =>
    onChange({
      wanted: [...next],
      reference: {
        ...view.reference,
        findings: next.map(({ id }) => referenceFor(view.reference.findings, id)),
      },
    });
  const handleChange = (next: WantedFinding) =>
    onChange({ wanted: wanted.map((one) => (one.id === next.id ? next : one)) });
  const handleMove = (index: number, by: -1 | 1) => {
    const next = [...wanted];
    const [moved] = next.splice(index, 1);
    if (moved) next.splice(index + by, 0, moved);
    put(next);
  };
  return (
    <SetSection
      title="Findings wanted"
      note={
        fixed
          ? 'Kinds are fixed since the sweep was opened; words and tolerances may change.'
          : 'A special point is the value of the swept parameter at which it lies.'
      }
    >
      {wanted.length > 0 ? (
        <ol className="divide-y rounded-lg border bg-raised">
          {wanted.map((one, index) => (
            <FindingRow
              key={one.id}
              wanted={one}
              first={index === 0}
              last={index === wanted.length - 1}
              fixed={fixed}
              onChange={handleChange}
              onMove={(by) => handleMove(index, by)}
              onRemove={() => put(wanted.filter(({ id }) => id !== one.id))}
            />
          ))}
        </ol>
      ) : (
        <p className="rounded-lg border border-dashed p-4 text-muted">Nothing is asked for yet.</p>
      )}
      <div className="flex flex-wrap gap-2">
        {ADD.map(({ kind, label }) => (
          <Button
            key={kind}
            disabled={fixed || wanted.length >= ASSIGNED_LIMITS.findings}
            onClick={() => put([...wanted, blank(kind)])}
          >
            {label}
          </Button>
        ))}
      </div>
    </SetSection>
  );
}
