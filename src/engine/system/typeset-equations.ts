import { symbolsOf, symbolToTex, toTex, type FormulaNode } from '../expression/index';
import { listClasses } from '../schema/document-symbols';
import type { PresetDocument } from '../schema/preset';
import type { ModelReport } from './contract';
import { parseCached } from './model-graph';

const NOWHERE = { from: 0, to: 0 } as const;

/**
 * TeX of each state's equation, as the processes write it: the sum of amount times rate, signs drawn out
 * and factors of 1 left out. Formulas that cannot be read are left out; a model with one is not shown.
 */
export function typesetEquations(document: PresetDocument): ModelReport['equations'] {
  return listClasses(document).map(({ class: { symbol } }) => {
    let sum: FormulaNode | null = null;
    for (const process of document.processes) {
      const rate = readTree(process.rate);
      for (const effect of process.effects) {
        const amount = readTree(effect.amount);
        if (effect.class !== symbol || rate === null || amount === null) continue;
        sum = addTerm(sum, signedProduct(amount, rate));
      }
    }
    const right = sum === null ? '0' : toTex(sum);
    return { symbol, tex: `${dotted(symbolToTex(symbol))} = ${right}` };
  });
}

/** TeX of the intermediate formulas, after the totals that formulas read. */
export function typesetIntermediates(document: PresetDocument): ModelReport['intermediates'] {
  const texts = [
    ...document.intermediates.map((one) => one.formula),
    ...document.processes.flatMap((one) => [one.rate, ...one.effects.map((effect) => effect.amount)]),
  ];
  const read = new Set(
    texts.flatMap((text) => {
      const tree = readTree(text);
      return tree === null ? [] : symbolsOf(tree);
    }),
  );
  const totals = document.populations
    .filter((one) => one.classes.length > 1 && read.has(one.symbol))
    .map(({ symbol, classes }) => ({
      symbol,
      tex: `${symbolToTex(symbol)} = ${classes.map((one) => symbolToTex(one.symbol)).join(' + ')}`,
    }));
  const formulas = document.intermediates.flatMap(({ symbol, formula }) => {
    const tree = readTree(formula);
    return tree === null ? [] : [{ symbol, tex: `${symbolToTex(symbol)} = ${toTex(tree)}` }];
  });
  return [...totals, ...formulas];
}

interface Term {
  readonly negative: boolean;
  readonly tree: FormulaNode;
}

function readTree(text: string): FormulaNode | null {
  const parsed = parseCached(text);
  return parsed.ok ? parsed.tree : null;
}

function signedProduct(amount: FormulaNode, rate: FormulaNode): Term {
  if (amount.kind === 'negate') {
    const inner = signedProduct(amount.operand, rate);
    return { ...inner, negative: !inner.negative };
  }
  if (rate.kind === 'negate') {
    const inner = signedProduct(amount, rate.operand);
    return { ...inner, negative: !inner.negative };
  }
  if (amount.kind === 'number' && amount.value === 1) return { negative: false, tree: rate };
  return { negative: false, tree: { kind: 'binary', operator: '*', left: amount, right: rate, ...NOWHERE } };
}

function addTerm(sum: FormulaNode | null, term: Term): FormulaNode {
  if (sum === null) return term.negative ? { kind: 'negate', operand: term.tree, ...NOWHERE } : term.tree;
  return { kind: 'binary', operator: term.negative ? '-' : '+', left: sum, right: term.tree, ...NOWHERE };
}

/** The dot stands over the letter alone, not over its subscript. */
function dotted(tex: string): string {
  const at = tex.indexOf('_{');
  return at < 0 ? `\\dot{${tex}}` : `\\dot{${tex.slice(0, at)}}${tex.slice(at)}`;
}
