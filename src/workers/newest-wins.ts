interface Caller<Result> {
  /** Number of the request that the caller made. */
  readonly number: number;
  resolve(result: Result): void;
  reject(reason: unknown): void;
}

/**
 * Keeps few requests in flight, tells of the newest next, and forgets those between. Whoever is
 * overtaken is answered with a newer result, so that nobody waits for stale work and no promise is
 * left open.
 */
export class NewestWins<Request, Result> {
  private newest: { readonly request: Request; readonly number: number } | null = null;
  private callers: Caller<Result>[] = [];
  private inFlight = 0;
  private count = 0;

  /**
   * @param ask answers null where the request was dropped for a newer one
   * @param atOnce how many may be in flight: with 2 the other side hears of a newer one while it works
   */
  constructor(
    private readonly ask: (request: Request) => Promise<Result | null>,
    private readonly atOnce = 2,
  ) {}

  request(request: Request): Promise<Result> {
    return new Promise((resolve, reject) => {
      this.count += 1;
      this.callers.push({ number: this.count, resolve, reject });
      this.newest = { request, number: this.count };
      void this.pump();
    });
  }

  private async pump(): Promise<void> {
    if (!this.newest || this.inFlight >= this.atOnce) return;
    const { request, number } = this.newest;
    this.newest = null;
    this.inFlight += 1;
    try {
      const result = await this.ask(request);
      if (result !== null) this.served(number).forEach(({ resolve }) => resolve(result));
      else if (number === this.count) throw new Error('The engine dropped the newest request.');
    } catch (reason) {
      this.served(number).forEach(({ reject }) => reject(reason));
    } finally {
      this.inFlight -= 1;
      void this.pump();
    }
  }

  /** Takes out those whose request is this one or was overtaken by it. */
  private served(number: number): Caller<Result>[] {
    const served = this.callers.filter((caller) => caller.number <= number);
    this.callers = this.callers.filter((caller) => caller.number > number);
    return served;
  }
}
