import { useId, useState, type ReactNode } from 'react';

import { COMPACT_INPUT } from '@/components/fields/field-styles';
import type { Diagnostic } from '@/engine/system/contract';
import { joinClasses } from '@/lib/join-classes';

import { DiagnosticLines } from '../diagnostic-lines';
import { useDiagnostics } from '../use-diagnostics';

interface FormulaFieldProps {
  readonly label: string;
  readonly path: readonly (string | number)[];
  readonly value: string;
  readonly onChange: (value: string) => void;
  /** Written before the formula, e.g. "dx/dt =". */
  readonly before?: ReactNode;
  readonly placeholder?: string;
}

const TEXT = 'figures text-sm leading-relaxed break-all whitespace-pre-wrap';

/** The text once more behind the field, with a wavy line under what is wrong; it also sets the height. */
function Underlined({ text, range }: { readonly text: string; readonly range: Diagnostic['range'] }) {
  if (!range || range.from >= text.length + 1) return <>{text}&#8203;</>;
  const from = Math.min(range.from, Math.max(0, text.length - 1));
  const to = Math.max(from + 1, Math.min(range.to, text.length));
  return (
    <>
      {text.slice(0, from)}
      <span className="rounded-sm bg-caution/10 underline decoration-caution decoration-wavy underline-offset-4">
        {text.slice(from, to)}
      </span>
      {text.slice(to)}&#8203;
    </>
  );
}

/** A formula edited in place: every key counts at once, Escape brings back what was there. */
export function FormulaField({ label, path, value, onChange, before, placeholder }: FormulaFieldProps) {
  const id = useId();
  const diagnostics = useDiagnostics(path);
  const [former, setFormer] = useState(value);
  const first = diagnostics.find((one) => one.range !== null && one.severity !== 'note');
  const wrong = diagnostics.some((one) => one.severity === 'error');
  const mend = (one: Diagnostic, suggestion: string) => {
    const range = one.range ?? { from: 0, to: value.length };
    onChange(value.slice(0, range.from) + suggestion + value.slice(range.to));
  };
  return (
    <div className="grid min-w-0 gap-1">
      <div className="flex min-w-0 items-start gap-2">
        {before ? <span className="shrink-0 pt-1.5 text-sm text-muted">{before}</span> : null}
        <div className="relative grid min-w-0 flex-1">
          <div
            aria-hidden
            className={joinClasses(
              'col-start-1 row-start-1 border border-transparent px-2 py-1 text-transparent',
              TEXT,
            )}
          >
            <Underlined text={value} range={first?.range ?? null} />
          </div>
          <textarea
            rows={1}
            value={value}
            aria-label={label}
            aria-invalid={wrong ? true : undefined}
            aria-describedby={diagnostics.length > 0 ? `${id}-message` : undefined}
            data-path={path.join('.')}
            placeholder={placeholder}
            spellCheck={false}
            autoCapitalize="off"
            autoComplete="off"
            maxLength={2000}
            className={joinClasses(
              'absolute inset-0 h-full w-full resize-none overflow-hidden py-1',
              COMPACT_INPUT,
              TEXT,
              'bg-transparent hover:bg-raised/40',
            )}
            onFocus={() => setFormer(value)}
            onChange={(event) => onChange(event.target.value.replace(/[\r\n]+/g, ' '))}
            onKeyDown={(event) => {
              if (event.key === 'Enter') event.preventDefault();
              if (event.key === 'Escape' && value !== former) {
                event.stopPropagation();
                event.preventDefault();
                onChange(former);
              }
            }}
          />
        </div>
      </div>
      <DiagnosticLines id={`${id}-message`} diagnostics={diagnostics} onSuggestion={mend} />
    </div>
  );
}
