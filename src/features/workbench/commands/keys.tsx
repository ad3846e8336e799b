import { keysOf } from './shortcut';

export function Keys({ shortcut }: { readonly shortcut: string }) {
  return (
    <span className="flex shrink-0 gap-0.5">
      {keysOf(shortcut).map((key) => (
        <kbd
          key={key}
          className="min-w-5 rounded border border-hairline bg-panel px-1 text-center text-xs text-muted"
        >
          {key}
        </kbd>
      ))}
    </span>
  );
}
