import { useRef, useState, type ChangeEvent, type FocusEvent, type KeyboardEvent } from 'react';

import { parseNumber, showNumber } from '@/lib/parse-number';

interface NumberTextOptions {
  /** Null shows an empty field. */
  readonly value: number | null;
  readonly onCommit: (value: number) => void;
  /** Where an empty field has a meaning of its own. */
  readonly onClear?: (() => void) | undefined;
  /** A reason to refuse a number that reads well. */
  readonly check?: ((value: number) => string | null) | undefined;
}

/**
 * State of a typed number. Enter and leaving the field hand the number on; Escape brings back what was
 * there. Text that cannot be understood stays, with the reason, until it is mended or given up.
 */
export function useNumberText({ value, onCommit, onClear, check }: NumberTextOptions) {
  const [draft, setDraft] = useState<string | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const dirty = useRef(false);
  const shown = value === null ? '' : showNumber(value);

  const reset = () => {
    dirty.current = false;
    setDraft(null);
    setProblem(null);
  };

  /** True when the text was understood and handed on. */
  const commit = (text: string): boolean => {
    if (text === shown) {
      reset();
      return true;
    }
    if (text.trim() === '' && onClear) {
      reset();
      onClear();
      return true;
    }
    const parsed = parseNumber(text);
    const refused = 'problem' in parsed ? parsed.problem : (check?.(parsed.value) ?? null);
    if (refused !== null || 'problem' in parsed) {
      setDraft(text);
      setProblem(refused);
      return false;
    }
    reset();
    if (parsed.value !== value) onCommit(parsed.value);
    return true;
  };

  return {
    problem,
    commit,
    reset,
    isDirty: () => dirty.current,
    inputProps: {
      value: draft ?? shown,
      'data-draft': draft === null ? undefined : '',
      inputMode: 'decimal' as const,
      autoComplete: 'off',
      spellCheck: false,
      onChange: (event: ChangeEvent<HTMLInputElement>) => {
        dirty.current = true;
        setDraft(event.target.value);
        setProblem(null);
      },
      onBlur: (event: FocusEvent<HTMLInputElement>) => {
        if (dirty.current) commit(event.target.value);
      },
      onFocus: (event: FocusEvent<HTMLInputElement>) => event.target.select(),
      onKeyDown: (event: KeyboardEvent<HTMLInputElement>) => {
        if (event.key === 'Enter') {
          commit(event.currentTarget.value);
          event.currentTarget.select();
        } else if (event.key === 'Escape' && (dirty.current || problem !== null)) {
          event.stopPropagation();
          event.preventDefault();
          reset();
        }
      },
    },
  };
}
