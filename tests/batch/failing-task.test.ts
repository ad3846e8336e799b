import { expect, it, vi } from 'vitest';

import { runAnalysis } from '@/engine/analyses/run-analysis';

import { studyResults } from '../support/study';

vi.mock('@/engine/analyses/run-analysis', () => ({ runAnalysis: vi.fn() }));

it('a mistake of the engine in one task is told there and costs the others nothing', () => {
  vi.mocked(runAnalysis).mockImplementation(() => {
    throw new RangeError('Invalid array length');
  });
  const [broken, fine] = studyResults<{ status: string; message: string; split: unknown }>({
    preset: { equations: ["x' = r*x"], parameters: { r: 1 }, init: { x: 1 } },
    tasks: [
      { task: 'cycles', parameter: 'r', from: 0, to: 1 },
      { task: 'trajectory', times: [1] },
    ],
  });
  expect(broken).toMatchObject({ status: 'failed', split: null });
  expect(broken.message).toMatch(/stopped unexpectedly in this task: Invalid array length/);
  expect(fine).toMatchObject({ status: 'complete', split: { status: 'complete' } });
});
