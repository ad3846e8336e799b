import { NumberField } from '@/components/fields/number-field';
import { TextAreaField } from '@/components/fields/text-area-field';
import { TextField } from '@/components/fields/text-field';
import type { PresetDocument } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { useDiagnostics } from '../use-diagnostics';

/** Tags as typed, separated by commas. */
function readTags(text: string): string[] | string {
  const tags = [
    ...new Set(
      text
        .split(',')
        .map((tag) => tag.trim())
        .filter(Boolean),
    ),
  ];
  if (tags.length > 12) return 'At most 12 tags are kept.';
  const long = tags.find((tag) => tag.length > 40);
  return long ? `“${long.slice(0, 20)}…” is longer than 40 characters.` : tags;
}

export function ModelFields() {
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  const unitProblems = useDiagnostics(['densityUnit']);
  const change = (what: string, patch: Partial<PresetDocument>, merge = true) =>
    edit(what, (before) => ({ ...before, ...patch }), merge ? `model:${what}` : undefined);
  return (
    <div className="grid grid-cols-2 gap-3">
      <TextField
        visibleLabel
        live
        className="col-span-2"
        label="Summary"
        value={document.summary}
        maxLength={1000}
        onCommit={(summary) => change('Summary', { summary })}
      />
      <TextField
        visibleLabel
        className="col-span-2"
        label="Tags, separated by commas"
        value={document.tags.join(', ')}
        data-path="tags"
        onCommit={(text) => {
          const tags = readTags(text);
          if (typeof tags === 'string') return tags;
          change('Tags', { tags }, false);
          return null;
        }}
      />
      <TextField
        visibleLabel
        label="Time unit"
        value={document.timeUnit}
        maxLength={60}
        data-path="timeUnit"
        onCommit={(text) => {
          if (text.trim() === '') return 'A unit of time is needed.';
          change('Time unit', { timeUnit: text.trim() }, false);
          return null;
        }}
      />
      <TextField
        visibleLabel
        live
        label="Density unit"
        value={document.densityUnit}
        maxLength={60}
        data-path="densityUnit"
        onCommit={(densityUnit) => change('Density unit', { densityUnit })}
      />
      <NumberField
        visibleLabel
        label="Length of a trajectory"
        unit={document.timeUnit}
        value={document.horizon}
        data-path="horizon"
        check={(value) => (value > 0 && value <= 1e9 ? null : 'The length must be above 0 and at most 1e9.')}
        onCommit={(horizon) => change('Length of trajectories', { horizon }, false)}
      />
      <NumberField
        visibleLabel
        label="Individuals per unit of density"
        placeholder="not known"
        value={document.individualsPerUnit}
        data-path="individualsPerUnit"
        check={(value) => (value > 0 ? null : 'The number must be above 0.')}
        onCommit={(individualsPerUnit) => change('Individuals per unit', { individualsPerUnit }, false)}
        onClear={() => change('Individuals per unit', { individualsPerUnit: null }, false)}
      />
      <TextAreaField
        className="col-span-2"
        label="Notes and citations"
        rows={5}
        value={document.notes}
        maxLength={20_000}
        onChange={(notes) => change('Notes', { notes })}
      />
      <div className="col-span-2">
        <DiagnosticLines diagnostics={unitProblems} />
      </div>
    </div>
  );
}
