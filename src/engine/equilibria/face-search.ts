import type { CompiledSystem } from '../system/contract';
import { insideBox, type StateBox } from './box';
import type { Equilibrium } from './contract';
import { describeEquilibrium, type DescriptionOptions } from './describe';
import { dropState, faceProblem, liftState, type Face } from './face-system';
import { absenceOf, makeFace } from './faces';
import { scanLine } from './line-scan';
import { sameState } from './merge';
import { newton, type NewtonOutcome } from './newton';
import { pseudoTransient } from './pseudo-transient';
import { startPoint } from './starts';

export interface FaceSearchOptions {
  readonly seed: number;
  readonly starts: number;
  /** Full states to start from too. */
  readonly given: readonly Float64Array[];
  readonly describe: DescriptionOptions;
}

export const FACE_SEARCH_DEFAULTS = {
  /** Newton runs between two reports of progress. */
  slice: 16,
  /** One start in so many is also run with the known roots deflated, and carried along a trajectory. */
  deflateEvery: 2,
  carryEvery: 8,
  /** New roots that one deflated start may bring. */
  deflations: 3,
  /** Rounds of starts on a face that keeps bringing new equilibria. */
  rounds: 8,
  /** A free state below this share of its scale, whose absence lasts, counts as absent. */
  absentShare: 1e-9,
  /** A state below this share of its scale is rounding of zero. */
  zeroShare: 1e-13,
  /** A state whose flows do not balance to this share is no equilibrium. */
  largestResidual: 1e-9,
  /** A curve of equilibria is represented by so many of its points. */
  curvePoints: 3,
  /** Equilibria kept on one face. */
  found: 200,
} as const;

/** Search on one face; `advance` does a slice of the work and adds to the list of all found. */
export class FaceSearch {
  tried = 0;
  private next = 0;
  private ownCount = 0;
  private rounds = 1;
  private foundAt = -1;
  private readonly queue: Float64Array[];

  constructor(
    private readonly system: CompiledSystem,
    private readonly face: Face,
    private readonly faces: readonly Face[],
    private readonly box: StateBox,
    private readonly scale: Float64Array,
    private readonly found: Equilibrium[],
    private readonly options: FaceSearchOptions,
  ) {
    const m = face.free.length;
    this.queue = options.given.map((state) => dropState(face, state));
    if (m === 1) this.queue.push(...scanLine(system, face, box));
    if (m === 0) this.accept(face, new Float64Array(0), 0);
  }

  get fraction(): number {
    return Math.min(1, this.next / Math.max(1, this.total));
  }

  private get total(): number {
    const m = this.face.free.length;
    if (m === 0) return 0;
    return this.queue.length + (m === 1 ? 0 : this.options.starts * this.rounds);
  }

  /** Another round of starts where the last one still brought something new. */
  private extend(): boolean {
    const news = this.foundAt >= this.total - this.options.starts;
    if (this.face.free.length < 2 || !news || this.ownCount < 2) return false;
    if (this.rounds >= FACE_SEARCH_DEFAULTS.rounds) return false;
    this.rounds += 1;
    return true;
  }

  /** Does up to a slice of starts; false when the face is done. */
  advance(): boolean {
    if (this.next >= this.total && !this.extend()) return false;
    const last = Math.min(this.total, this.next + FACE_SEARCH_DEFAULTS.slice);
    const x = new Float64Array(this.face.free.length);
    for (; this.next < last; this.next += 1) {
      const given = this.next < this.queue.length;
      if (given) x.set(this.queue[this.next]);
      else startPoint(this.system, this.face, this.box, this.next - this.queue.length, this.options.seed, x);
      this.tryFrom(x, given);
      if (this.ownCount > FACE_SEARCH_DEFAULTS.found) {
        this.next = this.total;
        this.foundAt = -1;
        return true;
      }
    }
    return true;
  }

