import { align, type Pair } from "./align.ts";
import { inOrder } from "./inOrder.ts";
import type { Item } from "./items.ts";
import { likeness, saidInBoth } from "./partChanges.ts";
import type { Part } from "./parts.ts";

export interface Match {
  readonly old: Item | null;
  readonly new: Item | null;
  /** True where its order among the others changed. */
  readonly moved: boolean;
}

/** Above every likeness, so that more pairs always count before closer ones. */
const ONE_PAIR = 1_000_000;

/**
 * Finds each point and setting of the old revision in the new one. What says the same comes first,
 * then what has the same phase and title; then, between two neighbours that were found, what has the
 * same phase and something else in common, or else the same title or half of its clauses. What is left
 * came or went.
 */
export function matchItems(olds: readonly Item[], news: readonly Item[]): readonly Match[] {
  const matching = new Matching(olds, news);
  matching.trim();
  matching.everywhere((old, now) => (old.content === now.content ? 1 : 0));
  matching.everywhere((old, now) => (isTitled(old) && sameHead(old, now) ? alike(old, now) : 0));
  matching.inGaps((old, now) => (sameHead(old, now) && related(old, now) ? alike(old, now) : 0));
  matching.inGaps((old, now) => (samePhase(old, now) && mayBeRetitled(old, now) ? alike(old, now) : 0));
  matching.inGaps((old, now) => (sameTitle(old, now) || sharesHalf(old, now) ? alike(old, now) : 0));
  matching.everywhere((old, now) => (samePhase(old, now) && sharesHalf(old, now) ? alike(old, now) : 0));
  return matching.matches();
}

type Weight = (old: Item, now: Item) => number;

class Matching {
  readonly #olds: readonly Item[];
  readonly #news: readonly Item[];
  readonly #toNew = new Map<number, number>();
  readonly #taken = new Set<number>();

  constructor(olds: readonly Item[], news: readonly Item[]) {
    this.#olds = olds;
    this.#news = news;
  }

  /** Both ends as far as they are the same: what is left to compare is small. */
  trim(): void {
    const [olds, news] = [this.#olds, this.#news];
    const shorter = Math.min(olds.length, news.length);
    let head = 0;
    while (head < shorter && olds[head]?.content === news[head]?.content) this.#pair(head, head++);
    for (let tail = 1; tail <= shorter - head; tail++) {
      const [old, now] = [olds.length - tail, news.length - tail];
      if (olds[old]?.content !== news[now]?.content) break;
      this.#pair(old, now);
    }
  }

  /** In order as far as it goes, then the others wherever they stand. */
  everywhere(weight: Weight): void {
    this.#align(this.#freeOlds(), this.#freeNews(), weight);
    const news = new Set(this.#freeNews());
    for (const old of this.#freeOlds()) {
      let best: Item | null = null;
      let most = 0;
      for (const now of news) {
        const own = weight(old, now);
        if (own <= most) continue;
        most = own;
        best = now;
      }
      if (!best) continue;
      this.#pair(old.index, best.index);
      news.delete(best);
    }
  }

  /** Only between two neighbours that kept their order. */
  inGaps(weight: Weight): void {
    const anchors = [...inOrder(this.#pairs()), { old: this.#olds.length, new: this.#news.length }];
    const [olds, news] = [this.#freeOlds(), this.#freeNews()];
    let from: Pair = { old: -1, new: -1 };
    for (const to of anchors) {
      if (from.old + 1 < to.old && from.new + 1 < to.new) {
        this.#align(between(olds, from.old, to.old), between(news, from.new, to.new), weight);
      }
      from = to;
    }
  }

  matches(): readonly Match[] {
    const kept = new Set(inOrder(this.#pairs()).map((pair) => pair.new));
    const from = new Map(this.#pairs().map((pair) => [pair.new, pair.old]));
    const found = this.#news.map((now): Match => {
      const old = this.#olds[from.get(now.index) ?? -1] ?? null;
      return { old, new: now, moved: old !== null && !kept.has(now.index) };
    });
    return withGone(found, this.#freeOlds());
  }

  #align(olds: readonly Item[], news: readonly Item[], weight: Weight): void {
    for (const pair of align(olds, news, weight)) {
      this.#pair((olds[pair.old] as Item).index, (news[pair.new] as Item).index);
    }
  }

  #pair(old: number, now: number): void {
    this.#toNew.set(old, now);
    this.#taken.add(now);
  }

  #pairs(): readonly Pair[] {
    return [...this.#toNew].map(([old, now]) => ({ old, new: now }));
  }

  #freeOlds(): readonly Item[] {
    return this.#olds.filter((one) => !this.#toNew.has(one.index));
  }

  #freeNews(): readonly Item[] {
    return this.#news.filter((one) => !this.#taken.has(one.index));
  }
}

/** What went is told where it stood: behind the one that was before it. */
function withGone(found: readonly Match[], gone: readonly Item[]): readonly Match[] {
  const byOld = [...gone];
  const placed: Match[] = [];
  const goneBefore = (index: number) => {
    while (byOld[0] && byOld[0].index < index)
      placed.push({ old: byOld.shift() as Item, new: null, moved: false });
  };
  for (const match of found) {
    if (match.old && !match.moved) goneBefore(match.old.index);
    placed.push(match);
  }
  goneBefore(Number.POSITIVE_INFINITY);
  return placed;
}

function between(items: readonly Item[], from: number, to: number): readonly Item[] {
  return items.filter(({ index }) => from < index && index < to);
}

function alike(old: Item, now: Item): number {
  return ONE_PAIR + likeness(old.parts, now.parts);
}

function isTitled(item: Item): boolean {
  return item.point !== null && item.point.title !== null;
}

function sameHead(old: Item, now: Item): boolean {
  return samePhase(old, now) && old.point?.title === now.point?.title;
}

function samePhase(old: Item, now: Item): boolean {
  return (old.point === null) === (now.point === null) && old.point?.phase === now.point?.phase;
}

function sameTitle(old: Item, now: Item): boolean {
  return isTitled(old) && now.point !== null && old.point?.title === now.point.title;
}

/** Two settings have nothing but their clauses to know them by. */
function related(old: Item, now: Item): boolean {
  return old.point !== null || likeness(old.parts, now.parts) > 0;
}

/** Under another title it is the same point only where something else of it stayed. */
function mayBeRetitled(old: Item, now: Item): boolean {
  return related(old, now) && (!(isTitled(old) && isTitled(now)) || ownSaidInBoth(old, now) > 0);
}

function sharesHalf(old: Item, now: Item): boolean {
  if ((old.point === null) !== (now.point === null)) return false;
  const shared = ownSaidInBoth(old, now);
  return 0 < shared && Math.max(own(old).length, own(now).length) <= 2 * shared;
}

function ownSaidInBoth(old: Item, now: Item): number {
  return saidInBoth(own(old), own(now));
}

function own({ parts }: Item): readonly Part[] {
  return parts.filter((part) => part.keyword !== "phase");
}
