/** Longest wait for a quiet moment. */
const AT_LATEST = 1_000;

/** Resolves when the page has nothing more pressing to do. */
export function whenIdle(): Promise<void> {
  return new Promise((resolve) => {
    // Not every browser has idle callbacks yet.
    if (typeof requestIdleCallback === 'function')
      requestIdleCallback(() => resolve(), { timeout: AT_LATEST });
    else setTimeout(resolve, AT_LATEST / 5);
  });
}
