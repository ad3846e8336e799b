import type { StudyTask } from '@/engine/schema/study';
import type { CompiledModel } from '@/engine/system/compile-model';

export type TaskOf<Name extends StudyTask['task']> = Extract<StudyTask, { task: Name }>;

/** Start values of the document, with those of the task in their place. */
export function startsOf(model: CompiledModel, task: Pick<StudyTask, 'starts'>): Float64Array {
  return Float64Array.from(model.starts, (own, i) => task.starts?.[model.system.stateSymbols[i]] ?? own);
}

/** Runs a generator to its end. */
export function finish<Result>(work: Generator<unknown, Result>): Result {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
  }
}
