import type { Progress } from '@/engine/continuation/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import type { EquilibriaResult } from '@/engine/equilibria/contract';
import type { ModelReport } from '@/engine/system/contract';
import type {
  ExploreRequest,
  ExploreResult,
  ParameterValues,
  SecondOpinion,
  SplitSweepResult,
  SweepRequest,
} from '@/workers/protocol';

/** The engine as the driver needs it; the worker client keeps to it, and so does a stand-in of a test. */
export interface EngineConnection {
  setModel(document: PresetDocument): Promise<ModelReport>;
  explore(request: ExploreRequest): Promise<ExploreResult>;
  findEquilibria(
    job: number,
    values: ParameterValues,
    onProgress: (progress: Progress) => void,
  ): Promise<{ split: EquilibriaResult; twin: EquilibriaResult | null }>;
  sweep(
    job: number,
    request: SweepRequest,
    onProgress: (progress: Progress<SplitSweepResult>) => void,
  ): Promise<SplitSweepResult>;
  secondOpinion(request: ExploreRequest): Promise<SecondOpinion>;
  cancel(job: number): void;
}
