/** A symbol beside its name: upright names, italic symbols. */
export function SymbolText({ symbol }: { readonly symbol: string }) {
  return <span className="figures text-sm text-muted italic">{symbol}</span>;
}
