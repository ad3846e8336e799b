import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** The bench runs at the root of the project. */
const here = (file: string): string => join('tests', 'bench', 'yardsticks', file);

export interface NativeRun {
  readonly milliseconds: number;
  readonly steps: number;
  readonly state: readonly number[];
}

export interface NativeYardstick {
  run(classes: 3 | 8, tolerance: number, end: number): NativeRun;
  dispose(): void;
}

/** Compiles the C yardstick into a temporary folder; null where the machine has no C compiler. */
export function compileNative(roundMilliseconds = 150): NativeYardstick | null {
  const folder = mkdtempSync(join(tmpdir(), 'bench-'));
  const binary = join(folder, 'dormand-prince-54');
  const discard = (): void => rmSync(folder, { recursive: true, force: true });
  try {
    execFileSync('cc', ['-O3', '-march=native', '-o', binary, here('dormand-prince-54.c'), '-lm'], {
      stdio: 'pipe',
    });
  } catch {
    discard();
    return null;
  }
  return {
    run(classes, tolerance, end) {
      const words = [classes, tolerance, end, roundMilliseconds].map(String);
      const [milliseconds = NaN, steps = NaN, ...state] = numbers(
        execFileSync(binary, words, { encoding: 'utf8' }),
      );
      return { milliseconds, steps, state };
    },
    dispose: discard,
  };
}

export interface PythonSweep {
  readonly milliseconds: number;
  readonly points: number;
  readonly hopf: readonly number[];
}

/** Runs the NumPy sweep; null where python3 or NumPy is missing. */
export function runPythonSweep(points: number): PythonSweep | null {
  try {
    const output = execFileSync('python3', [here('sweep.py'), String(points)], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
      env: { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' },
    });
    const [milliseconds = NaN, count = NaN, ...hopf] = numbers(output);
    return { milliseconds, points: count, hopf };
  } catch {
    return null;
  }
}

function numbers(text: string): number[] {
  return text.trim().split(/\s+/).map(Number);
}
