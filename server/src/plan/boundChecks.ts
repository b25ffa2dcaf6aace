import { orListed } from "../notation/orListed.ts";
import type { Subject } from "../notation/vocabulary.ts";
import { type Checking, tell } from "./checks.ts";
import type { Limits } from "./limits.ts";
import type { NotEvaluated } from "./point.ts";
import type { Selection } from "./selectRows.ts";

interface Bounded {
  readonly what: NotEvaluated["rule"];
  /** Any of them, in force or switched off by `none`, is an answer. */
  readonly subjects: readonly Subject[];
  /** "…, so …", in the middle of a sentence. */
  readonly lacks: string;
  readonly held: (warned: boolean) => string;
}

/** What every point is written for: the bank inside its limit, and the speed off the stall. */
const bounded: readonly Bounded[] = [
  { what: "bank", subjects: ["bank"], lacks: "bounds the bank", held: () => "it is not held here" },
  {
    what: "margin",
    subjects: ["ratio", "margin", "overshoot"],
    lacks: "asks for a margin over the stall",
    held: (warned) => `only the stall itself${warned ? " and its warning are" : " is"} checked here`,
  },
];

/**
 * A phase that the limits forgot must not look like one that passed: tells what no row in force bounds,
 * unless `none` says that it is meant. A row in error has been told, and may have been the one.
 */
export function checkBounds(checking: Checking, limits: Limits, selection: Selection): NotEvaluated[] {
  if (limits.lost.length > 0) return [];
  const { point, evaluated } = checking;
  const subjects = new Set<Subject>();
  for (const { subject, afterShear } of [...selection.groups, ...selection.off]) {
    if (!afterShear) subjects.add(subject);
  }
  const warned = evaluated.ready.frame.warning !== null;
  const skipped: NotEvaluated[] = [];
  for (const { what, subjects: any, lacks, held } of bounded) {
    if (any.some((subject) => subjects.has(subject))) continue;
    const why = `Nothing in ${limits.name} ${lacks} in ${point.phase}`;
    skipped.push({ rule: what, why: `${why}.` });
    const rows = any.map((subject, at) => `\`${at === 0 ? `must ${point.phase} ` : ""}${subject}\``);
    tell(
      checking,
      "unbounded",
      point.phaseClause,
      `${why}, so ${held(warned)}: write a row with its figure (${orListed(rows)}), or with \`none\` where no limit is meant.`,
      { related: [{ origin: limits.origin, message: `The limits ${limits.name}.` }] },
    );
  }
  return skipped;
}
