import { createStore, useStore } from 'zustand';
import { createContext, useContext } from 'react';

import type { PictureResult, SplitAnd } from '@/engine/analyses/contract';
import type { SpecialPoint } from '@/engine/continuation/contract';
import type { CyclesResult, CycleSpecialPoint } from '@/engine/cycles/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import { refuseByLocks, type AssignedWork } from './assigned';
import { NO_LONG_RUN, type LongRun, type LongRunName } from './long-run';
import { NO_TWO_PARAMETERS, type TwoParameters } from './two-parameters';
import type { ModelReport } from '@/engine/system/contract';
import type { Verdict } from '@/engine/verdict/contract';
import type { ExploreResult, PlaneRequest, SecondOpinion, SplitSweepResult } from '@/workers/protocol';
import type { PresetRight } from '@/contract/rights';

/** Where the document on the bench came from, which decides what can be done with it. */
export type Origin =
  | { readonly kind: 'new' }
  | {
      readonly kind: 'preset';
      readonly id: string;
      readonly version: number;
      readonly rights: readonly PresetRight[];
      readonly labName: string | null;
      readonly starter: boolean;
    }
  | {
      readonly kind: 'shared';
      readonly token: string;
      readonly signedIn: boolean;
      readonly mayCopy: boolean;
    }
  | { readonly kind: 'assigned'; readonly id: string; readonly labName: string };

/** One step of the history: the document as it was, and what the edit that left it is called. */
export interface HistoryEntry {
  readonly document: PresetDocument;
  readonly label: string;
}

/** A long run in a worker, as the page shows it. */
export interface Job {
  readonly id: number;
  readonly name: string;
  readonly stage: string;
  readonly fraction: number;
  readonly startedAt: number;
}

export interface SweepSelection {
  readonly parameter: string;
  readonly from: number;
  readonly to: number;
}

/** A special point of equilibria or of cycles. */
export type MarkedPoint = SpecialPoint | CycleSpecialPoint;

/** A named arrangement of panes. */
export type Arrangement = 'explore' | 'sweep' | 'two-parameters' | 'long-run' | 'model';

/** What the page asks of the engine; there while the driver runs. */
export interface EngineActions {
  /** Equilibria, branches and the cycles from them, along the range on the strip. */
  sweep(): void;
  /** The same with nothing taken over from before, and with every equilibrium at the present numbers. */
  picture(): void;
  findEquilibria(): void;
  /** Traces special points in a second parameter: all of the sweep, or one. */
  traceBoundaries(point?: SpecialPoint): void;
  computeMap(): void;
  longRun(name: LongRunName): void;
  /** Integrates the trajectory shown with the other method. */
  secondOpinion(): void;
  cancel(): void;
}

export interface WorkbenchState {
  readonly origin: Origin;
  /** The single source of truth: the sliders, the trait table and the formulas all edit it. */
  readonly document: PresetDocument;
  /** As last saved or opened; differs from `document` when there is unsaved work. */
  readonly saved: PresetDocument;
  readonly past: readonly HistoryEntry[];
  readonly future: readonly HistoryEntry[];
  /** Report of the document on the bench, errors included; null before the first. */
  readonly report: ModelReport | null;
  /** Last document without errors and its report: what the panes show. */
  readonly shownDocument: PresetDocument | null;
  readonly shownReport: ModelReport | null;
  /** True while a newer result is awaited; the last good picture is dimmed past 200 ms. */
  readonly stale: boolean;
  readonly result: ExploreResult | null;
  readonly sweepSelection: SweepSelection | null;
  readonly sweep: SplitSweepResult | null;
  /** True when the model changed after the sweep shown was computed. */
  readonly sweepOutdated: boolean;
  /** Branches of cycles along the same range; they stay while the sweep alone is judged anew. */
  readonly cycles: SplitAnd<CyclesResult> | null;
  /** The whole picture that sweep and cycles are part of, as far as it has come. */
  readonly picture: PictureResult | null;
  /** What is shown over the swept parameter and a second one. */
  readonly twoParameters: TwoParameters;
  /** What the long run is: extremes along the strip, basins, a section, exponents. */
  readonly longRun: LongRun;
  readonly job: Job | null;
  readonly selectedPoint: MarkedPoint | null;
  /** Why the engine could not answer last, in words. */
  readonly engineError: string | null;
  readonly engine: EngineActions | null;
  readonly secondOpinion: SecondOpinion | null;
  /** Of the sweep where it was computed at the present values, else of the equilibria alone. */
  readonly verdict: Verdict | null;
  readonly arrangement: Arrangement;
  /** The slice that the phase plane on show wants; null while there is none. */
  readonly planeRequest: PlaneRequest | null;
  /** The assigned sweep that is worked on; null on any other bench. */
  readonly assigned: AssignedWork | null;
  /** The last edit that the locks refused; a new object each time. */
  readonly refused: { readonly message: string } | null;

