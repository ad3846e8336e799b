let early: Worker | null = null;

const make = () => new Worker(new URL('./engine.worker.ts', import.meta.url), { type: 'module' });

/** Lets a worker read its code while the page still reads its own; the next one that is wanted is this one. */
export function beginEngineEarly(): void {
  early ??= make();
}

export function createEngineWorker(): Worker {
  const worker = early ?? make();
  early = null;
  return worker;
}
