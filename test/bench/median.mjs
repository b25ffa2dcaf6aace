/** The median of the timings. */
export function median(timings) {
  const sorted = [...timings].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}

/** Milliseconds that a call takes. */
export function timed(call) {
  const start = performance.now();
  call();
  return performance.now() - start;
}
