import { spawnSync } from 'node:child_process';
import path from 'node:path';

import { describe, expect, it } from 'vitest';

import { integrateTo } from '@/engine/integrators/driver';
import type { MethodName } from '@/engine/integrators/contract';
import { listClasses } from '@/engine/schema/document-symbols';
import type { PresetDocument } from '@/engine/schema/preset';
import { traitEntrySymbol } from '@/engine/schema/symbols';
import { compileModel } from '@/engine/system/compile-model';
import { STARTER_PRESETS } from '@/presets/index';

/** Trajectories of every starter preset against SciPy's solve_ivp (DOP853), fed with the processes as written. */

const SCRIPT = path.resolve(import.meta.dirname, '../reference/integrate_starters.py');
const installed = spawnSync('python3', ['-c', 'import scipy']).status === 0;
const METHODS: readonly MethodName[] = ['auto', 'dormand-prince-853', 'odex', 'rodas'];

function timesOf(document: PresetDocument): number[] {
  // Chaotic and saddle-like runs part from each other in the end, whatever the method.
  const end = Math.min(document.horizon, 120);
  return Array.from({ length: 25 }, (_, k) => (end * k) / 24);
}

/** The document as the script reads it: values and processes, with no derivation of ours. */
function forScript(document: PresetDocument): unknown {
  const classes = listClasses(document);
  const values: Record<string, number> = {};
  for (const one of document.parameters) values[one.symbol] = one.value;
  for (const trait of document.traits)
    for (const entry of trait.entries) values[traitEntrySymbol(trait.symbol, entry.of)] = entry.value;
  return {
    states: classes.map((one) => one.class.symbol),
    values,
    totals: Object.fromEntries(
      document.populations
        .filter((one) => !one.classes.some(({ symbol }) => symbol === one.symbol))
        .map((one) => [one.symbol, one.classes.map(({ symbol }) => symbol)]),
    ),
    intermediates: document.intermediates.map((one) => [one.symbol, one.formula]),
    processes: document.processes.map((one) => [
      one.rate,
      one.effects.map((effect) => [effect.class, effect.amount]),
    ]),
    starts: classes.map((one) => one.class.start),
    times: timesOf(document),
  };
}

describe.runIf(installed)('starter presets against SciPy', () => {
  const documents = STARTER_PRESETS.map((one) => one.document);
  const answer = spawnSync('python3', [SCRIPT], {
    input: JSON.stringify(documents.map(forScript)),
    encoding: 'utf8',
    maxBuffer: 1e8,
  });
  const expected = JSON.parse(answer.stdout || '[]') as (number[][] | null)[];

  it.each(documents.map((document, k) => [document.title, k] as const))('%s', (_title, k) => {
    const document = documents[k]!;
    const compiled = compileModel(document);
    if (!compiled.ok) throw new Error('the preset does not compile');
    const { system } = compiled.model;
    const reference = expected[k];
    if (!reference) throw new Error(`SciPy gave no answer. ${answer.stderr}`);
    const starts = Float64Array.from(listClasses(document), (one) => one.class.start);
    const times = Float64Array.from(timesOf(document));
    for (const method of METHODS) {
      const run = integrateTo(system, starts, times, {
        method,
        relativeTolerance: method === 'rodas' ? 1e-8 : 1e-10,
        absoluteTolerance: 1e-13,
      });
      expect(run.status, method).toBe('complete');
      const n = system.dimension;
      for (let i = 0; i < n; i += 1) {
        const size = Math.max(...reference.map((row) => Math.abs(row[i]!)));
        const error = Math.max(...reference.map((row, at) => Math.abs(run.states[at * n + i]! - row[i]!)));
        expect(error / size, `${method}, state ${i}`).toBeLessThan(method === 'rodas' ? 1e-4 : 1e-6);
      }
    }
  });
});
