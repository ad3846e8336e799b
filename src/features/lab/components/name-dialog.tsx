import { useState, type FormEvent } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { FormField } from '@/components/ui/form-field';
import { labNameSchema } from '@/contract/labs';
import { ApiError } from '@/lib/api-client';

interface NameDialogProps {
  readonly title: string;
  readonly description: string;
  readonly initial: string;
  readonly submitLabel: string;
  readonly onSubmit: (name: string) => Promise<void>;
  readonly onClose: () => void;
}

/** Asks for the name of a lab. */
export function NameDialog({ title, description, initial, submitLabel, onSubmit, onClose }: NameDialogProps) {
  const [name, setName] = useState(initial);
  const [problem, setProblem] = useState('');
  const [busy, setBusy] = useState(false);

  const handleSubmit = async (event: FormEvent) => {
    event.preventDefault();
    const parsed = labNameSchema.safeParse(name);
    if (!parsed.success) {
      setProblem(parsed.error.issues[0]?.message ?? '');
      return;
    }
    setBusy(true);
    try {
      await onSubmit(parsed.data);
      onClose();
    } catch (error) {
      setProblem(
        error instanceof ApiError ? (error.fields.name ?? error.message) : 'That did not work. Try again.',
      );
    } finally {
      setBusy(false);
    }
  };

  return (
    <Dialog open onOpenChange={onClose} title={title} description={description} width="narrow">
      <form className="grid gap-4" noValidate onSubmit={(event) => void handleSubmit(event)}>
        <FormField
          label="Name of the lab"
          value={name}
          autoComplete="off"
          error={problem || undefined}
          onChange={(event) => {
            setName(event.target.value);
            setProblem('');
          }}
        />
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" look="primary" disabled={busy}>
            {submitLabel}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
