import type { Progress } from '../continuation/contract';
import type { EquilibriaResult } from '../equilibria/contract';
import { flowField } from '../phase-plane/flow-field';
import { makePlaneSlice } from '../phase-plane/plane-slice';
import { zeroGrowthLines } from '../phase-plane/zero-growth-lines';
import type { CompiledModel } from '../system/compile-model';
import type { Exploration, ExploreRequest, EquilibriaPair, PlaneRequest, PlaneResult } from './contract';
import { findEquilibriaPair, followEquilibriaPair } from './equilibria-pair';
import { judgeModel, pairEquilibria } from './judge';
import { sampleTimes, startsOf, trajectoryInSlices } from './trajectories';

/**
 * All that the bench shows of a model at one set of numbers: its trajectory and its twin's, the
 * equilibria followed from those known or sought anew, the phase plane, and the verdict. A generator, so
 * that a newer request can take its place between slices; only one may run on a model at a time,
 * since a system holds its parameters.
 *
 * @param known equilibria of the last look, which `track` follows; null searches anew.
 */
export function* exploreInSlices(
  model: CompiledModel,
  request: ExploreRequest,
  known: EquilibriaPair | null,
): Generator<Progress<never>, Exploration> {
  const { system, twin } = model;
  const p = model.valuesToParameters(request.values);
  const starts = startsOf(model, request);
  const times = sampleTimes(request);
  const at = (fraction: number, stage: string): Progress<never> => ({ fraction, stage, partial: null });

  const run = trajectoryInSlices(system, p, starts, times);
  let step = run.next();
  for (; !step.done; step = run.next()) yield at(0.1, 'Trajectory');
  const trajectory = step.value;

  let twinTrajectory: Exploration['twinTrajectory'] = null;
  if (request.withTwin && twin.system) {
    const twinRun = trajectoryInSlices(twin.system, p, model.toTwinStarts(starts), times);
    let twinStep = twinRun.next();
    for (; !twinStep.done; twinStep = twinRun.next()) yield at(0.3, 'Trajectory of the twin');
    twinTrajectory = twinStep.value;
  }

  let found: EquilibriaPair | null = null;
  if (request.equilibria === 'track' && known) found = followEquilibriaPair(model, p, known);
  else if (request.equilibria !== 'none') {
    const last = trajectory.states.slice(-system.dimension);
    const search = findEquilibriaPair(model, request.values, { starts: [starts, last] });
    let next = search.next();
    for (; !next.done; next = search.next()) yield at(0.5, next.value.stage);
    found = next.value;
  }
  const verdict = found && judgeModel(model, p, found, pairEquilibria(model, p, found));

  system.setParameters(p);
  const plane = request.plane && planeOf(model, request.plane, heldState(found?.split ?? null, starts));
  return {
    trajectory,
    twinTrajectory,
    twinStateSymbols: twin.system?.stateSymbols ?? [],
    equilibria: found?.split ?? null,
    twinEquilibria: found?.twin ?? null,
    plane,
    verdict,
  };
}

/** Runs `exploreInSlices` to its end. */
export function explore(
  model: CompiledModel,
  request: ExploreRequest,
  known: EquilibriaPair | null = null,
): Exploration {
  const run = exploreInSlices(model, request, known);
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
  }
}

/** What a plane holds fixed: the coexistence equilibrium, where its lines then meet, else the start. */
function heldState(
  equilibria: EquilibriaResult | null,
  starts: Float64Array,
): { state: Float64Array; name: string } {
  const coexistence = (equilibria?.equilibria ?? []).filter((one) => one.feasible && one.absent.length === 0);
  const best = coexistence.find((one) => one.attracts === 'yes') ?? coexistence[0];
  if (best) return { state: best.state, name: 'the coexistence equilibrium' };
  return { state: starts, name: 'the start values' };
}

function planeOf(
  model: CompiledModel,
  request: PlaneRequest,
  held: { state: Float64Array; name: string },
): PlaneResult {
  const slice = makePlaneSlice(model.system, request, held.state);
  const { x, y } = request;
  if (!slice)
    return { x, y, lines: [], flow: new Float64Array(0), note: 'These two axes span no plane of states.' };
  const varies = model.system.dimension > 2;
  const note = varies ? `${slice.note} These are the values at ${held.name}.` : slice.note;
  return { x, y, lines: zeroGrowthLines(slice, request), flow: flowField(slice, request), note };
}
