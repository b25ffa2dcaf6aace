/** Pairs with strictly rising arguments. */
export interface Table {
  readonly arguments: readonly number[];
  readonly values: readonly number[];
}

/** A value converted from a table's printed end is inside the table. */
const END_ALLOWANCE = 1e-9;

/**
 * Linear interpolation.
 *
 * @param table two or more pairs with strictly rising arguments
 * @param x the argument
 * @returns the value; exact at the pairs; null outside the table, which is never extrapolated
 *
 * Example: 0.5 between (0, 10) and (1, 20) gives 15.
 */
export function interpolate(table: Table, x: number): number | null {
  const { arguments: xs, values } = table;
  const last = xs.length - 1;
  const first = xs[0];
  const end = xs[last];
  if (first === undefined || end === undefined || !Number.isFinite(x)) return null;
  if (x <= first) return first - Math.abs(first) * END_ALLOWANCE <= x ? (values[0] ?? null) : null;
  if (end <= x) return x <= end + Math.abs(end) * END_ALLOWANCE ? (values[last] ?? null) : null;
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((xs[middle] as number) <= x) low = middle;
    else high = middle;
  }
  const x0 = xs[low] as number;
  const y0 = values[low] as number;
  const x1 = xs[high] as number;
  const y1 = values[high] as number;
  return x === x0 ? y0 : y0 + ((y1 - y0) * (x - x0)) / (x1 - x0);
}
