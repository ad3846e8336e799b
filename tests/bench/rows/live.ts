import type { EquilibriaPair, ExploreRequest } from '../../../src/engine/explore/contract';
import { explore } from '../../../src/engine/explore/explore';
import type { PresetDocument } from '../../../src/engine/schema/preset';
import { compileModel, type CompiledModel } from '../../../src/engine/system/compile-model';
import { saturatingTwoSexPredator } from '../../../src/presets/saturating-two-sex-predator';
import { atMost, milliseconds, time, type Row } from '../measure';

const LIMIT = 50;
const SAMPLES = 600;

/** Editing a formula and dragging a slider, with a three-class starter preset, engine time alone. */
export function liveRows(): Row[] {
  const document = saturatingTwoSexPredator;
  let edits = 0;
  // Every edit is a text not seen before, so that nothing can be remembered.
  const edit = (): CompiledModel => compile(withEditedRate(document, 1 + 1e-6 * (edits += 1)));
  const toTrajectory = time(() => {
    const model = edit();
    explore(model, request(model, 'none'));
  }).median;
  const toPicture = time(() => {
    const model = edit();
    void model.report;
    explore(model, request(model, 'search'));
  }).median;

  const drag = time(starterDrags()).median;
  return [
    atMost('edit of a formula to the trajectory, text to numbers', toTrajectory, LIMIT, milliseconds),
    atMost(
      'edit of a formula to the first picture, equilibria and twin included',
      toPicture,
      LIMIT,
      milliseconds,
    ),
    atMost('drag of a slider: trajectory, equilibria, plane and twin anew', drag, LIMIT, milliseconds),
  ];
}

/** One drag of a slider a call: a new value, everything that the bench shows anew. */
export function starterDrags(): () => void {
  const document = saturatingTwoSexPredator;
  const model = compile(document);
  const known = explore(model, request(model, 'search'));
  let pair: EquilibriaPair | null = known.equilibria && {
    split: known.equilibria,
    twin: known.twinEquilibria,
  };
  const [swept] = document.sweeps;
  const key = swept?.parameter ?? document.parameters[0]?.symbol ?? '';
  const index = model.parameterIndex(key);
  const base = model.system.defaults[index] ?? 0;
  const width = swept ? swept.to - swept.from : Math.abs(base);
  let drags = 0;
  return () => {
    drags += 1;
    const value = base + 0.02 * width * Math.sin(drags);
    const seen = explore(model, { ...request(model, 'track'), values: { [key]: value } }, pair);
    if (seen.equilibria) pair = { split: seen.equilibria, twin: seen.twinEquilibria };
  };
}

function compile(document: PresetDocument): CompiledModel {
  const compiled = compileModel(document);
  if (!compiled.ok) throw new Error(compiled.diagnostics.map((one) => one.message).join(' '));
  return compiled.model;
}

function withEditedRate(document: PresetDocument, factor: number): PresetDocument {
  const processes = document.processes.map((process, k) =>
    k === 0 ? { ...process, rate: `${factor}*(${process.rate})` } : process,
  );
  return { ...document, processes };
}

function request(model: CompiledModel, equilibria: ExploreRequest['equilibria']): ExploreRequest {
  const [x = '', y = x] = model.system.stateSymbols;
  const starts = Array.from(model.starts);
  const top = (i: number): number => 4 * Math.max(starts[i] ?? 0, 0.1);
  return {
    values: {},
    starts,
    horizon: model.document.horizon,
    samples: SAMPLES,
    withTwin: true,
    equilibria,
    plane:
      equilibria === 'none'
        ? null
        : { x, y, xRange: [0, top(0)], yRange: [0, top(1)], cells: 48, arrows: 16 },
  };
}
