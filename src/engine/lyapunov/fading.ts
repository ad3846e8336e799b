/** Densities below this are not told apart. */
const LOWEST = 1e-300;
/** A swing of so many e-foldings counts as a turn. */
const TURN = 3;
/** Each low must lie so many e-foldings below the one before. */
const LOWER = 1;
const FEWEST_LOWS = 3;

/**
 * Watches nonnegative states for lows that fall from turn to turn while the state comes back every time: the
 * mark of a solution that nears a cycle through saddles (May & Leonard, SIAM J. Appl. Math. 29 (1975)
 * 243), which no average settles on. Works on logarithms; keeps the lows alone.
 */
export class FadingWatch {
  private readonly lows: number[][];
  private readonly extreme: Float64Array;
  private readonly falling: Uint8Array;
  private begun = false;

  constructor(private readonly nonnegative: readonly boolean[]) {
    this.lows = nonnegative.map(() => []);
    this.extreme = new Float64Array(nonnegative.length);
    this.falling = new Uint8Array(nonnegative.length).fill(1);
  }

  note(state: Float64Array): void {
    for (let i = 0; i < this.nonnegative.length; i += 1) {
      const level = Math.log(Math.max(state[i], LOWEST));
      if (!this.begun) this.extreme[i] = level;
      else if (this.falling[i] === 1) this.fall(i, level);
      else this.rise(i, level);
    }
    this.begun = true;
  }

  /** Indices of the states whose latest lows, half of them and at least three, fell each below the last. */
  fading(): number[] {
    return this.lows.flatMap((lows, i) => {
      const latest = lows.slice(Math.min(Math.floor(lows.length / 2), lows.length - FEWEST_LOWS));
      const fell = latest.every((low, k) => k === 0 || low < latest[k - 1] - LOWER);
      return this.nonnegative[i] && lows.length >= FEWEST_LOWS && fell ? [i] : [];
    });
  }

  /** Whether a state rose again after it had been below a density. */
  cameBackFrom(i: number, density: number): boolean {
    return this.lows[i].some((low) => low < Math.log(density));
  }

  private fall(i: number, level: number): void {
    if (level < this.extreme[i]) this.extreme[i] = level;
    if (level <= this.extreme[i] + TURN) return;
    this.lows[i].push(this.extreme[i]);
    this.extreme[i] = level;
    this.falling[i] = 0;
  }

  private rise(i: number, level: number): void {
    if (level > this.extreme[i]) this.extreme[i] = level;
    if (level >= this.extreme[i] - TURN) return;
    this.extreme[i] = level;
    this.falling[i] = 1;
  }
}
