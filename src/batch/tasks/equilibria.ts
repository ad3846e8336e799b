import { findEquilibriaPair } from '@/engine/explore/equilibria-pair';
import { judgeModel, pairEquilibria } from '@/engine/explore/judge';
import { answersUnderOtherMeans } from '@/engine/explore/other-means';
import type { CompiledModel } from '@/engine/system/compile-model';

import { equilibriaJson } from '../json/equilibria';
import type { JsonRecord } from '../json/shared';
import { overall } from '../json/status';
import { finish, startsOf, type TaskOf } from './task';

export function runEquilibria(model: CompiledModel, task: TaskOf<'equilibria'>): JsonRecord {
  const values = task.parameters ?? {};
  const p = model.valuesToParameters(values);
  const box = task.box ?? {};
  const found = finish(findEquilibriaPair(model, values, { starts: [startsOf(model, task)], box }));
  const others = task.twin ? finish(answersUnderOtherMeans(model, values, box)) : [];
  const verdict = task.twin
    ? judgeModel(model, p, found, pairEquilibria(model, p, found), null, others)
    : null;
  const { system: twin } = model.twin;
  const pooled = task.twin ? found.twin : null;
  return {
    ...overall(found.split, pooled),
    split: equilibriaJson(model.system.stateSymbols, found.split),
    twin: twin && pooled && equilibriaJson(twin.stateSymbols, pooled),
    verdict,
  };
}
