import { describe, expect, it } from 'vitest';

import { sweep } from '@/engine/continuation/sweep';
import { integrateTo } from '@/engine/integrators/driver';
import type { KnownFact } from '@/engine/schema/preset';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';
import type { CompiledSystem } from '@/engine/system/contract';
import { explore } from '@/engine/explore/explore';
import { STARTER_PRESETS } from '@/presets';

function finish<T>(run: Generator<unknown, T>): T {
  let step = run.next();
  while (!step.done) step = run.next();
  return step.value;
}

function compiled(id: string): CompiledModel {
  const document = STARTER_PRESETS.find((one) => one.id === id)?.document;
  if (!document) throw new Error(id);
  const result = compileModel(document);
  if (!result.ok) throw new Error(result.diagnostics.map((one) => one.message).join('; '));
  return result.model;
}

type Fact<K extends KnownFact['kind']> = Extract<KnownFact, { kind: K }>;

/** What the workbench shows of a model: a thorough look, with the verdict. */
function look(model: CompiledModel, values: Readonly<Record<string, number>>) {
  return explore(model, {
    values,
    starts: [...model.starts],
    horizon: 1,
    samples: 2,
    withTwin: true,
    equilibria: 'search',
    plane: null,
  });
}

function checkEquilibrium(model: CompiledModel, fact: Fact<'equilibrium'>): void {
  const equilibria = look(model, fact.parameters).equilibria?.equilibria ?? [];
  const near = equilibria.find((one) =>
    Object.entries(fact.at).every(([symbol, value]) => {
      const found = one.state[model.system.stateSymbols.indexOf(symbol)] ?? NaN;
      return Math.abs(found - value) <= fact.tolerance * Math.max(1, Math.abs(value));
    }),
  );
  expect(near, `an equilibrium at ${JSON.stringify(fact.at)}`).toBeDefined();
  if (fact.type !== null) expect(near?.type).toBe(fact.type);
}

function checkSpecialPoint(model: CompiledModel, fact: Fact<'special-point'>): void {
  const twin = fact.of === 'twin';
  const system: CompiledSystem | null = twin ? model.twin.system : model.system;
  if (system === null) throw new Error('There is no twin.');
  const result = finish(
    sweep(system, model.valuesToParameters(fact.parameters), {
      parameterIndex: system.parameterKeys.indexOf(fact.sweep.parameter),
      from: fact.sweep.from,
      to: fact.sweep.to,
      starts: [twin ? model.toTwinStarts(model.starts) : model.starts],
      bands: false,
    }),
  );
  const distances = result.specialPoints
    .filter((point) => point.kind === fact.point)
    .map((point) => Math.abs(point.parameter - fact.value));
  expect(Math.min(...distances)).toBeLessThanOrEqual(fact.tolerance);
}

function checkTrajectory(model: CompiledModel, fact: Fact<'trajectory'>): void {
  const { system } = model;
  system.setParameters(model.valuesToParameters(fact.parameters));
  const starts = Float64Array.from(
    system.stateSymbols,
    (symbol, i) => fact.starts[symbol] ?? model.starts[i] ?? 0,
  );
  const run = integrateTo(system, starts, Float64Array.of(0, fact.time), { relativeTolerance: 1e-10 });
  for (const [symbol, value] of Object.entries(fact.at)) {
    const found = run.states[system.dimension + system.stateSymbols.indexOf(symbol)] ?? NaN;
    expect(Math.abs(found - value)).toBeLessThanOrEqual(fact.tolerance * Math.max(1, Math.abs(value)));
  }
}

function checkFact(model: CompiledModel, fact: KnownFact): void {
  switch (fact.kind) {
    case 'equilibrium':
      return checkEquilibrium(model, fact);
    case 'special-point':
      return checkSpecialPoint(model, fact);
    case 'trajectory':
      return checkTrajectory(model, fact);
    case 'verdict':
      expect(look(model, fact.parameters).verdict?.answer).toBe(fact.answer);
  }
}

describe.each(STARTER_PRESETS.map(({ id, document }) => ({ id, document })))(
  'starter $id',
  ({ id, document }) => {
    it('compiles without an error or a warning', () => {
      const marks = compiled(id).report.diagnostics.filter((one) => one.severity !== 'note');
      expect(marks.map((one) => one.message)).toEqual([]);
    });

    it('has facts to check, each with its source', () => {
      expect(document.knownFacts.length).toBeGreaterThan(0);
      for (const fact of document.knownFacts) expect(fact.source).not.toBe('');
    });

    it.each(
      document.knownFacts.map((fact, index) => ({
        index,
        fact,
        name: `${fact.kind} ${JSON.stringify('at' in fact ? fact.at : fact)}`.slice(0, 90),
      })),
    )('fact $index: $name', ({ fact }) => checkFact(compiled(id), fact));
  },
);
