/**
 * `npm run bench`: what the engine takes for the work of the workbench, as ratios in one run. Prints one
 * line of hardware and one a row; a row missed is told, not an error, since machines differ.
 * `npm run bench -- sweep live` runs only the groups named.
 *
 * The rows run as a bundle made by the product's own bundler: what a development loader adds to every
 * function would otherwise be measured too.
 */
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

import { build } from 'vite';

import { hardwareLine } from './hardware';
import type { Row } from './measure';

const root = fileURLToPath(new URL('../../', import.meta.url));

type Groups = Readonly<Record<string, () => Row[]>>;

async function loadGroups(): Promise<Groups> {
  const outDir = join(root, 'node_modules', '.cache', 'bench');
  await build({
    root,
    configFile: false,
    logLevel: 'error',
    resolve: { alias: { '@': join(root, 'src') } },
    build: { ssr: 'tests/bench/groups.ts', outDir, emptyOutDir: true, target: 'node20', minify: false },
  });
  const bundle = (await import(pathToFileURL(join(outDir, 'groups.js')).href)) as { GROUPS: Groups };
  return bundle.GROUPS;
}

function print(row: Row): void {
  const verdict = row.met === null ? '' : row.met ? ': met' : ': missed';
  const target = row.target === '' ? '' : `(${row.target}${verdict})`;
  console.log(`  ${row.name}: ${row.value} ${target}`.trimEnd());
}

process.chdir(root);
const groups = await loadGroups();
const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in groups));
if (unknown.length > 0) {
  console.error(`No such group: ${unknown.join(', ')}. There are: ${Object.keys(groups).join(', ')}.`);
  process.exit(1);
}
console.log(hardwareLine());
console.log('Fastest of each round, medians of several rounds; ratios within this run.');
for (const [name, group] of Object.entries(groups)) {
  if (asked.length > 0 && !asked.includes(name)) continue;
  console.log(name);
  group().forEach(print);
}
