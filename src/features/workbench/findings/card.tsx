import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

export function Card({
  title,
  aside,
  accent,
  children,
}: {
  readonly title: string;
  readonly aside?: ReactNode;
  readonly accent?: boolean;
  readonly children: ReactNode;
}) {
  return (
    <section
      aria-label={title}
      className={joinClasses('rounded-lg border bg-raised p-3.5', accent && 'border-accent')}
    >
      <div className="mb-1.5 flex flex-wrap items-baseline justify-between gap-x-2">
        <h2 className="text-lg">{title}</h2>
        {aside}
      </div>
      {children}
    </section>
  );
}

export function Chip({
  tone = 'plain',
  children,
}: {
  readonly tone?: 'plain' | 'good' | 'bad';
  readonly children: ReactNode;
}) {
  return (
    <li
      className={joinClasses(
        'rounded-full border px-2 py-px text-sm',
        tone === 'plain' && 'text-muted',
        tone === 'good' && 'border-accent text-accent',
        tone === 'bad' && 'border-caution text-caution',
      )}
    >
      {children}
    </li>
  );
}
