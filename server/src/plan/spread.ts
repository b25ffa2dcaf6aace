/** A figure at the nominal inputs and its extremes over the corners of their tolerances. */
export interface Spread {
  readonly nominal: number;
  readonly low: number;
  readonly high: number;
}

/** A figure without tolerance. */
export function exactly(value: number): Spread {
  return { nominal: value, low: value, high: value };
}
