/** What the compiled core offers, and what it needs of a model. Addresses are in bytes into one shared memory. */

/** A model's emitted formulas, as the core imports them. */
export interface ModelExports {
  /** Reads the parameters and computes what depends on them alone. */
  readonly prepare: () => void;
  readonly rhs: (t: number, u: number, out: number) => void;
  readonly jacobian: (t: number, u: number, out: number) => void;
}

/** A memory of the host, shared by a model's formulas and the core. */
export interface SharedMemory {
  readonly buffer: ArrayBuffer;
}

/** Kernels; see `assembly/` for what each does, reads and writes. */
export interface CoreExports {
  readonly advance54: Advance;
  readonly advance853: Advance;
  readonly eigenvalues: (n: number, a: number, re: number, im: number, work: number) => number;
  readonly marginCells: (
    n: number,
    count: number,
    x: number,
    y: number,
    slotX: number,
    slotY: number,
    states: number,
    margins: number,
    work: number,
  ) => void;
}

export type Advance = (
  n: number,
  control: number,
  work: number,
  maximumSteps: number,
  times: number,
  count: number,
  out: number,
  heedStiffness: number,
) => number;

/** Outcomes of `Advance`. */
export const ADVANCE = {
  sliceSpent: 0,
  reachedEnd: 1,
  notFinite: 2,
  stepTooSmall: 3,
  windowFilled: 4,
  stiff: 5,
} as const;

/** Places in the control block of `Advance`, in doubles. */
export const CONTROL = {
  time: 0,
  previousTime: 1,
  step: 2,
  lastLogError: 3,
  relativeTolerance: 4,
  absoluteTolerance: 5,
  end: 6,
  steps: 7,
  rejected: 8,
  stiffSteps: 9,
  easySteps: 10,
  evaluations: 11,
  filled: 12,
  accepted: 13,
  denseReady: 14,
  span: 15,
  length: 16,
} as const;

/** A model bound to the core. */
export interface NativeSystem {
  readonly core: CoreExports;
  /** The whole memory; never grown, so the view stays valid. */
  readonly view: Float64Array;
  /** First double that is free for the kernels. */
  readonly free: number;
  /** Doubles free from there on. */
  readonly room: number;
  /** Where the parameters lie, in doubles. */
  readonly parameters: number;
}
