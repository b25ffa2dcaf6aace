import type { Point, Ready } from "./evaluateStated.ts";
import type { FindingCode } from "./findings.ts";

const always: readonly FindingCode[] = [
  "overweight",
  "underweight",
  "over-vfe",
  "over-vmo",
  "over-mmo",
  "over-vne",
  "over-vno",
  "over-ceiling",
  "over-load-limit",
  "stalled",
  "warning-in-turn",
  "stall-before-warning",
  "no-level-flight",
  "buffet-in-turn",
];

const exposed = new Set(["takeoff", "departure", "missed"]);
const nearGround = new Set(["takeoff", "circling", "landing"]);

/**
 * The checks that this point is held against, its rows apart. Which of them could not be made, and which
 * found something, is told beside it: what remains was checked and held.
 */
export function checksMade({ phase, clauses }: Point, ready: Ready): readonly FindingCode[] {
  const { extras, configuration } = ready;
  const flapless = configuration.name.toLowerCase() === "clean" && !configuration.vfe;
  return [
    ...always.filter((code) => !(code === "over-vfe" && flapless)),
    ...when(phase !== null && exposed.has(phase), "below-vmca"),
    ...when(phase !== null && nearGround.has(phase), "carried-over"),
    ...when(phase === "takeoff", "contaminated-takeoff"),
    ...when(phase === "hold", "over-holding-speed"),
    ...when(extras.gust !== null, "gust-over-stall"),
    ...when(extras.decel !== null, "decel-too-fast"),
    ...when(clauses.load !== null, "load-below-bank"),
  ];
}

function when(applies: boolean, code: FindingCode): readonly FindingCode[] {
  return applies ? [code] : [];
}
