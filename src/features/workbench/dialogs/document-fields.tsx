import { TextAreaField } from '@/components/fields/text-area-field';
import { TextField } from '@/components/fields/text-field';

import { useWorkbench } from '../state/store';

/** Title and summary of the document on the bench. */
export function DocumentFields() {
  const title = useWorkbench((state) => state.document.title);
  const summary = useWorkbench((state) => state.document.summary);
  const edit = useWorkbench((state) => state.edit);
  return (
    <>
      <TextField
        visibleLabel
        live
        label="Title"
        value={title}
        maxLength={160}
        error={title.trim() === '' ? 'A title is needed.' : undefined}
        onCommit={(value) => edit('Change title', (document) => ({ ...document, title: value }), 'title')}
      />
      <TextAreaField
        label="Summary"
        rows={2}
        value={summary}
        maxLength={1000}
        placeholder="One or two sentences that stand in the library"
        onChange={(value) => edit('Summary', (document) => ({ ...document, summary: value }), 'summary')}
      />
    </>
  );
}
