import type { SweepResult } from '../continuation/contract';
import type { CompiledModel } from '../system/compile-model';
import { CAUTION } from '../system/contract';
import type { Verdict } from '../verdict/contract';
import type { SweepRequest } from './contract';

/** Withheld until margins and special points can be weighed against each other. */
export function judgeSweeps(
  model: CompiledModel,
  request: SweepRequest,
  split: SweepResult,
  twin: SweepResult | null,
): Verdict {
  return {
    answer: 'cannot say',
    sentence: 'The margins and special points of split and pooled have not been weighed against each other.',
    evidence: [],
    restsOn: [`A sweep over ${request.parameter} with ${split.points + (twin?.points ?? 0)} points.`],
    leavesOpen: ['Whether the split stabilises.'],
    cautions: model.report.harvested ? [CAUTION] : [],
  };
}
