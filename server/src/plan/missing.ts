import type { Keyword } from "../notation/vocabulary.ts";
import type { Point } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import { lineOf, type Origin } from "./origin.ts";
import type { Withheld } from "./point.ts";
import { findingAt, listed, originOf, stateFix } from "./site.ts";
import { type CarriedKey, keywordOf, type State } from "./state.ts";

/** What is never assumed, in the order a note states it. */
const required = ["aircraft", "mass", "config", "altitude", "speed"] as const;

/** What is assumed where nobody states it, but not where a sweep stated many values of it. */
const assumable = ["deviation", "cg", "contamination"] as const;

type NeverAssumed = (typeof required)[number] | (typeof assumable)[number];

function wanted(carried: Point["applied"]["carried"], clauses: Point["clauses"]): readonly NeverAssumed[] {
  return assumable.filter((key) => carried[key]?.swept && !clauses[key === "deviation" ? "isa" : key]);
}

/** What is written to state it; the figure is the author's, so that no example passes for one. */
const written: Readonly<Record<NeverAssumed, string>> = {
  aircraft: "fly NAME",
  mass: "weight … t",
  config: "config NAME",
  altitude: "altitude … ft",
  speed: "speed … kt",
  deviation: "isa +…",
  cg: "cg … %",
  contamination: "contamination … %",
};

const spoken: Readonly<Record<NeverAssumed, string>> = {
  aircraft: "an aeroplane",
  mass: "a weight",
  config: "a configuration",
  altitude: "an altitude",
  speed: "a speed",
  deviation: "a temperature",
  cg: "a cg",
  contamination: "its contamination",
};

/**
 * Tells what the point needs and nobody stated, once: later points that wait for the same value
 * give no figures and name the line where it was told.
 */
export function findMissing(
  point: Point,
  before: State,
  findings: Finding[],
): { readonly withheld: Withheld | null; readonly told: State["told"] } {
  const { applied, clauses, site, phaseClause } = point;
  const told: { [K in CarriedKey]?: Origin } = {};
  const missing: NeverAssumed[] = [];
  let withheld: Withheld | null = null;
  const swept = wanted(applied.carried, clauses);
  for (const key of [...required, ...swept]) {
    const carried = applied.carried[key];
    if ((carried && !carried.swept) || (key === "speed" && clauses.speed)) continue;
    const origin = applied.afresh ? undefined : before.told[key];
    if (origin) {
      told[key] = origin;
      withheld ??= { origin, code: "missing-value" };
    } else if (!spoilt(point, keywordOf[key])) missing.push(key);
  }
  if (missing.length === 0) return { withheld, told };
  const origin = originOf(site, phaseClause);
  for (const key of missing) told[key] = origin;
  const names = listed(missing.map((key) => spoken[key]));
  const clausesToWrite = listed(missing.map((key) => `\`${written[key]}\``));
  const sweep = missing.map((key) => applied.carried[key]).find((one) => one?.swept);
  const where = sweep
    ? `for of the values that are swept on line ${lineOf(sweep.origin) + 1} none goes on: write ${clausesToWrite} here`
    : applied.newSector
      ? `and a new sector begins here, so that nothing from before the landing is carried into it: write ${clausesToWrite} here`
      : `and no line up to here states ${missing.length === 1 ? "it" : "them"}: write ${clausesToWrite} here, or in a setting before it`;
  findings.push(
    findingAt("missing-value", phaseClause, `This point needs ${names}, ${where}.`, {
      ...(sweep ? { mentions: [sweep.origin] } : {}),
      fixes: missing.map((key) => stateFix(site.block, keywordOf[key], `Write ${keywordOf[key]}`)),
    }),
  );
  return { withheld: withheld ?? { origin, code: "missing-value" }, told };
}

/** True where a clause of the block was to state it but is in error, which has been told. */
function spoilt(point: Point, keyword: Keyword): boolean {
  return point.clauses.spoiled.some(
    ({ clause }) => clause.keyword === keyword || clause.meant === keyword || clause.keyword === null,
  );
}
