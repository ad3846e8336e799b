import type { PresetDocument } from '@/engine/schema/preset';
import type { StudyInput } from '@/engine/schema/study';

import type { SweepSelection, WorkbenchState } from '../state/store';

type TaskInput = StudyInput['tasks'][number];

export interface OfferedTask {
  readonly label: string;
  readonly task: TaskInput;
}

/** What was computed over two parameters and of the long run, to be rerun as it was asked. */
export type AskedBefore = Pick<WorkbenchState, 'twoParameters' | 'longRun'>;

/**
 * What a study of the bench can compute: each takes its numbers and starts from the document, but for what was
 * computed over two parameters and of the long run, which is rerun as it was asked.
 */
export function studyTasks(
  document: PresetDocument,
  sweep: SweepSelection | null,
  asked?: AskedBefore,
): readonly OfferedTask[] {
  const along = sweep ? ` over ${sweep.parameter}` : '';
  return [
    { label: 'trajectory', task: { task: 'trajectory', id: 'trajectory', horizon: document.horizon } },
    { label: 'equilibria', task: { task: 'equilibria', id: 'equilibria' } },
    ...(sweep
      ? [
          { label: `sweep${along}`, task: { task: 'sweep' as const, id: 'sweep', ...sweep } },
          { label: `cycles${along}`, task: { task: 'cycles' as const, id: 'cycles', ...sweep } },
          {
            label: `full picture${along}, with its table`,
            task: { task: 'picture' as const, id: 'picture', ...sweep },
          },
        ]
      : []),
    ...(asked ? askedTasks(asked) : []),
  ];
}

function askedTasks({ twoParameters, longRun }: AskedBefore): readonly OfferedTask[] {
  const { boundaries, map } = twoParameters;
  const offered: OfferedTask[] = [];
  if (boundaries) {
    const { first, second } = boundaries.task;
    offered.push({
      label: `boundaries over ${first.parameter} and ${second.parameter}`,
      task: { ...boundaries.task, id: 'boundaries' },
    });
  }
  if (map) {
    const { x, y, show } = map.task;
    offered.push({
      label: `map of the ${MAP_WORDS[show]} over ${x.parameter} and ${y.parameter}`,
      task: { ...map.task, id: 'map' },
    });
  }
  if (longRun.extremes)
    offered.push({
      label: `long-run extremes over ${longRun.extremes.task.parameter}`,
      task: { ...longRun.extremes.task, id: 'extremes' },
    });
  if (longRun.basins) offered.push({ label: 'basins', task: { ...longRun.basins.task, id: 'basins' } });
  if (longRun.section) offered.push({ label: 'section', task: { ...longRun.section.task, id: 'section' } });
  if (longRun.lyapunov)
    offered.push({ label: 'Lyapunov exponents', task: { ...longRun.lyapunov.task, id: 'lyapunov' } });
  return offered;
}

const MAP_WORDS = {
  margin: 'stability margin',
  attractor: 'kind of attractor',
  lowest: 'lowest density',
  exponent: 'largest exponent',
} as const;

export function studyOf(document: PresetDocument, tasks: readonly TaskInput[]): StudyInput {
  return { preset: document, tasks: [...tasks] };
}