  private tryFrom(x: Float64Array, given: boolean): void {
    const scale = dropState(this.face, this.scale);
    const perCapita = faceProblem(this.system, this.face, true);
    this.tried += 1;
    this.keep(this.face, newton(perCapita, x, { scale }));
    if (this.face.free.length === 1) return;
    if (given || this.next % FACE_SEARCH_DEFAULTS.carryEvery === 0) {
      const plain = faceProblem(this.system, this.face, false);
      const nonnegative = this.face.free.map((i) => this.system.nonnegative[i]);
      for (const direction of [1, -1] as const) {
        const end = pseudoTransient(plain, x, nonnegative, direction);
        if (end === null) continue;
        // Undivided first: a trajectory on which a population dies out ends on a smaller face.
        this.keep(this.face, newton(plain, end, { scale }));
        this.keep(this.face, newton(perCapita, end, { scale }));
      }
    }
    if (this.next % FACE_SEARCH_DEFAULTS.deflateEvery !== 0) return;
    for (let k = 0; k < FACE_SEARCH_DEFAULTS.deflations; k += 1) {
      const deflate = this.ownRoots();
      if (deflate.length === 0) return;
      if (!this.keep(this.face, newton(perCapita, x, { scale, deflate }))) return;
    }
  }

  /** Known roots on this face with every state that could be divided out present. */
  private ownRoots(): Float64Array[] {
    return this.found
      .filter(({ state }) => this.face.absent.every((i) => state[i] === 0))
      .filter(({ state }) => this.face.free.every((i, a) => !this.face.ownZero[a] || state[i] !== 0))
      .map(({ state }) => dropState(this.face, state));
  }

  /** Adds a root where it is new, feasible and in the box; says whether it was. */
  private keep(face: Face, outcome: NewtonOutcome): boolean {
    if (outcome.status !== 'converged') return false;
    const x = outcome.state;
    const vanished = face.free.filter(
      (i, a) => face.ownZero[a] && Math.abs(x[a]) <= FACE_SEARCH_DEFAULTS.absentShare * this.scale[i],
    );
    if (vanished.length > 0) return this.keepOnSubface(face, x, vanished);
    for (let a = 0; a < x.length; a += 1)
      if (Math.abs(x[a]) <= FACE_SEARCH_DEFAULTS.zeroShare * this.scale[face.free[a]]) x[a] = 0;
    return this.accept(face, x, outcome.accuracy);
  }

  private keepOnSubface(face: Face, x: Float64Array, vanished: readonly number[]): boolean {
    const absent = [...face.absent, ...vanished].sort((a, b) => a - b);
    const listed = this.faces.find(
      (other) => other.absent.length === absent.length && other.absent.every((i, k) => i === absent[k]),
    );
    // Not every face is listed where there are many; this one is met by chance.
    const lasts = listed !== undefined || absenceOf(this.system, absent, this.scale) === 'lasts';
    if (!lasts) return false;
    const subface = listed ?? makeFace(this.system, absent, false, this.scale);
    if (subface.free.length === 0) return this.accept(subface, new Float64Array(0), 0);
    const start = dropState(subface, liftState(face, x, this.system.dimension));
    const scale = dropState(subface, this.scale);
    return this.keep(subface, newton(faceProblem(this.system, subface, true), start, { scale }));
  }

  private accept(face: Face, x: Float64Array, accuracy: number): boolean {
    const state = liftState(face, x, this.system.dimension);
    for (let i = 0; i < state.length; i += 1) {
      if (!this.system.nonnegative[i] || state[i] >= 0) continue;
      if (state[i] < -FACE_SEARCH_DEFAULTS.absentShare * this.scale[i]) return false;
    }
    if (!insideBox(this.box, state, 1e-9)) return false;
    if (this.found.some((known) => sameState(known.state, state, this.scale, accuracy))) return false;
    const equilibrium = describeEquilibrium(
      this.system,
      state,
      face,
      accuracy,
      this.scale,
      this.options.describe,
    );
    if (equilibrium === null || equilibrium.residual > FACE_SEARCH_DEFAULTS.largestResidual) return false;
    if (equilibrium.type === 'not isolated' && this.curveIsRepresented(state)) return false;
    this.ownCount += 1;
    this.foundAt = this.next;
    this.found.push(equilibrium);
    return true;
  }

  /** Whether enough points of curves of equilibria are known with the same states at zero. */
  private curveIsRepresented(state: Float64Array): boolean {
    const alike = this.found.filter(
      (one) => one.type === 'not isolated' && one.state.every((x, i) => (x === 0) === (state[i] === 0)),
    );
    return alike.length >= FACE_SEARCH_DEFAULTS.curvePoints;
  }
}
