import type { Row } from './measure';
import { backendRows } from './rows/backends';
import { firstLoadRows } from './rows/first-load';
import { integrationRows } from './rows/integration';
import { liveRows } from './rows/live';
import { sweepRows } from './rows/sweep';
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
  backends: backendRows,
  'first-load': firstLoadRows,
};
