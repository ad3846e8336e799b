import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const study = {
  preset: {
    equations: ["x' = r*x*(1-x/K)"],
    parameters: { r: 0.7, K: 10 },
    init: { x: 0.4 },
    sign: 'nonnegative',
  },
  tasks: [{ task: 'trajectory', id: 'growth', times: [5, 12] }, { task: 'equilibria' }],
};

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'moiety-batch-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function batch(
  args: readonly string[],
  input = '',
): { status: number | null; stdout: string; stderr: string } {
  const run = spawnSync(process.execPath, ['node_modules/tsx/dist/cli.mjs', 'src/batch/main.ts', ...args], {
    input,
    encoding: 'utf8',
  });
  return { status: run.status, stdout: run.stdout, stderr: run.stderr };
}

describe('the command line', () => {
  it('prints one JSON result, from a file and from standard input alike', () => {
    const file = join(folder, 'study.json');
    writeFileSync(file, JSON.stringify(study));
    const fromFile = batch([file]);
    expect(fromFile).toMatchObject({ status: 0, stderr: '' });
    const results = JSON.parse(fromFile.stdout);
    // n(t) of the logistic equation at t = 5, closed form.
    expect(results.tasks[0].split.states.x[0]).toBeCloseTo(5.7979847524698656, 8);
    expect(batch(['-'], JSON.stringify(study)).stdout).toBe(fromFile.stdout);
  });

  it('writes a file whole, and nothing when refused', () => {
    const out = join(folder, 'result.json');
    expect(batch(['-', '--out', out], JSON.stringify({ ...study, tasks: [] }))).toMatchObject({
      status: 1,
      stdout: '',
    });
    expect(existsSync(out)).toBe(false);
    expect(batch(['-', '--out', out], JSON.stringify(study))).toMatchObject({ status: 0, stdout: '' });
    expect(JSON.parse(readFileSync(out, 'utf8')).format).toBe('moiety-results');
    expect(readdirSync(folder).filter((name) => name.endsWith('.part'))).toEqual([]);
    expect(batch(['-', '--out', join(folder, 'none', 'x.json')], JSON.stringify(study)).stderr).toMatch(
      /could not be written/,
    );
  });

  it('prints the JSON Schema of studies', () => {
    const schema = JSON.parse(batch(['--schema']).stdout);
    expect(schema.properties).toHaveProperty('preset');
    expect(schema.properties).toHaveProperty('tasks');
  });

  it.each([
    ['a study that is no JSON', ['-'], '{', /no valid JSON/],
    ['a file that is not there', ['/no/such/file.json'], '', /could not be read/],
    ['no study at all', [], '', /Usage/],
    ['an unknown option', ['--frobnicate'], '', /Usage/],
  ])('refuses %s in words', (_name, args, input, message) => {
    const run = batch(args, input);
    expect(run.status).toBe(1);
    expect(run.stdout).toBe('');
    expect(run.stderr).toMatch(message);
    expect(run.stderr).not.toMatch(/\n\s+at /);
  });
});
