import type { ResultName } from "../notation/vocabulary.ts";
import { checkClaims } from "./claims.ts";
import { describePoint, type Open } from "./describe.ts";
import type { Evaluated } from "./evaluated.ts";
import type { StatedPoint } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import { lineOf } from "./origin.ts";
import type { PointResult } from "./point.ts";
import { resultEntry } from "./results.ts";
import { review } from "./review.ts";
import type { Spread } from "./spread.ts";

/** Holds the claims of a point, then puts what it accepts and expects to what was found. */
export function settle(stated: StatedPoint, open: Open): PointResult {
  const { point, evaluated } = stated;
  const findings: Finding[] = [...stated.findings];
  const claims = checkClaims(
    point.clauses.claims,
    {
      spread: (name) => spreadOver(evaluated, open, name),
      why: (name) => (evaluated ? (evaluated.absent(name) ?? "") : whyNoFigures(stated)),
      mentions: !evaluated && stated.withheld ? [stated.withheld.origin] : [],
    },
    findings,
  );
  return describePoint(stated, claims, review(point, findings, evaluated !== null), open);
}

/** What is in the way in the point itself has been told there. */
function whyNoFigures({ point, withheld }: StatedPoint): string | null {
  if (!withheld || withheld.origin.block === point.site.anchor) return null;
  const { origin, code } = withheld;
  const where = origin.uri === point.site.uri ? `Line ${lineOf(origin) + 1}` : "The card";
  return `${where} has to be mended first (${code}).`;
}

/** The figure of a result with its extremes over all rows of a sweep; null where any row lacks it. */
function spreadOver(evaluated: Evaluated | null, { sweep }: Open, name: ResultName): Spread | null {
  const own = evaluated?.results[name] ?? null;
  if (!sweep || !own) return own;
  let { nominal, low, high } = own;
  // A figure that is nominal by definition has no corners, but it has a worst row.
  const worse = resultEntry(name).unsafeWhenClaimed === "lower" ? Math.max : Math.min;
  for (const { point } of sweep.rows) {
    const spread = point.results?.[name];
    if (!spread) return null;
    nominal = worse(nominal, spread.nominal);
    low = Math.min(low, spread.low);
    high = Math.max(high, spread.high);
  }
  return { nominal, low, high };
}
