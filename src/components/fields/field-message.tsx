import { CircleAlert, Info, TriangleAlert } from 'lucide-react';
import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface FieldMessageProps {
  readonly id?: string;
  readonly severity?: 'error' | 'warning' | 'note';
  readonly children: ReactNode;
}

const ICONS = { error: CircleAlert, warning: TriangleAlert, note: Info } as const;
const WORDS = { error: 'Error', warning: 'Warning', note: 'Note' } as const;

/** What is wrong with a field, beneath it. */
export function FieldMessage({ id, severity = 'error', children }: FieldMessageProps) {
  const Icon = ICONS[severity];
  return (
    <p
      id={id}
      className={joinClasses(
        'flex items-start gap-1.5 text-sm leading-snug',
        severity === 'note' ? 'text-muted' : 'text-caution',
      )}
    >
      <Icon size={14} className="mt-0.5 shrink-0" role="img" aria-label={WORDS[severity]} />
      <span className="min-w-0 break-words">{children}</span>
    </p>
  );
}
