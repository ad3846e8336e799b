import type { Trajectory } from '@/engine/integrators/contract';
import type { CompiledSystem } from '@/engine/system/contract';

import { seriesByName, type Json } from './shared';

/** @param skipFirst leaves out the start time where it was not asked for */
export function trajectoryJson(system: CompiledSystem, trajectory: Trajectory, skipFirst: boolean): Json {
  const skip = skipFirst ? 1 : 0;
  return {
    status: trajectory.status,
    message: trajectory.message,
    times: Array.from(trajectory.times).slice(skip),
    states: seriesByName(system.stateSymbols, trajectory.states, trajectory.times.length, skip),
    steps: trajectory.steps,
    evaluations: trajectory.evaluations,
  };
}
