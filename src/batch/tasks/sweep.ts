import { sweepSplitAndTwin } from '@/engine/explore/split-sweep';
import type { CompiledModel } from '@/engine/system/compile-model';

import type { JsonRecord } from '../json/shared';
import { overall } from '../json/status';
import { shiftsJson, sweepJson } from '../json/sweep';
import { finish, startsOf, type TaskOf } from './task';

export function runSweep(model: CompiledModel, task: TaskOf<'sweep'>): JsonRecord {
  const request = {
    values: task.parameters ?? {},
    parameter: model.system.parameterKeys[model.parameterIndex(task.parameter)],
    from: task.from,
    to: task.to,
    starts: Array.from(startsOf(model, task)),
    withTwin: task.twin,
    box: task.box ?? {},
  };
  const { split, twin, verdict } = finish(sweepSplitAndTwin(model, request, { bands: task.bands }));
  return {
    parameter: request.parameter,
    from: task.from,
    to: task.to,
    ...overall(split, twin),
    split: sweepJson(split, task.branches),
    twin: twin && sweepJson(twin, task.branches),
    shifts: shiftsJson({ split, twin }),
    verdict: task.twin ? verdict : null,
  };
}
