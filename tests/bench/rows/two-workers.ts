import { fileURLToPath } from 'node:url';
import { isMainThread, Worker, workerData } from 'node:worker_threads';

import { atLeast, median, time, times, type Row } from '../measure';
import { EIGHT_CLASSES } from '../models';
import { cellsOf } from './map-cells';

/** Words of the shared memory: workers that are ready, go, maps done in all. */
const [READY, GO, DONE] = [0, 1, 2];
const RUNNING = 1;
const STOPPED = 2;
const ROUNDS = 5;
const WINDOW_MILLISECONDS = 1500;
const PATIENCE_MILLISECONDS = 20_000;

/** Maps a second by two workers over those by one, each with its own system, as the workbench has them. */
export function twoWorkerRows(): Row[] {
  const ratios: number[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    const one = mapsIn(1);
    ratios.push(mapsIn(2) / one);
  }
  return [atLeast('maps of cells, 8 classes: two workers over one', median(ratios), 1.7, times)];
}

/** Maps done within the window. The bench waits by blocking, so that its own thread takes nothing. */
function mapsIn(workers: number): number {
  const shared = new Int32Array(new SharedArrayBuffer(12));
  const file = fileURLToPath(import.meta.url);
  const running = Array.from(
    { length: workers },
    () => new Worker(file, { workerData: shared, execArgv: [] }),
  );
  for (const worker of running) worker.unref();
  const deadline = performance.now() + PATIENCE_MILLISECONDS;
  for (let ready = 0; ready < workers; ready = Atomics.load(shared, READY)) {
    if (performance.now() > deadline) throw new Error('The workers of the bench did not start.');
    Atomics.wait(shared, READY, ready, 100);
  }
  Atomics.store(shared, GO, RUNNING);
  Atomics.notify(shared, GO);
  Atomics.wait(shared, GO, RUNNING, WINDOW_MILLISECONDS);
  const done = Atomics.load(shared, DONE);
  Atomics.store(shared, GO, STOPPED);
  return done;
}

function work(shared: Int32Array): void {
  const map = cellsOf(EIGHT_CLASSES, true);
  // Into the fast tier before the clock runs.
  time(() => void map(), 1, 300);
  Atomics.add(shared, READY, 1);
  Atomics.notify(shared, READY);
  Atomics.wait(shared, GO, 0);
  while (Atomics.load(shared, GO) === RUNNING) {
    map();
    Atomics.add(shared, DONE, 1);
  }
}

// The worker is this bundle once more.
if (!isMainThread && workerData instanceof Int32Array) work(workerData);
