import type { PictureResult } from '@/engine/analyses/contract';
import type { PictureTask } from '@/engine/schema/analysis-tasks';

import { cyclesJson } from './cycles';
import { equilibriaJson } from './equilibria';
import type { JsonRecord } from './shared';
import { shiftsJson, sweepJson } from './sweep';

export function pictureJson(picture: PictureResult, task: PictureTask): JsonRecord {
  const everyPoint = task.branches;
  const { equilibria, sweep, cycles } = picture;
  const detail = { branches: everyPoint, orbits: false };
  return {
    status: picture.status,
    message: picture.message,
    summary: picture.summary,
    split: {
      equilibria: equilibriaJson(sweep.split.stateSymbols, equilibria.split),
      sweep: sweepJson(sweep.split, everyPoint),
      cycles: cyclesJson(cycles.split, detail),
    },
    twin: sweep.twin && {
      equilibria: equilibria.twin && equilibriaJson(sweep.twin.stateSymbols, equilibria.twin),
      sweep: sweepJson(sweep.twin, everyPoint),
      cycles: cycles.twin && cyclesJson(cycles.twin, detail),
    },
    shifts: shiftsJson(sweep),
    verdict: task.twin ? sweep.verdict : null,
  };
}
