import { useId, type ReactNode } from 'react';

/** One part of a sweep that is being set. */
export function SetSection({
  title,
  note,
  children,
}: {
  readonly title: string;
  readonly note?: string | undefined;
  readonly children: ReactNode;
}) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="grid min-w-0 gap-3 border-t pt-5">
      <div>
        <h2 id={id} className="text-xl">
          {title}
        </h2>
        {note ? <p className="text-sm text-muted">{note}</p> : null}
      </div>
      {children}
    </section>
  );
}
