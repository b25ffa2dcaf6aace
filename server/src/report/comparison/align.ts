/** One of the old sequence with the one of the new that it became, by their places. */
export interface Pair {
  readonly old: number;
  readonly new: number;
}

/** Beyond so many possible pairs the sequences are gone through once, each looking a little ahead. */
const MOST_CELLS = 4_000_000;
const LOOK_AHEAD = 60;

/**
 * Pairs two sequences without crossing so that the sum of the weights is greatest; a weight of 0
 * never pairs. Of equal ways the one that pairs earliest.
 */
export function align<T>(
  olds: readonly T[],
  news: readonly T[],
  weight: (old: T, now: T) => number,
): readonly Pair[] {
  if (olds.length === 0 || news.length === 0) return [];
  if (MOST_CELLS < olds.length * news.length) return ahead(olds, news, weight);
  const width = news.length + 1;
  const best = new Float64Array((olds.length + 1) * width);
  const at = (i: number, j: number) => best[i * width + j] as number;
  const weights = new Float64Array(olds.length * news.length);
  for (let i = olds.length - 1; 0 <= i; i--) {
    for (let j = news.length - 1; 0 <= j; j--) {
      const own = weight(olds[i] as T, news[j] as T);
      weights[i * news.length + j] = own;
      const paired = own > 0 ? own + at(i + 1, j + 1) : 0;
      best[i * width + j] = Math.max(at(i + 1, j), at(i, j + 1), paired);
    }
  }
  const pairs: Pair[] = [];
  for (let i = 0, j = 0; i < olds.length && j < news.length; ) {
    const own = weights[i * news.length + j] as number;
    if (own > 0 && at(i, j) === own + at(i + 1, j + 1)) pairs.push({ old: i++, new: j++ });
    else if (at(i, j) === at(i + 1, j)) i++;
    else j++;
  }
  return pairs;
}

function ahead<T>(
  olds: readonly T[],
  news: readonly T[],
  weight: (old: T, now: T) => number,
): readonly Pair[] {
  const pairs: Pair[] = [];
  let from = 0;
  olds.forEach((old, i) => {
    const end = Math.min(news.length, from + LOOK_AHEAD);
    for (let j = from; j < end; j++) {
      if (weight(old, news[j] as T) <= 0) continue;
      pairs.push({ old: i, new: j });
      from = j + 1;
      return;
    }
  });
  return pairs;
}
