/** Work between two looks at the messages: short enough that a newer request or a cancel is heard at once. */
export const SLICE_MILLISECONDS = 12;

export interface DriveOptions<Value> {
  /** Told the last value of each slice. */
  readonly onSlice?: (value: Value) => void;
  /** Asked between slices; true abandons the run, and the drive answers null. */
  readonly isSuperseded?: () => boolean;
}

/**
 * Runs a generator to its end in slices, letting messages through between them. Resolves to its
 * result, or null where it was abandoned.
 */
export async function driveInSlices<Value, Result>(
  run: Generator<Value, Result>,
  { onSlice, isSuperseded }: DriveOptions<Value> = {},
): Promise<Result | null> {
  for (;;) {
    const sliceEnd = performance.now() + SLICE_MILLISECONDS;
    let next = run.next();
    while (!next.done && performance.now() < sliceEnd) next = run.next();
    if (next.done) return next.value;
    onSlice?.(next.value);
    await letMessagesThrough();
    if (isSuperseded?.()) {
      // Its finally blocks run; what it would return is not wanted.
      run.return(undefined as never);
      return null;
    }
  }
}

/** Resolves in a task of its own, without the delay that timers have. */
export function letMessagesThrough(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
}
