import { nearestSymbol } from '../expression/nearest-symbol';
import type { AnalysisTask } from '../schema/analysis-tasks';
import type { StudyTask } from '../schema/study';
import type { CompiledModel } from '../system/compile-model';

/**
 * What in a task does not fit the model, in words: names that it does not have, ranges without extent. An
 * empty list where all is well.
 */
export function checkTask(model: CompiledModel, task: StudyTask | AnalysisTask): string[] {
  const names = new TaskNames(model);
  for (const key of Object.keys(task.parameters ?? {})) names.parameter(key);
  for (const symbol of Object.keys(task.starts ?? {})) names.state(symbol);
  if ('box' in task)
    for (const [symbol, [from, to]] of Object.entries(task.box ?? {})) {
      names.state(symbol);
      if (!(from < to)) names.problem(`The box of ${symbol} ends at ${to}, which is not above ${from}.`);
    }
  checkOwn(task, names);
  return names.problems;
}

function checkOwn(task: StudyTask | AnalysisTask, names: TaskNames): void {
  switch (task.task) {
    case 'equilibria':
    case 'lyapunov':
      return;
    case 'trajectory':
      if (task.times !== undefined && !isMonotone(task.startTime, task.times))
        names.problem('The times of a trajectory must run in one direction from its start time.');
      return;
    case 'sweep':
    case 'cycles':
    case 'picture':
      return names.range(task);
    case 'extremes':
      names.range(task);
      if (task.observe !== undefined) names.quantity(task.observe);
      return;
    case 'section':
      return names.quantity(task.quantity);
    case 'boundaries':
      names.range(task.first);
      names.range(task.second);
      names.different(task.first.parameter, task.second.parameter);
      for (const symbol of Object.keys(task.point?.state ?? {})) names.state(symbol);
      return;
    case 'map':
      names.range(task.x);
      names.range(task.y);
      return names.different(task.x.parameter, task.y.parameter);
    case 'basins':
      for (const axis of [task.x, task.y]) {
        names.state(axis.state);
        names.extent(axis.state, axis);
      }
      if (task.x.state === task.y.state)
        names.problem(`Both axes of the basins are ${task.x.state}; choose two different classes.`);
  }
}

interface Range {
  readonly parameter: string;
  readonly from: number;
  readonly to: number;
}

/** Looks names up in a model and collects what is wrong with them. */
class TaskNames {
  readonly problems: string[] = [];
  private readonly keys: readonly string[];
  private readonly states: readonly string[];

  constructor(private readonly model: CompiledModel) {
    this.keys = model.system.parameterKeys;
    this.states = model.system.stateSymbols;
  }

  problem(message: string): void {
    this.problems.push(message);
  }

  parameter(key: string): void {
    if (this.model.parameterIndex(key) < 0) this.unknown(key, 'parameter', this.keys);
  }

  state(symbol: string): void {
    if (!this.states.includes(symbol)) this.unknown(symbol, 'class', this.states);
  }

  /** A class, or a population, which means its total. */
  quantity(symbol: string): void {
    const totals = this.model.system.populations.map((one) => one.symbol);
    const known = [...new Set([...this.states, ...totals])];
    if (!known.includes(symbol)) this.unknown(symbol, 'class or population', known);
  }

  range(range: Range): void {
    this.parameter(range.parameter);
    this.extent(range.parameter, range);
  }

  extent(name: string, { from, to }: Pick<Range, 'from' | 'to'>): void {
    if (from === to) this.problem(`The range of ${shown(name)} needs two different ends; both are ${from}.`);
  }

  different(first: string, second: string): void {
    const index = this.model.parameterIndex(first);
    if (index >= 0 && index === this.model.parameterIndex(second))
      this.problem(`Both parameters are ${shown(first)}; choose two different ones.`);
  }

  private unknown(name: string, kind: string, known: readonly string[]): void {
    const near = nearestSymbol(name, known);
    const meant = near === null ? '' : ` Did you mean ${near}?`;
    const has = known.length === 0 ? 'none' : known.join(', ');
    this.problem(`"${shown(name)}" is no ${kind} of this model; it has ${has}.${meant}`);
  }
}

function shown(name: string): string {
  return name.slice(0, 80);
}

function isMonotone(start: number, times: readonly number[]): boolean {
  const direction = Math.sign(times[times.length - 1] - start);
  return times.every((time, k) => (time - (k === 0 ? start : times[k - 1])) * direction >= 0);
}
