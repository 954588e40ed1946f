/** Arrays of doubles at a raw address: element i. */
@inline
export function at(values: usize, i: i32): f64 {
  return load<f64>(values + (<usize>i << 3));
}

@inline
export function put(values: usize, i: i32, value: f64): void {
  store<f64>(values + (<usize>i << 3), value);
}
