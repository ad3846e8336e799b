/**
 * Runs changes one after another. Sequelize opens one SQLite connection a transaction, and SQLite lets one
 * write at a time: changes that overlap wait for each other's locks on the few threads that could release
 * them, and fail. So every write of this process, in a transaction or not, passes through one such queue.
 */
export class TransactionQueue {
  private tail: Promise<unknown> = Promise.resolve();
  private waiting = 0;

  /** Changes that wait or run. */
  get length(): number {
    return this.waiting;
  }

  run<Result>(change: () => Promise<Result>): Promise<Result> {
    this.waiting += 1;
    const result = this.tail.then(change);
    this.tail = result.then(
      () => this.settle(),
      () => this.settle(),
    );
    return result;
  }

  /** Settles when all changes handed in so far have ended. */
  async idle(): Promise<void> {
    await this.tail;
  }

  private settle(): void {
    this.waiting -= 1;
  }
}
