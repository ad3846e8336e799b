/** Doubles in memory: entry i of the array at address p. */
@inline export function at(p: usize, i: i32): f64 {
  return load<f64>(p + ((<usize>i) << 3));
}

@inline export function put(p: usize, i: i32, value: f64): void {
  store<f64>(p + ((<usize>i) << 3), value);
}

@inline export function copy(to: usize, from: usize, n: i32): void {
  memory.copy(to, from, (<usize>n) << 3);
}
