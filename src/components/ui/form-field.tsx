import { useId, type InputHTMLAttributes, type ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface FormFieldProps extends InputHTMLAttributes<HTMLInputElement> {
  readonly label: string;
  readonly error?: string | undefined;
  readonly help?: ReactNode;
}

export const INPUT_CLASSES =
  'w-full min-h-9 rounded-md border border-hairline bg-raised px-2.5 text-ink placeholder:text-muted aria-invalid:border-caution';

/** A labelled input whose error stands beneath it and is announced with it. */
export function FormField({ label, error, help, className, id, ...input }: FormFieldProps) {
  const generated = useId();
  const fieldId = id ?? generated;
  const note = error ? `${fieldId}-error` : help ? `${fieldId}-help` : undefined;
  return (
    <div className={joinClasses('grid gap-1', className)}>
      <label htmlFor={fieldId} className="font-medium">
        {label}
      </label>
      <input
        id={fieldId}
        aria-invalid={error ? true : undefined}
        aria-describedby={note}
        className={INPUT_CLASSES}
        {...input}
      />
      {error ? (
        <p id={`${fieldId}-error`} className="text-sm text-caution">
          {error}
        </p>
      ) : help ? (
        <p id={`${fieldId}-help`} className="text-sm text-muted">
          {help}
        </p>
      ) : null}
    </div>
  );
}
