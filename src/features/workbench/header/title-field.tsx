import { useState } from 'react';

import { useWorkbench } from '../state/store';

/** The title, edited where it stands. Escape brings back what was there. */
export function TitleField({ readOnly }: { readonly readOnly: boolean }) {
  const title = useWorkbench((state) => state.document.title);
  const edit = useWorkbench((state) => state.edit);
  const [former, setFormer] = useState(title);
  if (readOnly) return <h1 className="truncate font-text text-base font-semibold">{title}</h1>;
  const change = (value: string) =>
    edit('Change title', (document) => ({ ...document, title: value }), 'title');
  return (
    <>
      <h1 className="sr-only">{title}</h1>
      <span className="relative inline-grid max-w-full min-w-0 items-center font-semibold">
        <span
          aria-hidden
          className="invisible col-start-1 row-start-1 truncate border border-transparent pr-3 pl-1.5 whitespace-pre"
        >
          {title || 'Untitled'}
        </span>
        <input
          aria-label="Title of the preset"
          value={title}
          size={1}
          maxLength={160}
          placeholder="Untitled"
          autoComplete="off"
          data-path="title"
          className="col-start-1 row-start-1 w-full min-w-16 truncate rounded border border-transparent bg-transparent px-1.5 py-0.5 hover:border-hairline focus:bg-raised"
          onFocus={() => setFormer(title)}
          onBlur={() => {
            if (title.trim() === '') change(former.trim() || 'Untitled model');
          }}
          onChange={(event) => change(event.target.value)}
          onKeyDown={(event) => {
            if (event.key === 'Escape') change(former);
            if (event.key === 'Enter' || event.key === 'Escape') event.currentTarget.blur();
          }}
        />
      </span>
    </>
  );
}
