import type { PictureResult } from '@/engine/analyses/contract';

import { cyclesJson } from './cycles';
import { equilibriaJson } from './equilibria';
import type { JsonRecord } from './shared';
import { shiftsJson, sweepJson } from './sweep';

/** @param everyPoint false leaves out the points of branches, and keeps their ends */
export function pictureJson(picture: PictureResult, everyPoint: boolean): JsonRecord {
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
    verdict: sweep.twin && sweep.verdict,
  };
}
