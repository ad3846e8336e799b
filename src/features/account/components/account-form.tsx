import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type DefaultValues, type FieldValues, type Path, type Resolver } from 'react-hook-form';
import type { z } from 'zod';

import { Button } from '@/components/ui/button';
import { FormField } from '@/components/ui/form-field';
import { ApiError } from '@/lib/api-client';

export interface AccountField<T> {
  readonly name: Path<T>;
  readonly label: string;
  readonly type?: 'text' | 'email' | 'password';
  readonly autoComplete: string;
  readonly help?: string;
}

interface AccountFormProps<T extends FieldValues> {
  readonly schema: z.ZodType<T, T>;
  readonly fields: readonly AccountField<T>[];
  readonly initial: DefaultValues<T>;
  readonly submitLabel: string;
  readonly onSubmit: (values: T) => Promise<void>;
  readonly label: string;
}

/** A form checked by the contract's own shape; refusals of the server stand at their field or above the button. */
export function AccountForm<T extends FieldValues>({
  schema,
  fields,
  initial,
  submitLabel,
  onSubmit,
  label,
}: AccountFormProps<T>) {
  const form = useForm<T>({
    resolver: zodResolver(schema) as Resolver<T>,
    defaultValues: initial,
    mode: 'onTouched',
  });
  const { errors, isSubmitting } = form.formState;

  const handleSubmit = form.handleSubmit(async (values) => {
    try {
      await onSubmit(values);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      const known = fields.filter((field) => error.fields[field.name]);
      for (const field of known) form.setError(field.name, { message: error.fields[field.name] ?? '' });
      if (known.length === 0) form.setError('root', { message: error.message });
    }
  });

  return (
    <form aria-label={label} noValidate className="grid gap-4" onSubmit={(event) => void handleSubmit(event)}>
      {fields.map((field) => (
        <FormField
          key={field.name}
          label={field.label}
          type={field.type ?? 'text'}
          autoComplete={field.autoComplete}
          help={field.help}
          error={errors[field.name]?.message as string | undefined}
          {...form.register(field.name)}
        />
      ))}
      {errors.root ? (
        <p role="alert" className="rounded-md border border-caution px-3 py-2 text-caution">
          {errors.root.message}
        </p>
      ) : null}
      <Button type="submit" look="primary" disabled={isSubmitting}>
        {isSubmitting ? 'One moment…' : submitLabel}
      </Button>
    </form>
  );
}
