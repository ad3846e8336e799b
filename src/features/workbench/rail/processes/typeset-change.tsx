import { parseFormula, symbolToTex, toTex } from '@/engine/expression/index';
import type { Intermediate, Process } from '@/engine/schema/preset';

import { Tex } from '../equations/tex';

function term(amount: string, rate: string): string {
  const plain = amount.replace(/[\s()]/g, '');
  if (plain === '1') return `(${rate})`;
  return plain === '-1' ? `-(${rate})` : `(${amount})*(${rate})`;
}

/** What some processes add to each class's equation, as TeX; formulas that cannot be read are left out. */
export function typesetChange(processes: readonly Process[]): readonly { symbol: string; tex: string }[] {
  const sums = new Map<string, string[]>();
  for (const process of processes)
    for (const effect of process.effects)
      sums.set(effect.class, [...(sums.get(effect.class) ?? []), term(effect.amount, process.rate)]);
  return [...sums].flatMap(([symbol, terms]) => {
    const sum = terms.reduce((text, next) =>
      next.startsWith('-') ? `${text} - ${next.slice(1)}` : `${text} + ${next}`,
    );
    const parsed = parseFormula(sum);
    if (!parsed.ok) return [];
    const right = toTex(parsed.tree);
    return [
      { symbol, tex: `\\dot{${symbolToTex(symbol)}} = \\cdots ${right.startsWith('-') ? '' : '+ '}${right}` },
    ];
  });
}

interface TypesetChangeProps {
  readonly processes: readonly Process[];
  readonly formulas: readonly Intermediate[];
}

export default function TypesetChange({ processes, formulas }: TypesetChangeProps) {
  return (
    <div
      role="region"
      aria-label="Typeset preview"
      tabIndex={0}
      className="grid gap-2 overflow-x-auto rounded-md border border-hairline bg-raised px-3 py-2.5"
    >
      {typesetChange(processes).map((one) => (
        <Tex key={one.symbol} source={one.tex} />
      ))}
      {formulas.map((one) => {
        const parsed = parseFormula(one.formula);
        return parsed.ok ? (
          <Tex key={one.symbol} source={`${symbolToTex(one.symbol)} = ${toTex(parsed.tree)}`} />
        ) : null;
      })}
    </div>
  );
}
