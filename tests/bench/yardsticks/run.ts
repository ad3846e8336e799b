import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';

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
      env: ONE_THREAD,
    });
    const [milliseconds = NaN, count = NaN, ...hopf] = numbers(output);
    return { milliseconds, points: count, hopf };
  } catch {
    return null;
  }
}

/** A matrix of n rows by NumPy on one thread; null where python3 or NumPy is missing. */
export function runPythonEigenvalues(n: number): { milliseconds: number; leading: number } | null {
  const found = runPython('eigenvalues.py', [n, 400]);
  return found && { milliseconds: found[0] ?? NaN, leading: found[1] ?? NaN };
}

/** Three classes by LSODA, one run a tolerance; null where python3 or SciPy is missing. */
export function runLsoda(
  end: number,
  tolerances: readonly number[],
): { milliseconds: number; state: readonly number[] }[] | null {
  const found = runPython('lsoda.py', [end, 300, ...tolerances]);
  return (
    found &&
    tolerances.map((_, k) => {
      const [milliseconds = NaN, ...state] = found.slice(4 * k, 4 * k + 4);
      return { milliseconds, state };
    })
  );
}

function runPython(file: string, words: readonly number[]): number[] | null {
  try {
    const output = execFileSync('python3', [here(file), ...words.map(String)], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
      env: ONE_THREAD,
    });
    return numbers(output);
  } catch {
    return null;
  }
}

const ONE_THREAD = { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' };

export interface MapYardstick {
  run(
    classes: 3 | 8,
    columns: number,
    rows: number,
    start: readonly number[],
  ): { milliseconds: number; sum: number };
  dispose(): void;
}

/**
 * The C yardstick of map cells with LAPACK: the machine's own, else the one inside SciPy, whose names have a prefix.
 * Null where there is no compiler or no LAPACK.
 */
export function compileMapCells(): MapYardstick | null {
  const folder = mkdtempSync(join(tmpdir(), 'bench-'));
  const binary = join(folder, 'map-cells');
  for (const lapack of [['-llapack', '-lblas'], lapackOfSciPy()]) {
    if (lapack === null) continue;
    try {
      const words = ['-O3', '-march=native', '-o', binary, here('map-cells.c'), ...lapack, '-lm'];
      execFileSync('cc', words, { stdio: 'pipe' });
    } catch {
      continue;
    }
    return {
      run(classes, columns, rows, start) {
        const words = [classes, columns, rows, 200, ...start].map(String);
        const output = execFileSync(binary, words, { encoding: 'utf8', env: ONE_THREAD });
        const [milliseconds = NaN, sum = NaN] = numbers(output);
        return { milliseconds, sum };
      },
      dispose: () => rmSync(folder, { recursive: true, force: true }),
    };
  }
  rmSync(folder, { recursive: true, force: true });
  return null;
}

const FIND_LAPACK = `import glob, os, scipy
print(*glob.glob(os.path.join(os.path.dirname(scipy.__file__), '..', 'scipy.libs', 'libscipy_openblas-*')))`;

function lapackOfSciPy(): string[] | null {
  try {
    const stdio: ['ignore', 'pipe', 'ignore'] = ['ignore', 'pipe', 'ignore'];
    const output = execFileSync('python3', ['-c', FIND_LAPACK], { encoding: 'utf8', stdio });
    const [library] = output.trim().split(/\s+/);
    return library ? ['-Ddgeev_=scipy_dgeev_', library, `-Wl,-rpath,${dirname(library)}`] : null;
  } catch {
    return null;
  }
}

function numbers(text: string): number[] {
  return text.trim().split(/\s+/).map(Number);
}
