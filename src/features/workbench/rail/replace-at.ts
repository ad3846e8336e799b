/** A copy of a list with one element changed. */
export function replaceAt<T>(list: readonly T[], index: number, change: (element: T) => T): T[] {
  return list.map((element, at) => (at === index ? change(element) : element));
}

export function removeAt<T>(list: readonly T[], index: number): T[] {
  return list.filter((_, at) => at !== index);
}

/** A copy with one element moved by `by` places; unchanged where it would leave the list. */
export function moveBy<T>(list: readonly T[], index: number, by: number): T[] {
  const to = index + by;
  const moved = list[index];
  if (moved === undefined || to < 0 || to >= list.length) return [...list];
  const rest = removeAt(list, index);
  return [...rest.slice(0, to), moved, ...rest.slice(to)];
}
