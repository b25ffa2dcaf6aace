import type { Phase } from "../notation/vocabulary.ts";
import { carriedFrom } from "./checks.ts";
import type { Point } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import { formatPercent } from "./format.ts";
import { lineOf } from "./origin.ts";
import { findingAt, listed, stateFix } from "./site.ts";
import { type CarriedKey, keywordOf } from "./state.ts";

/** Near the ground what was flown somewhere else is no default. */
const nearGround = new Set<Phase>(["takeoff", "circling", "landing"]);

/** Checks that need no figures: what was carried where it should be stated, and the wing at takeoff. */
export function checkState(point: Point, findings: Finding[]): void {
  checkCarriedOver(point, findings);
  checkContaminatedTakeoff(point, findings);
  checkDeadEngine(point, findings);
}

function checkCarriedOver(point: Point, findings: Finding[]): void {
  const { phase, applied, site, phaseClause } = point;
  if (!phase || !nearGround.has(phase)) return;
  const keys = (["altitude", "speed", "config"] as const satisfies readonly CarriedKey[]).filter((key) => {
    const carried = applied.carried[key];
    if (!carried || carried.origin.block === site.anchor || statedHere(point, key)) return false;
    return carried.value !== null && carried.phase !== null && carried.phase !== phase;
  });
  if (keys.length === 0) return;
  const parts = keys.map((key) => {
    const carried = applied.carried[key];
    return `the ${carriedWord[key]} of the ${carried?.phase} on line ${carried ? lineOf(carried.origin) + 1 : 0}`;
  });
  findings.push(
    findingAt(
      "carried-over",
      phaseClause,
      `This ${phase} takes over ${listed(parts)}: state ${keys.length === 1 ? "it" : "them"} here, for it seldom is the same.`,
      {
        related: carriedFrom(point, keys),
        mentions: keys.flatMap((key) => applied.carried[key]?.origin ?? []),
        fixes: keys.map((key) => stateFix(site.block, keywordOf[key], `Write ${keywordOf[key]}`)),
      },
    ),
  );
}

const carriedWord = { altitude: "altitude", speed: "speed", config: "configuration" } as const;

function statedHere(point: Point, key: "altitude" | "speed" | "config"): boolean {
  return point.clauses[key] !== null;
}

/** No takeoff with frost, ice or snow on the wing (14 CFR 91.527, 121.629); rain is no such thing. */
function checkContaminatedTakeoff(point: Point, findings: Finding[]): void {
  const contamination = point.applied.carried.contamination?.value;
  if (point.phase !== "takeoff" || !contamination || contamination.rain) return;
  if (contamination.loss.high <= 0) return;
  const placed = point.clauses.contamination?.placed ?? point.phaseClause;
  const what =
    contamination.contaminant ?? `a loss of ${formatPercent(contamination.loss.high)} of maximum lift`;
  findings.push(
    findingAt(
      "contaminated-takeoff",
      placed,
      `A takeoff with ${what} on the wing is forbidden (14 CFR 91.527, 121.629): the wing must be clean, so write \`contamination none\` once it is.`,
      { related: carriedFrom(point, ["contamination"]) },
    ),
  );
}

function checkDeadEngine(point: Point, findings: Finding[]): void {
  const engine = point.applied.carried.engineOut?.value;
  const bank = point.clauses.bank;
  if (!bank || !engine || bank.body.side !== engine) return;
  findings.push(
    findingAt(
      "turn-into-dead-engine",
      bank.placed,
      `This turn to the ${engine} is towards the dead engine: check that the minimum control speed and the bank allow it.`,
      { related: carriedFrom(point, ["engineOut"]) },
    ),
  );
}
