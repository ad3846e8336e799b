import { act, screen, within } from '@testing-library/react';
import { beforeAll, describe, expect, it } from 'vitest';

import type { PictureResult } from '@/engine/analyses/contract';
import type { Trajectory } from '@/engine/integrators/contract';
import { cycleEvidence } from '@/features/workbench/cycles/cycle-evidence';
import { cyclesAt } from '@/features/workbench/cycles/present-cycles';
import { pictureTable } from '@/features/workbench/dialogs/picture-table';
import { studyOf, studyTasks } from '@/features/workbench/dialogs/study-tasks';
import {
  readParameterValues,
  readStarts,
  readTaskValues,
  withParameterValue,
} from '@/features/workbench/engine/parameter-values';
import { hasUnfollowedCycles, pictureTask } from '@/features/workbench/engine/picture-task';
import { BranchesCard } from '@/features/workbench/findings/branches-card';
import { CyclesCard } from '@/features/workbench/findings/cycles-card';
import { DensityCard } from '@/features/workbench/findings/density-card';
import { lowInTrajectory, lowOnCycles, warningThreshold } from '@/features/workbench/findings/low-densities';
import { SpecialPointsCard } from '@/features/workbench/findings/special-points-card';
import { VerdictCard } from '@/features/workbench/findings/verdict-card';
import { planeSpec } from '@/features/workbench/panes/views/plane-spec';
import { spaceSpec } from '@/features/workbench/panes/space/space-spec';
import { ringIndices } from '@/features/workbench/panes/space/space-cycles';
import type { WorkbenchData } from '@/features/workbench/state/store';
import { studySchema } from '@/engine/schema/study';
import { PALETTES } from '@/graphics/palette';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';
import { seasonalGrowth } from '@/presets/seasonal-growth';
import { createLocalEngine } from '@/workers/local-engine';
import type { PresetDocument } from '@/engine/schema/preset';

import { renderOnBench } from './support';

/** A bench as the driver leaves it after a sweep. */
async function swept(document: PresetDocument, parameter: string, from: number, to: number) {
  const engine = createLocalEngine();
  const report = await engine.setModel(document);
  const selection = { parameter, from, to };
  const values = readParameterValues(document);
  const request = { ...selection, values, starts: readStarts(document), withTwin: true };
  const task = pictureTask(request, document, readTaskValues(document, report));
  const picture = await engine.analyse(1, task, () => undefined);
  const result = await engine.explore({
    values,
    starts: request.starts,
    horizon: 2_000,
    samples: 20_001,
    withTwin: true,
    equilibria: 'search',
    plane: null,
  });
  const data: Partial<WorkbenchData> = {
    report,
    shownReport: report,
    shownDocument: document,
    result,
    sweep: picture.sweep,
    cycles: picture.cycles,
    verdict: picture.sweep.verdict,
    picture,
    sweepSelection: selection,
  };
  return { data, picture, result };
}

const predator = saturatingTwoSexPredator;
let bench: Awaited<ReturnType<typeof swept>>;
let season: Awaited<ReturnType<typeof swept>>;
beforeAll(async () => {
  bench = await swept(predator, 'K', 0.2, 4);
  season = await swept(seasonalGrowth, 'c', 0, 1);
}, 120_000);

function show(children: React.ReactNode, { data }: { readonly data: Partial<WorkbenchData> }) {
  const view = renderOnBench(children, data.shownDocument ?? predator);
  act(() => view.store.getState().set(data));
  return view;
}

describe('amplitude and lowest density in the verdict', () => {
  it('agree with the long run of the integrator', () => {
    const { split, twin } = bench.picture.cycles;
    const rows = cycleEvidence(predator, cyclesAt(split, 1.8), twin ? cyclesAt(twin, 1.8) : []);
    const tail = (trajectory: Trajectory, i: number) => {
      const values = Array.from(
        { length: 10_000 },
        (_value, k) => trajectory.states[(10_001 + k) * trajectory.dimension + i] ?? NaN,
      );
      return { low: Math.min(...values), high: Math.max(...values) };
    };
    const own = tail(bench.result.trajectory, 0);
    const pooled = bench.result.twinTrajectory ? tail(bench.result.twinTrajectory, 0) : null;
    const amplitude = rows.find((row) => row.label === 'cycle amplitude, midges');
    const lowest = rows.find((row) => row.label === 'cycle lowest, midges');
    const near = (a: number | null | undefined, b: number) => expect((a ?? NaN) / b).toBeCloseTo(1, 1.5);
    near(amplitude?.split, own.high - own.low);
    near(lowest?.split, own.low);
    near(amplitude?.pooled, (pooled?.high ?? NaN) - (pooled?.low ?? NaN));
    near(lowest?.pooled, pooled?.low ?? NaN);
  });

  it('say which side has no cycle, and nothing where neither has one', () => {
    const { split, twin } = bench.picture.cycles;
    const at = (value: number) =>
      cycleEvidence(predator, cyclesAt(split, value), twin ? cyclesAt(twin, value) : []);
    expect(at(1.35).at(-1)?.note).toContain('No cycle attracts pooled');
    expect(at(1.35)[0]?.pooled).toBeNull();
    expect(at(1)).toHaveLength(0);
  });

  it('stand on the card beside the evidence of the equilibria', () => {
    show(<VerdictCard />, bench);
    const card = screen.getByRole('region', { name: 'Does the split stabilise?' });
    expect(within(card).getByRole('rowheader', { name: /cycle lowest, spiders/ })).toBeInTheDocument();
    expect(within(card).getByRole('rowheader', { name: /onset of cycles \(Hopf\)/ })).toBeInTheDocument();
  });
});

