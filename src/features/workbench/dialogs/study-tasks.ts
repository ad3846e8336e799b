import type { PresetDocument } from '@/engine/schema/preset';
import type { StudyInput } from '@/engine/schema/study';

import type { SweepSelection } from '../state/store';

type TaskInput = StudyInput['tasks'][number];

export interface OfferedTask {
  readonly label: string;
  readonly task: TaskInput;
}

/** What a study of the bench can compute: each takes its numbers and starts from the document. */
export function studyTasks(document: PresetDocument, sweep: SweepSelection | null): readonly OfferedTask[] {
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
  ];
}

export function studyOf(document: PresetDocument, tasks: readonly TaskInput[]): StudyInput {
  return { preset: document, tasks: [...tasks] };
}