  /** Applies an edit. Edits with the same `merge` key in a row (a drag, typing in one field) are one step of undo. */
  edit(label: string, change: (document: PresetDocument) => PresetDocument, merge?: string): void;
  undo(): void;
  redo(): void;
  /** Puts another document on the bench: history starts anew. */
  open(document: PresetDocument, origin: Origin): void;
  /** After a save: same document, new origin. */
  markSaved(origin: Origin): void;
  /** For the engine driver and the views. */
  set(patch: Partial<WorkbenchData>): void;
}

/** What opening another document starts anew; the driver and the arrangement stay. */
type FreshData = Omit<WorkbenchData, 'engine' | 'arrangement' | 'assigned' | 'refused'>;

export type WorkbenchData = Omit<WorkbenchState, 'edit' | 'undo' | 'redo' | 'open' | 'markSaved' | 'set'>;

const HISTORY_LENGTH = 200;

function initialData(document: PresetDocument, origin: Origin): FreshData {
  const first = document.sweeps[0];
  return {
    origin,
    document,
    saved: document,
    past: [],
    future: [],
    report: null,
    shownDocument: null,
    shownReport: null,
    stale: false,
    result: null,
    sweepSelection: first ? { parameter: first.parameter, from: first.from, to: first.to } : null,
    sweep: null,
    sweepOutdated: false,
    cycles: null,
    picture: null,
    twoParameters: NO_TWO_PARAMETERS,
    longRun: NO_LONG_RUN,
    job: null,
    selectedPoint: null,
    engineError: null,
    secondOpinion: null,
    verdict: null,
    planeRequest: null,
  };
}

export function createWorkbenchStore(
  document: PresetDocument,
  origin: Origin,
  assigned: AssignedWork | null = null,
) {
  let lastMerge: string | undefined;
  return createStore<WorkbenchState>()((set) => ({
    ...initialData(document, origin),
    engine: null,
    arrangement: 'explore',
    assigned,
    refused: null,
    edit: (label, change, merge) =>
      set((state) => {
        const next = change(state.document);
        if (next === state.document) return state;
        const refusal = state.assigned && refuseByLocks(state.assigned, next, state.sweepSelection);
        if (refusal) return { refused: { message: refusal } };
        const merged = merge !== undefined && merge === lastMerge && state.past.length > 0;
        lastMerge = merge;
        return {
          document: next,
          past: merged
            ? state.past
            : [...state.past, { document: state.document, label }].slice(-HISTORY_LENGTH),
          future: [],
        };
      }),
    undo: () =>
      set((state) => {
        const last = state.past.at(-1);
        if (!last) return state;
        lastMerge = undefined;
        return {
          document: last.document,
          past: state.past.slice(0, -1),
          future: [{ document: state.document, label: last.label }, ...state.future],
        };
      }),
    redo: () =>
      set((state) => {
        const next = state.future[0];
        if (!next) return state;
        lastMerge = undefined;
        return {
          document: next.document,
          past: [...state.past, { document: state.document, label: next.label }],
          future: state.future.slice(1),
        };
      }),
    open: (next, from) => {
      lastMerge = undefined;
      set(initialData(next, from));
    },
    markSaved: (from) => set((state) => ({ origin: from, saved: state.document })),
    set: (patch) => set(patch),
  }));
}

export type WorkbenchStore = ReturnType<typeof createWorkbenchStore>;

export const WorkbenchContext = createContext<WorkbenchStore | null>(null);

export function useWorkbenchStore(): WorkbenchStore {
  const store = useContext(WorkbenchContext);
  if (!store) throw new Error('A workbench view was rendered outside the workbench.');
  return store;
}

export function useWorkbench<T>(select: (state: WorkbenchState) => T): T {
  return useStore(useWorkbenchStore(), select);
}
