import { useWorkbench } from '../state/store';
import { Card } from './card';

/** Remarks on the model that hold whatever its numbers, and the authors' own notes. */
export function NotesCard() {
  const report = useWorkbench((state) => state.shownReport);
  const notes = useWorkbench((state) => state.document.notes);
  const twin = report?.twin;
  const remarks: string[] = [];
  if (twin) remarks.push(twin.reason);
  if (report && !report.autonomous)
    remarks.push(
      'A formula holds the time, so nothing rests: a sweep follows the fixed points of the period map.',
    );
  if (report && !report.smooth)
    remarks.push('The model has a kink (min, max, abs or a condition); normal forms are withheld there.');
  if (report?.deterministicOnly) remarks.push('A signed rate makes this model deterministic only.');
  if (remarks.length === 0 && !notes.trim()) return null;
  return (
    <Card title="Notes">
      {notes.trim() ? <p className="mb-2 text-sm whitespace-pre-line">{notes}</p> : null}
      <ul className="grid gap-1 text-sm text-muted">
        {remarks.map((remark) => (
          <li key={remark}>{remark}</li>
        ))}
      </ul>
    </Card>
  );
}
