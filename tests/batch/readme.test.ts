import { readFileSync } from 'node:fs';

import { describe, expect, it } from 'vitest';

import { ANALYSIS_TASK_SCHEMAS } from '@/engine/schema/analysis-tasks';
import { studyJsonSchema, studySchema } from '@/engine/schema/study';

const readme = readFileSync('README.md', 'utf8');
/** The tasks that the README shows, one a row of its table. */
const shown = [...readme.matchAll(/^\| `(\w+)` \|.*\| `(\{.*\})` +\|$/gm)].map(([, name, json]) => ({
  name,
  task: JSON.parse(json) as { task: string },
}));
const names = studySchema.shape.tasks.element.options.map((option) => option.shape.task.value);

describe('studies', () => {
  it('take every task of the engine', () => {
    const own = ANALYSIS_TASK_SCHEMAS.map((schema) => schema.shape.task.value);
    expect([...names].sort()).toEqual(['trajectory', 'equilibria', 'sweep', ...own].sort());
  });

  it('are shown in the README with an example of every task, each of them valid', () => {
    expect(shown.map((one) => one.name)).toEqual(names);
    for (const { name, task } of shown) {
      expect(task.task).toBe(name);
      expect(studySchema.shape.tasks.safeParse([task]).error?.message).toBeUndefined();
    }
  });

  it('are described as JSON Schema, every task with what it must have', () => {
    const text = JSON.stringify(studyJsonSchema());
    for (const name of names) expect(text).toContain(`"const":"${name}"`);
  });
});
