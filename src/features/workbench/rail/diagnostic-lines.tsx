import { FieldMessage } from '@/components/fields/field-message';
import type { Diagnostic } from '@/engine/system/contract';

interface DiagnosticLinesProps {
  readonly id?: string;
  readonly diagnostics: readonly Diagnostic[];
  /** Mends the field by a suggestion; without it suggestions are told only. */
  readonly onSuggestion?: (diagnostic: Diagnostic, suggestion: string) => void;
}

/** Messages beneath a field, each with its suggestion one click away. */
export function DiagnosticLines({ id, diagnostics, onSuggestion }: DiagnosticLinesProps) {
  if (diagnostics.length === 0) return null;
  return (
    <div id={id} className="grid gap-1">
      {diagnostics.map((one) => (
        <FieldMessage key={`${one.severity}:${one.message}`} severity={one.severity}>
          {one.message}
          {one.suggestion !== null && onSuggestion ? (
            <>
              {' '}
              <button
                type="button"
                className="font-medium text-accent underline underline-offset-2"
                onClick={() => onSuggestion(one, one.suggestion ?? '')}
              >
                Did you mean <span className="figures">{one.suggestion}</span>?
              </button>
            </>
          ) : null}
        </FieldMessage>
      ))}
    </div>
  );
}
