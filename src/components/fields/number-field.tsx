import { useId } from 'react';

import { joinClasses } from '@/lib/join-classes';

import { COMPACT_HEIGHT, COMPACT_INPUT } from './field-styles';
import { FieldMessage } from './field-message';
import { useNumberText } from './use-number-text';

interface NumberFieldProps {
  readonly label: string;
  readonly value: number | null;
  readonly onCommit: (value: number) => void;
  readonly onClear?: () => void;
  readonly check?: (value: number) => string | null;
  /** What is wrong with the number as it stands. */
  readonly error?: string | undefined;
  readonly unit?: string;
  readonly placeholder?: string;
  /** Shows the label above the field instead of giving it to screen readers alone. */
  readonly visibleLabel?: boolean;
  readonly disabled?: boolean;
  readonly className?: string;
  readonly 'data-path'?: string;
}

export function NumberField({
  label,
  value,
  onCommit,
  onClear,
  check,
  error,
  unit,
  placeholder,
  visibleLabel = false,
  disabled,
  className,
  ...rest
}: NumberFieldProps) {
  const id = useId();
  const text = useNumberText({ value, onCommit, onClear, check });
  const message = text.problem ?? error;
  return (
    <div className={joinClasses('grid min-w-0 gap-1', className)}>
      <label htmlFor={id} className={visibleLabel ? 'text-sm font-medium' : 'sr-only'}>
        {label}
      </label>
      <div className="flex min-w-0 items-center gap-1.5">
        <input
          id={id}
          className={joinClasses('figures w-full text-right', COMPACT_HEIGHT, COMPACT_INPUT)}
          aria-invalid={message ? true : undefined}
          aria-describedby={message ? `${id}-message` : undefined}
          placeholder={placeholder}
          disabled={disabled}
          data-path={rest['data-path']}
          {...text.inputProps}
        />
        {unit ? <span className="shrink-0 text-sm text-muted">{unit}</span> : null}
      </div>
      {message ? <FieldMessage id={`${id}-message`}>{message}</FieldMessage> : null}
    </div>
  );
}
