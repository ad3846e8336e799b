/**
 * `npm run bench`: what the engine takes for the work of the workbench, as ratios in one run. Prints one
 * line of hardware and one a row; a row missed is told, not an error, since machines differ.
 * `npm run bench -- sweep live` runs only the groups named.
 */
import { hardwareLine } from './hardware';
import type { Row } from './measure';
import { backendRows } from './rows/backends';
import { firstLoadRows } from './rows/first-load';
import { integrationRows } from './rows/integration';
import { liveRows } from './rows/live';
import { sweepRows } from './rows/sweep';
import { compileNative } from './yardsticks/run';

const GROUPS: Readonly<Record<string, () => Row[]>> = {
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

function print(row: Row): void {
  const verdict = row.met === null ? '' : row.met ? 'met' : 'missed';
  const target = row.target === '' ? '' : `(${row.target}${verdict ? `: ${verdict}` : ''})`;
  console.log(`  ${row.name}: ${row.value} ${target}`.trimEnd());
}

const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in GROUPS));
if (unknown.length > 0) {
  console.error(`No such group: ${unknown.join(', ')}. There are: ${Object.keys(GROUPS).join(', ')}.`);
  process.exit(1);
}
console.log(hardwareLine());
console.log('Medians of several rounds; ratios within this run.');
for (const [name, group] of Object.entries(GROUPS)) {
  if (asked.length > 0 && !asked.includes(name)) continue;
  console.log(name);
  group().forEach(print);
}
