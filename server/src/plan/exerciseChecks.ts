import { greatestHoldingFaa, greatestHoldingIcao, type HoldingSpeed } from "../flight/holding.ts";
import { KNOT } from "../flight/units.ts";
import { approachCategories } from "./categories.ts";
import { type Checking, carriedFrom, clauseFor, exerciseSeverity, tell } from "./checks.ts";
import { formatAltitude, formatDecel, formatDistinct, formatMach, formatSpeed } from "./format.ts";
import { ALLOWANCE } from "./rules.ts";
import { listed } from "./site.ts";

/** Reference stall speeds are reached at a deceleration of at most 1 kt/s (14 CFR 25.103(c)). */
const GREATEST_DECELERATION = KNOT;

export function checkDeceleration(checking: Checking): void {
  const { point, evaluated } = checking;
  const { decel } = evaluated.ready.extras;
  if (!decel || !point.clauses.decel || decel.high <= GREATEST_DECELERATION * (1 + ALLOWANCE)) return;
  const [rate, most] = formatDistinct(decel.high, GREATEST_DECELERATION, formatDecel);
  tell(
    checking,
    "decel-too-fast",
    point.clauses.decel.placed,
    `The deceleration ${rate} is faster than ${most}, the most at which stall speeds are defined (14 CFR 25.103(c)): the aeroplane stalls at another speed then, so slow down gently.`,
    { severity: exerciseSeverity(point, "decel-too-fast"), figure: decel.high },
  );
}

/** A hold faster than the greatest holding speeds leaves the airspace that is protected for it. */
export function checkHolding(checking: Checking): void {
  const { point, evaluated } = checking;
  if (point.phase !== "hold") return;
  const { nominal, low, high } = evaluated.conditions.altitude;
  const category = approachCategories(evaluated.ready.card, evaluated.ready.configuration)?.icao ?? null;
  const overAt = (altitude: number) =>
    [
      tooFast(checking, greatestHoldingIcao(altitude, category), "ICAO Doc 8168"),
      tooFast(checking, greatestHoldingFaa(altitude), "the FAA's AIM, 5-3-8"),
    ].filter((one) => one !== null);
  // Each band of altitudes has its own, and a tolerance may reach into the next: most is told first.
  const [altitude, over] = [nominal, low, high]
    .map((at) => [at, overAt(at)] as const)
    .reduce((most, other) => (most[1].length < other[1].length ? other : most));
  if (over.length === 0) return;
  const bounds = over.map(({ bound, source }) => `${bound} (${source})`);
  tell(
    checking,
    "over-holding-speed",
    clauseFor(point, "speed"),
    `The speed ${over[0]?.flown} is over the greatest holding speed at ${formatAltitude(altitude)}, ${listed(bounds)}: slow down, or ask for a hold that allows it.`,
    { related: carriedFrom(point, ["speed", "altitude"]) },
  );
}

function tooFast(
  { evaluated }: Checking,
  limit: HoldingSpeed,
  source: string,
): { readonly flown: string; readonly bound: string; readonly source: string } | null {
  const { ias, cas, mach } = evaluated.conditions;
  if (limit.kind === "mach") {
    if (mach.high <= limit.mach * (1 + ALLOWANCE)) return null;
    const [flown, bound] = formatDistinct(mach.high, limit.mach, formatMach);
    return { flown, bound, source };
  }
  // Without the card's ias table the calibrated speed stands for the indicated one.
  const speed = (ias ?? cas).high;
  if (speed <= limit.speed * (1 + ALLOWANCE)) return null;
  const type = ias ? "ias" : "cas";
  const [flown, bound] = formatDistinct(
    speed,
    limit.speed,
    (mps, more) => formatSpeed(mps, more, { type }),
    (mps, more) => formatSpeed(mps, more, { type: "ias" }),
  );
  return { flown, bound, source };
}
