/**
 * Builds the kernels in `assembly/` to one WebAssembly module and writes it as TypeScript, `core-bytes.ts`, so that it
 * comes along wherever the engine does: page, worker, command line. Run by `npm run core`, which every
 * command that needs the result runs before; where nothing changed it returns at once.
 */
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const here = dirname(fileURLToPath(import.meta.url));
const assembly = join(here, 'assembly');
const tableaus = join(here, '..', 'integrators', 'tableaus');
const target = join(here, 'core-bytes.ts');

const sources = readdirSync(assembly).filter((name) => name.endsWith('.ts'));
const inputs = [
  fileURLToPath(import.meta.url),
  join(here, 'write-method.mjs'),
  ...sources.map((name) => join(assembly, name)),
  ...['dormand-prince-54.ts', 'dormand-prince-853.ts'].map((name) => join(tableaus, name)),
];
const digest = createHash('sha256');
for (const file of inputs) digest.update(readFileSync(file));
const stamp = `// Written by build-core.mjs from ${digest.digest('hex')}; not to be edited.`;
if (existsSync(target) && readFileSync(target, 'utf8').startsWith(stamp)) process.exit(0);

const asc = await import('assemblyscript/asc').then(
  (module) => module.default,
  () => null,
);
if (asc === null) {
  // An install without development packages runs what was built before.
  if (process.env.npm_lifecycle_event === 'prepare') process.exit(0);
  console.error('The compiled core needs the package assemblyscript. Run npm ci.');
  process.exit(1);
}
const { readTableau, writeMethod } = await import('./write-method.mjs');

/** What is compiled: the sources, and one copy of the step loop with its method for each tableau. */
const files = new Map();
for (const name of sources.filter((one) => one !== 'explicit-steps.ts'))
  files.set(name, readFileSync(join(assembly, name), 'utf8'));
const loop = readFileSync(join(assembly, 'explicit-steps.ts'), 'utf8');
const methods = ['54', '853'];
for (const name of methods) {
  const tableau = await readTableau(join(tableaus, `dormand-prince-${name}.ts`));
  files.set(`method-${name}.ts`, writeMethod(tableau));
  files.set(`explicit-steps-${name}.ts`, loop.replace("'./method'", `'./method-${name}'`));
}
files.set(
  'index.ts',
  [
    ...methods.map((name) => `export { advance as advance${name} } from './explicit-steps-${name}';`),
    "export { eigenvalues } from './eigenvalues';",
    "export { marginCells } from './margin-cells';",
  ].join('\n'),
);

let binary = null;
const messages = [];
const { error } = await asc.main(
  [
    'index.ts',
    '--outFile',
    'core.wasm',
    '--runtime',
    'stub',
    '--importMemory',
    '--optimizeLevel',
    '3',
    '--shrinkLevel',
    '0',
    '--noAssert',
    '--use',
    'abort=',
  ],
  {
    stdout: { write: (text) => messages.push(String(text)) },
    stderr: { write: (text) => messages.push(String(text)) },
    readFile: (name) => files.get(name.replace(/^\.\//, '')) ?? null,
    writeFile: (name, contents) => {
      if (name.endsWith('.wasm')) binary = contents;
    },
    listFiles: () => [],
  },
);
if (error || !binary) {
  console.error(`The compiled core could not be built.\n${messages.join('')}${error?.message ?? ''}`);
  process.exit(1);
}
const text = Buffer.from(binary).toString('base64');
writeFileSync(target, `${stamp}\nexport const CORE_BYTES =\n  '${text}';\n`);
