/** Copies `count` numbers; for the few numbers of a state a loop is several times faster than a view and `set`. */
export function copy(
  from: Float64Array,
  fromAt: number,
  to: Float64Array,
  toAt: number,
  count: number,
): void {
  for (let k = 0; k < count; k += 1) to[toAt + k] = from[fromAt + k]!;
}

/** Whether the first `count` values are finite. */
export function allFinite(values: Float64Array, count: number): boolean {
  for (let k = 0; k < count; k += 1) if (!Number.isFinite(values[k])) return false;
  return true;
}
