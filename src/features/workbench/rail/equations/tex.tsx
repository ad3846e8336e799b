import type katexModule from 'katex';
import { useEffect, useRef, useState } from 'react';

import { whenIdle } from '@/lib/when-idle';

type Katex = typeof katexModule;
let loading: Promise<Katex> | null = null;
let loaded: Katex | null = null;

/** KaTeX with its fonts, fetched once and only where mathematics is shown; its source stands there until then. */
function loadKatex(): Promise<Katex> {
  loading ??= whenIdle()
    .then(() => Promise.all([import('katex'), import('katex/dist/katex.min.css')]))
    .then(([module]) => {
      loaded = module.default;
      return loaded;
    });
  return loading;
}

/** Typeset mathematics. Its source is written by our own tree, and nothing in it may run or fetch. */
export function Tex({ source, display = false }: { readonly source: string; readonly display?: boolean }) {
  const target = useRef<HTMLSpanElement>(null);
  const [katex, setKatex] = useState<Katex | null>(() => loaded);
  useEffect(() => {
    if (katex) return;
    let live = true;
    loadKatex().then(
      (module) => live && setKatex(() => module),
      () => undefined,
    );
    return () => {
      live = false;
    };
  }, [katex]);
  useEffect(() => {
    if (!katex || !target.current) return;
    katex.render(source, target.current, {
      displayMode: display,
      throwOnError: false,
      trust: false,
      strict: 'ignore',
      maxExpand: 100,
      output: 'htmlAndMathml',
    });
  }, [katex, source, display]);
  return (
    <span ref={target} className="inline-block">
      {katex ? null : <span className="figures text-sm text-muted">{source}</span>}
    </span>
  );
}
