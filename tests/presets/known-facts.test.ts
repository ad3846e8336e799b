import { describe, expect, it } from 'vitest';

import { compileModel } from '@/engine/system/compile-model';
import { STARTER_PRESETS } from '@/presets/index';

import { onlyResult } from '../support/study';

describe('every starter preset', () => {
  it('is a dozen at least, each with known facts', () => {
    expect(STARTER_PRESETS.length).toBeGreaterThanOrEqual(12);
    for (const { id, document } of STARTER_PRESETS) {
      expect(document.knownFacts.length, id).toBeGreaterThan(0);
      for (const fact of document.knownFacts) expect(fact.source.length, id).toBeGreaterThan(10);
    }
  });

  it.each(STARTER_PRESETS.map((one) => [one.id, one.document] as const))(
    '%s compiles without errors',
    (_id, document) => {
      const compiled = compileModel(document);
      if (!compiled.ok) throw new Error(JSON.stringify(compiled.diagnostics));
      expect(compiled.model.report.diagnostics.filter((one) => one.severity === 'error')).toEqual([]);
    },
  );
});

describe('known facts of starter presets', () => {
  const facts = STARTER_PRESETS.flatMap(({ id, document }) =>
    document.knownFacts.map((fact, k) => [`${id}, fact ${k + 1}: ${fact.kind}`, document, fact] as const),
  );
  it.each(facts)('%s', (_name, preset, fact) => {
    const { parameters } = fact;
    if (fact.kind === 'equilibrium') {
      const { split } = onlyResult({ preset, tasks: [{ task: 'equilibria', parameters, twin: false }] });
      const match = split.equilibria.find((one) =>
        Object.entries(fact.at).every(
          ([symbol, value]) => Math.abs(one.state[symbol] - value) <= fact.tolerance,
        ),
      );
      expect(match, JSON.stringify(split.equilibria.map((one) => one.state))).toBeDefined();
      if (fact.type !== null) expect(match?.type).toBe(fact.type);
    } else if (fact.kind === 'special-point') {
      const { split, twin } = onlyResult({
        preset,
        tasks: [{ task: 'sweep', ...fact.sweep, parameters, bands: false, branches: false }],
      });
      const side = fact.of === 'twin' ? twin : split;
      const found = (side?.specialPoints ?? []).filter((one) => one.kind === fact.point);
      const gap = Math.min(...found.map((one) => Math.abs(one.parameter - fact.value)));
      expect(gap, JSON.stringify(found)).toBeLessThanOrEqual(fact.tolerance);
    } else if (fact.kind === 'trajectory') {
      const { starts, time, at, tolerance } = fact;
      const task = { task: 'trajectory', parameters, starts, times: [time], relativeTolerance: 1e-10 };
      const { split } = onlyResult({ preset, tasks: [task] });
      for (const [symbol, value] of Object.entries(at))
        expect(Math.abs(split.states[symbol][0] - value), symbol).toBeLessThanOrEqual(
          tolerance * Math.abs(value),
        );
    } else {
      const { verdict } = onlyResult({ preset, tasks: [{ task: 'equilibria', parameters }] });
      expect(verdict?.answer).toBe(fact.answer);
    }
  });
});
