import type { Part } from "./parts.ts";

/** One clause as it was and as it is; null on the side where it does not stand. */
export interface PartChange {
  readonly old: Part | null;
  readonly new: Part | null;
}

/**
 * What was edited between two versions of a block, clause by clause. The order of clauses, the lines
 * they stand on, blanks and the case of words are no edit: none of them means anything.
 */
export function partChanges(olds: readonly Part[], news: readonly Part[]): readonly PartChange[] {
  const gone = without(olds, news);
  const come = without(news, olds);
  const partners = closest(gone, come);
  const taken = new Set(partners.values());
  return [
    ...gone.map((old): PartChange => ({ old, new: partners.get(old) ?? null })),
    ...come.filter((one) => !taken.has(one)).map((one): PartChange => ({ old: null, new: one })),
  ];
}

/** How alike two blocks are: four for each clause that stands in both, one for each other keyword that does. */
export function likeness(olds: readonly Part[], news: readonly Part[]): number {
  const keywords = new Set(without(olds, news).map((part) => part.keyword));
  return 4 * saidInBoth(olds, news) + without(news, olds).filter((part) => keywords.has(part.keyword)).length;
}

export function saidInBoth(olds: readonly Part[], news: readonly Part[]): number {
  return olds.length - without(olds, news).length;
}

/** The parts of one side that the other does not say, each as often as it says it more. */
function without(parts: readonly Part[], others: readonly Part[]): readonly Part[] {
  const left = new Map<string, number>();
  for (const { says } of others) left.set(says, (left.get(says) ?? 0) + 1);
  return parts.filter(({ says }) => {
    const count = left.get(says) ?? 0;
    if (count > 0) left.set(says, count - 1);
    return count === 0;
  });
}

/** Clauses of one keyword belong together, those with the most words in common first. */
function closest(gone: readonly Part[], come: readonly Part[]): ReadonlyMap<Part, Part> {
  const candidates = gone.flatMap((old) =>
    come
      .filter((one) => one.keyword === old.keyword)
      .map((one) => ({ old, new: one, common: inCommon(old.words, one.words) })),
  );
  candidates.sort((a, b) => b.common - a.common);
  const partners = new Map<Part, Part>();
  const taken = new Set<Part>();
  for (const { old, new: one } of candidates) {
    if (partners.has(old) || taken.has(one)) continue;
    partners.set(old, one);
    taken.add(one);
  }
  return partners;
}

/** Words that both begin with weigh most: they say what a clause is about. */
function inCommon(olds: readonly string[], news: readonly string[]): number {
  let lead = 0;
  while (lead < olds.length && olds[lead] === news[lead]) lead++;
  const others = new Set(news);
  return 10 * lead + olds.filter((word) => others.has(word)).length;
}