describe('the cycles at the present value', () => {
  it('are told with period, multipliers and stability, and follow the strip', () => {
    const { store } = show(<CyclesCard />, bench);
    const card = screen.getByRole('region', { name: 'Cycles' });
    expect(card).toHaveTextContent(/Period 20\.\d+ week/i);
    expect(card).toHaveTextContent(/The trivial one is 1 to/);
    expect(within(card).getAllByText('attracts')).toHaveLength(2);
    act(() => store.getState().edit('Move K', (document) => withParameterValue(document, 'K', 1)));
    expect(screen.getByRole('region', { name: 'Cycles' })).toHaveTextContent(
      /No cycle was followed to this value/,
    );
  });

  it('are loops in the phase plane and space, the twin’s grey', () => {
    const { store } = show(null, bench);
    const input = { state: store.getState(), model: predator, palette: PALETTES.light, axes: [] };
    const loops = planeSpec(input).lines.filter((line) => line.id.startsWith('cycle:'));
    expect(loops.map((line) => [line.twin, line.dash])).toEqual([
      [true, undefined],
      [false, undefined],
    ]);
    expect(loops[0]?.colour).toBe(PALETTES.light.twin);
    const trajectory = planeSpec(input).lines.find((line) => line.id === 'trajectory');
    const highest = Math.max(...(trajectory?.x.slice(15_000) ?? []));
    expect(Math.max(...(loops[1]?.x ?? [])) / highest).toBeCloseTo(1, 1.5);
    const rings = spaceSpec('space-diagram', input).lines.filter((line) => line.id.includes(':ring:'));
    expect(rings.some((line) => line.twin)).toBe(true);
    expect(rings.length).toBeGreaterThan(10);
    expect(rings.length).toBeLessThanOrEqual(32);
  });

  it('are not drawn where they were followed at other numbers', () => {
    const { store } = show(null, { data: { ...bench.data, sweepOutdated: true } });
    const spec = planeSpec({ state: store.getState(), model: predator, palette: PALETTES.light, axes: [] });
    expect(spec.lines.some((line) => line.id.startsWith('cycle:'))).toBe(false);
  });

  it('spread rings evenly, the ends among them', () => {
    const parameters = Float64Array.from({ length: 101 }, (_value, k) => (k / 100) ** 2);
    const chosen = ringIndices(parameters, 5).map((k) => parameters[k] ?? NaN);
    expect(chosen[0]).toBe(0);
    expect(chosen.at(-1)).toBe(1);
    chosen.forEach((value, k) => expect(value).toBeCloseTo(k / 4, 1));
  });
});

describe('models with explicit time', () => {
  it('show the fixed points of the period map in place of equilibria', () => {
    show(<CyclesCard />, season);
    const card = screen.getByRole('region', { name: 'Fixed points of the period map' });
    expect(card).toHaveTextContent(/Repeats after 12\.00 month/i);
    expect(within(card).getAllByRole('columnheader', { name: 'at t = 0' }).length).toBeGreaterThan(0);
    // Without prey the multipliers are exp(r T) of the prey and exp(-m T) of the predator.
    expect(card).toHaveTextContent(Math.exp(0.25 * 12).toPrecision(3));
    expect(card).toHaveTextContent(Math.exp(-0.12 * 12).toPrecision(3));
  });
});

