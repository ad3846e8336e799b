import { useId } from 'react';

import { joinClasses } from '@/lib/join-classes';

import { FieldMessage } from './field-message';
import { COMPACT_INPUT } from './field-styles';

interface TextAreaFieldProps {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly rows?: number;
  readonly visibleLabel?: boolean;
  readonly placeholder?: string;
  readonly maxLength?: number;
  readonly help?: string;
  readonly error?: string | undefined;
  readonly className?: string;
  readonly inputClassName?: string;
}

export function TextAreaField(props: TextAreaFieldProps) {
  const { label, value, onChange, rows = 3, visibleLabel = true, help, error } = props;
  const id = useId();
  return (
    <div className={joinClasses('grid min-w-0 gap-1', props.className)}>
      <label htmlFor={id} className={visibleLabel ? 'text-sm font-medium' : 'sr-only'}>
        {label}
      </label>
      <textarea
        id={id}
        rows={rows}
        value={value}
        maxLength={props.maxLength}
        placeholder={props.placeholder}
        aria-invalid={error ? true : undefined}
        aria-describedby={error || help ? `${id}-message` : undefined}
        className={joinClasses('w-full py-1.5 leading-snug', COMPACT_INPUT, props.inputClassName)}
        onChange={(event) => onChange(event.target.value)}
      />
      {error ? (
        <FieldMessage id={`${id}-message`}>{error}</FieldMessage>
      ) : help ? (
        <p id={`${id}-message`} className="text-sm text-muted">
          {help}
        </p>
      ) : null}
    </div>
  );
}
