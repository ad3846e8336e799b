import { readFileSync, renameSync, rmSync, writeFileSync, writeSync } from 'node:fs';
import { parseArgs } from 'node:util';

import { studyJsonSchema } from '@/engine/schema/study';

import { runStudy } from './run-study';

/**
 * The engine from the command line: `npm run --silent batch -- study.json` prints one JSON result on
 * standard output. Problems go to standard error in words, with exit code 1; nothing is then printed or written.
 */
const USAGE = `Usage:
  npm run --silent batch -- study.json              prints the results of a study as JSON
  npm run --silent batch -- -                       reads the study from standard input
  npm run --silent batch -- study.json --out file   writes the results to a file, whole or not at all
  npm run --silent batch -- --schema                prints the JSON Schema of studies
`;

/** A megabyte more than the largest document, for tasks with many times. */
const LARGEST_INPUT = 16 * 1024 * 1024;

class Refusal extends Error {}

function main(argv: readonly string[]): void {
  const { values, positionals } = readArguments(argv);
  if (values.help) return print(USAGE);
  if (values.schema) return print(`${JSON.stringify(studyJsonSchema(), null, 2)}\n`);
  if (positionals.length !== 1) throw new Refusal(`One study is needed.\n${USAGE}`);
  const outcome = runStudy(parse(readText(positionals[0])));
  if (!outcome.ok) throw new Refusal(outcome.problems.join('\n'));
  const text = `${JSON.stringify(outcome.results)}\n`;
  if (values.out === undefined) print(text);
  else writeWhole(values.out, text);
}

function readArguments(argv: readonly string[]) {
  try {
    return parseArgs({
      args: [...argv],
      allowPositionals: true,
      options: {
        out: { type: 'string' },
        schema: { type: 'boolean' },
        help: { type: 'boolean', short: 'h' },
      },
    });
  } catch (error) {
    throw new Refusal(
      `${error instanceof Error ? error.message : 'The arguments could not be read.'}\n${USAGE}`,
    );
  }
}

function readText(path: string): string {
  let text: string;
  try {
    text = readFileSync(path === '-' ? 0 : path, 'utf8');
  } catch {
    throw new Refusal(path === '-' ? 'Standard input could not be read.' : `${path} could not be read.`);
  }
  if (text.length > LARGEST_INPUT)
    throw new Refusal('The study is larger than 16 MiB; split its tasks over several.');
  return text;
}

function parse(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new Refusal(
      `The study is no valid JSON: ${error instanceof Error ? error.message : 'unknown reason'}`,
    );
  }
}

/** Writes beside the file and moves it into place, so that a reader never sees half a result. */
function writeWhole(path: string, text: string): void {
  const beside = `${path}.${process.pid}.part`;
  try {
    writeFileSync(beside, text);
    renameSync(beside, path);
  } catch (error) {
    rmSync(beside, { force: true });
    throw new Refusal(
      `${path} could not be written: ${error instanceof Error ? error.message : 'unknown reason'}`,
    );
  }
}

/** Synchronous and complete, also into a pipe that takes it in parts. */
function print(text: string): void {
  const bytes = Buffer.from(text);
  let written = 0;
  while (written < bytes.length) {
    try {
      written += writeSync(1, bytes, written);
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EAGAIN')) throw error;
    }
  }
}

try {
  main(process.argv.slice(2));
} catch (error) {
  if (!(error instanceof Refusal)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}
