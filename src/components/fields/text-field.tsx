import { useId, useState, type KeyboardEvent } from 'react';

import { joinClasses } from '@/lib/join-classes';

import { FieldMessage } from './field-message';
import { COMPACT_HEIGHT, COMPACT_INPUT } from './field-styles';

interface TextFieldProps {
  readonly label: string;
  readonly value: string;
  /**
   * Called with the text on Enter and on leaving the field, or at each key where `live`.
   * A sentence in return refuses it: the text stays, with the reason.
   */
  readonly onCommit: (value: string) => string | null | void;
  readonly live?: boolean;
  readonly error?: string | undefined;
  readonly placeholder?: string;
  readonly visibleLabel?: boolean;
  readonly help?: string;
  readonly maxLength?: number;
  readonly disabled?: boolean;
  readonly className?: string;
  readonly inputClassName?: string;
  readonly 'data-path'?: string;
}

export function TextField(props: TextFieldProps) {
  const { label, value, onCommit, live = false, error, visibleLabel = false, help } = props;
  const id = useId();
  const [draft, setDraft] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [before, setBefore] = useState(value);
  const message = refusal ?? error;

  const commit = (text: string) => {
    const refused = text === value ? null : (onCommit(text) ?? null);
    setRefusal(refused);
    if (refused === null) setDraft(null);
  };
  const handleKey = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'Enter') commit(event.currentTarget.value);
    else if (event.key === 'Escape' && (draft !== null || (live && value !== before))) {
      event.stopPropagation();
      event.preventDefault();
      setDraft(null);
      setRefusal(null);
      if (live) onCommit(before);
    }
  };

  return (
    <div className={joinClasses('grid min-w-0 gap-1', props.className)}>
      <label htmlFor={id} className={visibleLabel ? 'text-sm font-medium' : 'sr-only'}>
        {label}
      </label>
      <input
        id={id}
        className={joinClasses('w-full', COMPACT_HEIGHT, COMPACT_INPUT, props.inputClassName)}
        value={draft ?? value}
        data-draft={draft === null ? undefined : ''}
        autoComplete="off"
        maxLength={props.maxLength}
        placeholder={props.placeholder}
        disabled={props.disabled}
        data-path={props['data-path']}
        aria-invalid={message ? true : undefined}
        aria-describedby={message || help ? `${id}-message` : undefined}
        onFocus={() => setBefore(value)}
        onChange={(event) => {
          if (live) return void onCommit(event.target.value);
          setDraft(event.target.value);
          setRefusal(null);
        }}
        onBlur={(event) => {
          if (draft !== null) commit(event.target.value);
        }}
        onKeyDown={handleKey}
      />
      {message ? (
        <FieldMessage id={`${id}-message`}>{message}</FieldMessage>
      ) : help ? (
        <p id={`${id}-message`} className="text-sm text-muted">
          {help}
        </p>
      ) : null}
    </div>
  );
}