describe('special points and ends of branches', () => {
  it('give the reason of every end', async () => {
    const { user } = show(<BranchesCard />, bench);
    await user.click(screen.getByText('How far they reach, and why they end'));
    const [list] = screen.getAllByRole('list');
    const rows = within(list ?? document.body).getAllByRole('listitem');
    expect(rows).toHaveLength(4);
    expect(rows.at(-1)).toHaveTextContent(/Cycles from the Hopf point at 1\.325/);
    expect(rows.at(-1)).toHaveTextContent('The end of the range, 4, was reached.');
  });

  it('open to period, multipliers and lowest densities', async () => {
    const { split } = bench.picture.cycles;
    const [branch] = split.branches;
    if (!branch) throw new Error('There is a branch.');
    const made = {
      ...split,
      specialPoints: [
        {
          id: 'cycle-1',
          kind: 'period doubling' as const,
          parameter: 2,
          period: 21.5,
          multipliers: [
            { re: 1 + 2e-9, im: 0 },
            { re: -1, im: 0 },
            { re: 0.25, im: 0 },
          ],
          branch: 0,
          index: 10,
          accuracy: 1e-9,
          feasible: true,
          lowest: Float64Array.of(1e-11, 0.2, 0.3, 0.5),
          highest: Float64Array.of(1, 1, 1, 2),
          angle: null,
          meaning: 'A cycle of twice the period branches off.',
        },
      ],
    };
    const { user, store } = show(<SpecialPointsCard />, {
      data: { ...bench.data, cycles: { split: made, twin: null } },
    });
    await user.click(screen.getByRole('button', { name: 'period doubling' }));
    expect(store.getState().document.parameters.find((one) => one.symbol === 'K')?.value).toBe(2);
    const card = screen.getByRole('region', { name: 'Special points' });
    expect(card).toHaveTextContent('Period 21.500 week');
    expect(card).toHaveTextContent('Multipliers −1.00; 0.250');
    expect(card).toHaveTextContent('The trivial one is 1 to 2 × 10⁻⁹');
    expect(card).toHaveTextContent('midges 1.00 × 10⁻¹¹');
  });
});

describe('low densities', () => {
  const decay = (): Trajectory => {
    const times = Float64Array.from({ length: 401 }, (_value, k) => k / 100);
    const states = new Float64Array(3 * times.length);
    times.forEach((t, k) => states.set([Math.exp(-t), 1, 0], 3 * k));
    const rest = { evaluations: 0, steps: 0, rejected: 0 };
    return { status: 'complete', message: '', times, states, dimension: 3, ...rest };
  };

  it('are found with the time of falling below; what is absent is no warning', () => {
    const found = lowInTrajectory(decay(), ['x', 'y', 'z'], 'split', Math.exp(-1.505));
    expect(found).toHaveLength(1);
    expect(found[0]?.symbol).toBe('x');
    expect(found[0]?.time).toBeCloseTo(1.505, 4);
    expect(found[0]?.lowest).toBeCloseTo(Math.exp(-4), 12);
  });

  it('count attracting cycles alone', () => {
    const present = cyclesAt(bench.picture.cycles.split, 1.8);
    const symbols = ['x', 'y1', 'y2'];
    expect(lowOnCycles(present, symbols, 'split', 0.1).map((low) => low.symbol)).toEqual(['x', 'y1']);
    const repelling = present.map((one) => ({ ...one, attracts: 0 }));
    expect(lowOnCycles(repelling, symbols, 'split', 0.1)).toHaveLength(0);
  });

  it('are below one individual unless a threshold is set', async () => {
    expect(warningThreshold({ lowDensity: null, individualsPerUnit: 50 })).toBe(0.02);
    expect(warningThreshold({ lowDensity: 0.3, individualsPerUnit: 50 })).toBe(0.3);
    expect(warningThreshold({ lowDensity: null, individualsPerUnit: null })).toBeNull();
    const { user, store } = show(<DensityCard />, bench);
    const field = screen.getByRole('textbox', { name: 'Warn below' });
    await user.type(field, '0.1');
    await user.tab();
    expect(store.getState().document.lowDensity).toBe(0.1);
    const card = screen.getByRole('region', { name: 'Low densities' });
    expect(card).toHaveTextContent(/midges: lowest on the attracting cycle 0\.02/);
    expect(card).toHaveTextContent(/Pooled twin, midges: lowest on the attracting cycle 0\.04/);
    act(() => store.getState().undo());
    expect(store.getState().document.lowDensity).toBeNull();
  });
});

describe('the full picture', () => {
  it('becomes a table with a row for each thing found, pooled after split', () => {
    const table = pictureTable(bench.picture.summary, 'K');
    expect(table.rows).toHaveLength(bench.picture.summary.length);
    expect(table.rows.map((row) => row[0]).filter((one, k, all) => one !== all[k - 1])).toEqual([
      'split',
      'pooled',
    ]);
    const hopf = table.rows.find((row) => row[1] === 'Hopf');
    expect(hopf?.[2]).toBeCloseTo(1.3248, 3);
  });

  it('asks for integrated bands only where no cycle was followed from a Hopf point', () => {
    expect(hasUnfollowedCycles(bench.picture)).toBe(false);
    const without: PictureResult = {
      ...bench.picture,
      cycles: { ...bench.picture.cycles, split: { ...bench.picture.cycles.split, branches: [] } },
    };
    expect(hasUnfollowedCycles(without)).toBe(true);
  });

  it('is among the tasks of an exported study, which batch accepts', () => {
    const tasks = studyTasks(predator, { parameter: 'K', from: 0.2, to: 4 }).map((one) => one.task);
    expect(tasks.map((one) => one.task)).toEqual(['trajectory', 'equilibria', 'sweep', 'cycles', 'picture']);
    expect(studySchema.safeParse(studyOf(predator, tasks)).success).toBe(true);
  });
});
