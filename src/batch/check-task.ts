import type { StudyTask } from '@/engine/schema/study';
import type { CompiledModel } from '@/engine/system/compile-model';

/** Names in a task that the model does not have, in words; an empty list where all is well. */
export function checkTask(model: CompiledModel, task: StudyTask): string[] {
  const problems: string[] = [];
  const keys = model.system.parameterKeys;
  const states = model.system.stateSymbols;
  for (const key of Object.keys(task.parameters ?? {}))
    if (model.parameterIndex(key) < 0)
      problems.push(`"${key.slice(0, 80)}" is no parameter of this model; it has ${list(keys)}.`);
  const named = { ...task.starts, ...('box' in task ? task.box : {}) };
  for (const symbol of Object.keys(named))
    if (!states.includes(symbol))
      problems.push(`"${symbol.slice(0, 80)}" is no class of this model; it has ${list(states)}.`);
  if ('box' in task)
    for (const [symbol, [from, to]] of Object.entries(task.box ?? {}))
      if (!(from < to)) problems.push(`The box of ${symbol} ends at ${to}, which is not above ${from}.`);
  if (task.task === 'sweep') {
    if (model.parameterIndex(task.parameter) < 0)
      problems.push(
        `"${task.parameter}" cannot be swept: it is no parameter of this model; it has ${list(keys)}.`,
      );
    if (task.from === task.to) problems.push('The range of a sweep needs two different ends.');
  }
  if (task.task === 'trajectory' && task.times !== undefined && !isMonotone(task.startTime, task.times))
    problems.push('The times of a trajectory must run in one direction from its start time.');
  return problems;
}

function list(names: readonly string[]): string {
  return names.length === 0 ? 'none' : names.join(', ');
}

function isMonotone(start: number, times: readonly number[]): boolean {
  const direction = Math.sign(times[times.length - 1] - start);
  return times.every((time, k) => (time - (k === 0 ? start : times[k - 1])) * direction >= 0);
}
