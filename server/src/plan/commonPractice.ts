import { openDocument } from "../notation/openDocument.ts";
import { BUILT_IN_URI } from "./builtIn.ts";
import type { Limits } from "./limits.ts";
import { type LimitsDraft, lowerLimits, resolveLimits } from "./lowerLimits.ts";

/** The built-in limits, written in the notation like any other. Every remark names its source. */
export const commonPracticeText = `# Common practice

These limits hold where a note names none. They are nobody's own: each remark names a source, or says
that it is common practice. Replace them with the operator's: \`| limits NAME, from common-practice\`
takes these rows, and a row there replaces the one here that it is about.

| limits common-practice "Built-in limits; to be replaced by the operator's own"
| source "Plumbline, built in" issue 1
| must any bank 30 (common practice, no source)
| should any bank 25 or rate-one when ifr (common practice; ICAO Doc 8168 for holding)
| should any bank 15 above FL300 (common practice says 10 to 15 at higher altitudes; the level is this project's choice)
| must takeoff bank 15 when engine-out (14 CFR 121.189(f))
| must takeoff, departure, missed ratio 1.13, vs 1.2 (14 CFR 25.107(b))
| should climb ratio 1.18, vs 1.25 (14 CFR 25.107(g))
| must approach, circling, landing ratio 1.23, vs 1.3 (14 CFR 25.125(b)(2) for landing; approach and circling are common practice)
| should any overshoot 15 (common practice; 14 CFR 25.143(h) asks no warning to 30 degrees at V2 and to 40 at VFTO and VREF)
| should any buffet 1.3 above FL250 (advisory practice to 14 CFR 25.251(e))
| must manoeuvre bank 60 (14 CFR 91.307(c), in flight)
| should manoeuvre overshoot none (common practice: such an exercise goes to the warning and beyond)
| should manoeuvre bank none when ifr (common practice: the bank is the exercise)
| should manoeuvre bank none above FL300 (common practice: the bank is the exercise)
`;

let draft: LimitsDraft | null = null;
let limits: Limits | null = null;

/** The built-in limits as they are written, for `from common-practice`. Read once. */
export function commonPracticeDraft(): LimitsDraft {
  if (!draft) {
    const [block] = openDocument(commonPracticeText, "plumb").blocks;
    if (!block) throw new Error("The built-in limits hold no block.");
    draft = lowerLimits(block, BUILT_IN_URI);
  }
  return draft;
}

/** The built-in limits. */
export function commonPractice(): Limits {
  limits ??= resolveLimits(commonPracticeDraft(), []);
  return limits;
}
