import { kinksOf, reachable } from '../expression/index';
import { describeClass, listClasses, lowerFirst, type PlacedClass } from '../schema/document-symbols';
import type { Diagnostic } from './contract';
import { evaluateNodes } from './evaluate-graph';
import type { ModelGraph } from './model-graph';
import { figure, remark } from './remark';
import { seededRandom } from './seeded-random';

const SAMPLES = { asEntered: 24, overRanges: 24, seed: 7_411 } as const;
/** A rate this far below zero relative to its size over the samples is rounding, not a sign. */
const ROUNDING = 1e-12;

/** How the remark begins that makes a model deterministic only. */
export const NEGATIVE_RATE = 'This rate becomes negative';

interface Sample {
  readonly u: Float64Array;
  readonly p: Float64Array;
  readonly rates: Float64Array;
  readonly amounts: Float64Array;
}

/**
 * Checks rates and effects at sample states of the box, first with parameters as entered, then over
 * their ranges: rates that become negative, populations that nothing feeds, classes that never gain
 * or lose, kinks.
 */
export function checkFlows(model: ModelGraph): readonly Diagnostic[] {
  const { document, graph, processes } = model;
  const found: Diagnostic[] = [];
  const samples = takeSamples(model);
  processes.forEach((process, k) => {
    const definition = document.processes[k];
    if (definition === undefined) return;
    if (!definition.signed) {
      const negative = firstNegative(samples, k);
      if (negative !== null) {
        found.push(negativeRate(model, k, negative, samples.indexOf(negative) < SAMPLES.asEntered));
      }
    }
    if (samples.every((sample) => !Number.isFinite(sample.rates[k] ?? 0))) {
      found.push(
        remark(
          'warning',
          ['processes', k, 'rate'],
          'This rate is not a finite number at any state that was tried; look for a division by zero or the logarithm of zero.',
        ),
      );
    }
    if (kinksOf(graph, [process.rate, ...process.effects.map((effect) => effect.amount)]).length > 0) {
      const message =
        'This formula has a kink (min, max, abs or a condition): at the kink no criticality of a Hopf point is given.';
      found.push(remark('note', ['processes', k, 'rate'], message));
    }
  });
  return [...found, ...checkBalance(model, samples)];
}

function takeSamples(model: ModelGraph): readonly Sample[] {
  const { document, graph, processes } = model;
  const random = seededRandom(SAMPLES.seed);
  const classes = listClasses(document);
  const effects = processes.flatMap((process) => process.effects.map((effect) => effect.amount));
  const outputs = [...processes.map((process) => process.rate), ...effects];
  const evaluate = evaluateNodes(graph, outputs);
  const out = new Float64Array(outputs.length);
  const total = SAMPLES.asEntered + SAMPLES.overRanges;
  return Array.from({ length: total }, (_, k) => {
    const u = Float64Array.from(classes, (entry) => sampleInBox(model, entry, random));
    const p = Float64Array.from(model.defaults);
    if (k >= SAMPLES.asEntered) {
      document.parameters.forEach((one, i) => {
        p[i] = one.min + (one.max - one.min) * random();
      });
    }
    evaluate(random() * 4, u, p, out);
    return { u, p, rates: out.slice(0, processes.length), amounts: out.slice(processes.length) };
  });
}

function sampleInBox(model: ModelGraph, entry: PlacedClass, random: () => number): number {
  const side = model.document.box.find((one) => one.class === entry.class.symbol);
  const reach = 4 * Math.max(1, Math.abs(entry.class.start));
  const from = side?.from ?? (entry.population.sign === 'any' ? -reach : 0);
  const to = side?.to ?? reach;
  // The square crowds samples towards the lower end, where densities of the same box differ most.
  return from + (to - from) * random() ** 2;
}

function firstNegative(samples: readonly Sample[], k: number): Sample | null {
  const size = Math.max(
    ...samples.map((sample) => Math.abs(sample.rates[k] ?? 0)).filter(Number.isFinite),
    0,
  );
  return samples.find((sample) => (sample.rates[k] ?? 0) < -ROUNDING * size) ?? null;
}

function negativeRate(model: ModelGraph, k: number, sample: Sample, asEntered: boolean): Diagnostic {
  const { document, graph } = model;
  const rate = model.processes[k]?.rate ?? 0;
  const needed = new Set(reachable(graph, [rate]));
  const at = [...sample.u].flatMap((value, i) =>
    needed.has(graph.state(i)) ? [`${model.stateSymbols[i] ?? ''} = ${figure(value)}`] : [],
  );
  const moved = document.parameters.flatMap((one, i) =>
    sample.p[i] !== one.value && needed.has(graph.parameter(i))
      ? [`${one.symbol} = ${figure(sample.p[i] ?? 0)}`]
      : [],
  );
  const where = [...at, ...moved].slice(0, 6).join(', ') || 'any state';
  const example = `${figure(sample.rates[k] ?? 0)} at ${where}`;
  const path = ['processes', k, 'rate'];
  if (!asEntered) {
    const message = `This rate would become negative within the ranges of the parameters, for example ${example}; narrow the ranges, or write gains and losses as processes of their own.`;
    return remark('note', path, message);
  }
  const message = `${NEGATIVE_RATE}, for example ${example}. Write gains and losses as processes of their own, or mark the rate as signed, which makes the model deterministic only.`;
  return remark('warning', path, message);
}

/** Which states ever gain and ever lose, over all samples. */
function checkBalance(model: ModelGraph, samples: readonly Sample[]): readonly Diagnostic[] {
  const n = model.stateSymbols.length;
  const [gains, losses] = [new Uint8Array(n), new Uint8Array(n)];
  for (const sample of samples) {
    let at = 0;
    model.processes.forEach((process, k) => {
      for (const effect of process.effects) {
        const flow = (sample.rates[k] ?? 0) * (sample.amounts[at] ?? 0);
        at += 1;
        if (flow > 0) gains[effect.state] = 1;
        if (flow < 0) losses[effect.state] = 1;
      }
    });
  }
  const classes = listClasses(model.document);
  const found: Diagnostic[] = [];
  model.document.populations.forEach((population, index) => {
    const own = classes
      .map((entry, i) => ({ entry, i }))
      .filter(({ entry }) => entry.populationIndex === index);
    if (population.sign === 'any') return;
    const name = lowerFirst(population.name || population.symbol);
    if (own.every(({ i }) => gains[i] === 0)) {
      const message = `Nothing feeds ${name}: no process adds to this population, so it can only vanish.`;
      found.push(remark('warning', ['populations', index], message));
    }
    for (const { entry, i } of own) {
      const path = ['populations', index, 'classes', entry.classIndex];
      const label = describeClass(population, entry.class);
      const [gained, lost] = [gains[i] === 1, losses[i] === 1];
      if (!gained && !lost) found.push(remark('note', path, `No process changes ${label}.`));
      else if (!lost)
        found.push(remark('warning', path, `Nothing removes ${label}, so the class can only grow.`));
      else if (!gained && own.some((one) => gains[one.i] === 1)) {
        found.push(remark('warning', path, `Nothing adds to ${label}, so the class empties.`));
      }
    }
  });
  return found;
}
