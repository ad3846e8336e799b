import type { Row } from './measure';
import { backendRows } from './rows/backends';
import { cycleBranchRows } from './rows/cycle-branch';
import { eigenvalueRows } from './rows/eigenvalues';
import { firstLoadRows } from './rows/first-load';
import { growthRows } from './rows/growth';
import { integrationRows } from './rows/integration';
import { liveRows } from './rows/live';
import { mapCellRows } from './rows/map-cells';
import { sweepRows } from './rows/sweep';
import { twoWorkerRows } from './rows/two-workers';
import { compileNative } from './yardsticks/run';

/** Groups of rows by the name under which they can be asked for alone. */
export const GROUPS: Readonly<Record<string, () => Row[]>> = {
  live: liveRows,
  sweep: sweepRows,
  integration: () => {
    const native = compileNative();
    try {
      return integrationRows(native);
    } finally {
      native?.dispose();
    }
  },
  'map-cells': mapCellRows,
  eigenvalues: eigenvalueRows,
  'cycle-branch': cycleBranchRows,
  growth: growthRows,
  workers: twoWorkerRows,
  backends: backendRows,
  'first-load': firstLoadRows,
};
