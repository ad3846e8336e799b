import type { PresetDocument, Trait } from '../schema/preset';
import { compileModel, type CompiledModel } from '../system/compile-model';
import type { VerdictAnswer } from '../verdict/contract';
import type { BoxSides, ParameterValues } from './contract';
import { findEquilibriaPair } from './equilibria-pair';
import { judgeModel, pairEquilibria } from './judge';

/** The answer at the same numbers had another mean been held in pooling. */
export interface OtherMean {
  /** `harmonic mean of m`. */
  readonly mean: string;
  readonly answer: VerdictAnswer;
}

const MEANS: readonly Trait['mean'][] = ['arithmetic', 'geometric', 'harmonic'];

/**
 * Judges the model again with every other mean of the traits that its twin pools, since the choice can
 * turn the answer in saturating models. Means that the traits do not allow (geometric and harmonic
 * need positive values) are left out. Cost: one compilation and one search for equilibria a mean.
 */
export function* answersUnderOtherMeans(
  model: CompiledModel,
  values: ParameterValues,
  box: BoxSides = {},
): Generator<unknown, readonly OtherMean[]> {
  const { document, twin } = model;
  if (twin.system === null) return [];
  const pooled = document.traits.filter((trait) =>
    twin.report.pooledTraits.some((one) => one.trait === trait.symbol && one.coefficientOfVariation > 0),
  );
  const answers: OtherMean[] = [];
  for (const mean of MEANS) {
    const changed = pooled.filter((trait) => trait.mean !== mean);
    if (changed.length === 0) continue;
    if (mean !== 'arithmetic' && changed.some((trait) => trait.entries.some((entry) => !(entry.value > 0))))
      continue;
    const compiled = compileModel(withMean(document, changed, mean));
    if (!compiled.ok) continue;
    const found = yield* findEquilibriaPair(compiled.model, values, { box });
    const p = compiled.model.valuesToParameters(values);
    const pairs = pairEquilibria(compiled.model, p, found);
    answers.push({
      mean: `${mean} mean of ${changed.map((trait) => trait.symbol).join(' and ')}`,
      answer: judgeModel(compiled.model, p, found, pairs).answer,
    });
  }
  return answers;
}

function withMean(document: PresetDocument, changed: readonly Trait[], mean: Trait['mean']): PresetDocument {
  const traits = document.traits.map((trait) => (changed.includes(trait) ? { ...trait, mean } : trait));
  return { ...document, traits };
}
