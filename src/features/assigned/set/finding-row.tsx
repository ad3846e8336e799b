import { ArrowDown, ArrowUp, Trash2 } from 'lucide-react';

import { SelectField } from '@/components/fields/select-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { ASSIGNED_LIMITS, type WantedFinding } from '@/contract/assigned-sweeps';
import { POINT_KINDS } from '@/contract/kept-sweep';

import { ToleranceFields } from '../components/tolerance-fields';

interface FindingRowProps {
  readonly wanted: WantedFinding;
  readonly first: boolean;
  readonly last: boolean;
  readonly fixed: boolean;
  readonly onChange: (wanted: WantedFinding) => void;
  readonly onMove: (by: -1 | 1) => void;
  readonly onRemove: () => void;
}

const POINTS = POINT_KINDS.map((kind) => ({ value: kind, label: kind }));
const MODELS = [
  { value: 'split', label: 'of the split model' },
  { value: 'twin', label: 'of the pooled twin' },
] as const;

/** One finding that is wanted: what it is called, what it is, and how near it has to come. */
export function FindingRow(props: FindingRowProps) {
  const { wanted, first, last, fixed, onChange, onMove, onRemove } = props;
  return (
    <li className="grid gap-2 p-3">
      <div className="flex items-center gap-2">
        <TextField
          label="What is wanted"
          className="min-w-0 flex-1"
          maxLength={ASSIGNED_LIMITS.labelLength}
          value={wanted.label}
          onCommit={(label) => {
            if (!label.trim()) return 'Say what is wanted.';
            onChange({ ...wanted, label: label.trim() });
            return null;
          }}
        />
        <Button
          size="small"
          look="quiet"
          aria-label={`Move “${wanted.label}” up`}
          disabled={first || fixed}
          onClick={() => onMove(-1)}
        >
          <ArrowUp size={16} aria-hidden />
        </Button>
        <Button
          size="small"
          look="quiet"
          aria-label={`Move “${wanted.label}” down`}
          disabled={last || fixed}
          onClick={() => onMove(1)}
        >
          <ArrowDown size={16} aria-hidden />
        </Button>
        <Button
          size="small"
          look="quiet"
          aria-label={`Remove “${wanted.label}”`}
          disabled={fixed}
          onClick={onRemove}
        >
          <Trash2 size={16} aria-hidden />
        </Button>
      </div>
      <div className="flex flex-wrap items-start gap-2">
        {wanted.kind === 'special point' ? (
          <>
            <SelectField
              label={`Kind of ${wanted.label}`}
              visibleLabel={false}
              className="w-44"
              value={wanted.point}
              disabled={fixed}
              choices={POINTS}
              onChange={(point) => onChange({ ...wanted, point })}
            />
            <SelectField
              label={`Model of ${wanted.label}`}
              visibleLabel={false}
              className="w-44"
              value={wanted.of}
              disabled={fixed}
              choices={MODELS}
              onChange={(of) => onChange({ ...wanted, of })}
            />
          </>
        ) : null}
        {wanted.kind === 'number' ? (
          <TextField
            label={`Unit of ${wanted.label}`}
            placeholder="unit"
            className="w-28"
            value={wanted.unit}
            disabled={fixed}
            onCommit={(unit) => onChange({ ...wanted, unit: unit.trim() })}
          />
        ) : null}
        {wanted.kind === 'reading' ? (
          <p className="text-muted">A reading in words; a person judges it.</p>
        ) : (
          <ToleranceFields
            of={wanted.label}
            tolerance={wanted.tolerance}
            onChange={(tolerance) => onChange({ ...wanted, tolerance })}
          />
        )}
      </div>
    </li>
  );
}
