import type { ReactNode } from 'react';

/** A page of one form. */
export function NarrowPage({
  title,
  intro,
  children,
  below,
}: {
  readonly title: string;
  readonly intro?: ReactNode;
  readonly children: ReactNode;
  readonly below?: ReactNode;
}) {
  return (
    <div className="mx-auto grid max-w-md gap-5 px-4 py-12">
      <div className="grid gap-2">
        <h1 className="text-3xl">{title}</h1>
        {intro ? <div className="text-muted">{intro}</div> : null}
      </div>
      {children}
      {below ? <div className="flex flex-wrap gap-x-5 gap-y-2 text-sm">{below}</div> : null}
    </div>
  );
}

export const LINK_CLASSES = 'text-accent underline underline-offset-2 hover:no-underline';
