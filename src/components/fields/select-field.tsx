import { useId } from 'react';

import { joinClasses } from '@/lib/join-classes';

import { FieldMessage } from './field-message';
import { COMPACT_HEIGHT, COMPACT_INPUT } from './field-styles';

export interface Choice<T extends string> {
  readonly value: T;
  readonly label: string;
}

interface SelectFieldProps<T extends string> {
  readonly label: string;
  readonly value: T;
  readonly choices: readonly Choice<T>[];
  readonly onChange: (value: T) => void;
  readonly visibleLabel?: boolean;
  readonly help?: string;
  readonly error?: string | undefined;
  readonly disabled?: boolean;
  readonly className?: string;
  readonly 'data-path'?: string;
}

/** The platform's own list: it works by keyboard, by touch and with every screen reader. */
export function SelectField<T extends string>(props: SelectFieldProps<T>) {
  const { label, value, choices, onChange, visibleLabel = true, help, error, disabled, className } = props;
  const id = useId();
  return (
    <div className={joinClasses('grid min-w-0 gap-1', className)}>
      <label htmlFor={id} className={visibleLabel ? 'text-sm font-medium' : 'sr-only'}>
        {label}
      </label>
      <select
        id={id}
        value={value}
        disabled={disabled}
        data-path={props['data-path']}
        aria-invalid={error ? true : undefined}
        aria-describedby={error || help ? `${id}-message` : undefined}
        className={joinClasses('w-full', COMPACT_HEIGHT, COMPACT_INPUT)}
        onChange={(event) => {
          const chosen = choices.find((choice) => choice.value === event.target.value);
          if (chosen) onChange(chosen.value);
        }}
      >
        {choices.some((choice) => choice.value === value) ? null : (
          <option value={value}>{value || '…'}</option>
        )}
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
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
