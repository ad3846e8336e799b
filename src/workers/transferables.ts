/** Arrays below this size are cheaper to copy than to hand over. */
const WORTH_TRANSFERRING = 2048;

/**
 * Buffers of the large typed arrays anywhere in a result, each once, so that it can be handed to the
 * page without copying. Only for results that the worker does not keep.
 */
export function collectTransferables(result: unknown): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>();
  visit(result, buffers);
  return [...buffers];
}

function visit(value: unknown, buffers: Set<ArrayBuffer>): void {
  if (typeof value !== 'object' || value === null) return;
  if (ArrayBuffer.isView(value)) {
    // A view on a part of something larger stays, and so does memory of WebAssembly.
    const { buffer } = value;
    if (
      buffer instanceof ArrayBuffer &&
      value.byteLength === buffer.byteLength &&
      value.byteLength >= WORTH_TRANSFERRING
    )
      buffers.add(buffer);
    return;
  }
  for (const inner of Object.values(value)) visit(inner, buffers);
}
