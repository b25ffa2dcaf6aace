import { calibratedFromIndicated } from "../flight/ias.ts";
import type { CardSpeed, Stated } from "./card.ts";
import { byTolerance, type Checking, carriedFrom, clauseFor, sentence, tell } from "./checks.ts";
import type { Corner } from "./corner.ts";
import type { FindingCode } from "./findings.ts";
import { catalogue } from "./findings.ts";
import { formatAltitude, formatDistinct, formatLoad, formatMach, formatMass, formatSpeed } from "./format.ts";
import type { NotEvaluated } from "./point.ts";
import { ALLOWANCE } from "./rules.ts";
import { oneStepLower } from "./site.ts";

/** The card's own limits: masses, speeds, ceiling, load factors. */
export function checkAirframeLimits(checking: Checking): NotEvaluated[] {
  const skipped: NotEvaluated[] = [];
  checkMass(checking);
  checkSpeeds(checking, skipped);
  checkMinimumControl(checking, skipped);
  checkMach(checking);
  checkCeiling(checking);
  checkLoad(checking);
  return skipped;
}

/** A limit that only the indicator shows, where the ias table does not reach: it is said, never passed over. */
function indicatedUnknown(
  checking: Checking,
  code: FindingCode,
  name: string,
  stated: Stated<CardSpeed>,
  skipped: NotEvaluated[],
): void {
  const { ready } = checking.evaluated;
  const why = ready.frame.ias
    ? `The ias table of ${ready.configuration.name} does not reach ${name}, or the load here.`
    : `${name} is an indicated speed, and the card has no ias table for ${ready.configuration.name}.`;
  skipped.push({ rule: code, why });
  tell(
    checking,
    "not-evaluated",
    checking.point.phaseClause,
    `The speed could not be held against ${name}. ${why}`,
    { severity: "warning", related: [{ origin: stated.origin, message: `The card states ${name} here.` }] },
  );
}

function above(value: number, limit: number): boolean {
  return limit + Math.abs(limit) * ALLOWANCE < value;
}

function checkMass(checking: Checking): void {
  const { point, evaluated } = checking;
  const { card, mass } = evaluated.ready;
  const at = clauseFor(point, "weight");
  const related = carriedFrom(point, ["mass"]);
  const emergency = point.clauses.emergency !== null;
  const severity = emergency ? oneStepLower(catalogue.overweight.severity) : catalogue.overweight.severity;
  const over = (limit: number, what: string, origin: { readonly origin: Stated<unknown>["origin"] }) => {
    if (!above(mass.high, limit)) return false;
    const [weight, most] = formatDistinct(mass.high, limit, (kg, more) => formatMass(kg, limit, more));
    const lead = byTolerance(!above(mass.nominal, limit));
    tell(
      checking,
      "overweight",
      at,
      sentence(
        lead,
        `The weight ${weight} exceeds the ${most} ${what} of ${card.name}: burn or unload, or check the figure.`,
      ),
      {
        severity,
        figure: mass.high,
        related: [...related, { origin: origin.origin, message: `The masses of ${card.name}.` }],
      },
    );
    return true;
  };
  const masses = card.mass;
  const landing = card.landingMass;
  const told =
    point.phase === "landing" && landing?.value
      ? over(landing.value, "greatest landing mass", landing)
      : false;
  if (!told && masses?.value) over(masses.value.high, "greatest mass", masses);
  if (masses?.value && above(masses.value.low, mass.low)) {
    const least = masses.value.low;
    const [weight, limit] = formatDistinct(mass.low, least, (kg, more) => formatMass(kg, least, more));
    const lead = byTolerance(!above(least, mass.nominal));
    tell(
      checking,
      "underweight",
      at,
      sentence(
        lead,
        `The weight ${weight} is below the ${limit} least mass of ${card.name}: check the figure.`,
      ),
      {
        figure: mass.low,
        related: [...related, { origin: masses.origin, message: `The masses of ${card.name}.` }],
      },
    );
  }
}

function checkSpeeds(checking: Checking, skipped: NotEvaluated[]): void {
  const { card, configuration } = checking.evaluated.ready;
  maximumSpeed(checking, skipped, "over-vfe", "vfe", configuration.vfe, ` of ${configuration.name}`);
  maximumSpeed(checking, skipped, "over-vmo", "vmo", card.vmo, "");
  maximumSpeed(checking, skipped, "over-vne", "vne", card.vne, "");
  maximumSpeed(checking, skipped, "over-vno", "vno", card.vno, "");
}

/** The CAS of a limit at a corner: an indicated one goes through the configuration's table there. */
function limitCas(checking: Checking, limit: CardSpeed, corner: Corner): number | null {
  if (!limit.ias) return limit.speed;
  const { frame } = checking.evaluated.ready;
  if (!frame.ias || !(0 < corner.load)) return null;
  return calibratedFromIndicated(
    frame.ias,
    limit.speed,
    corner.load,
    corner.input.mass,
    frame.lift.referenceMass,
  );
}

function maximumSpeed(
  checking: Checking,
  skipped: NotEvaluated[],
  code: FindingCode,
  name: string,
  stated: Stated<CardSpeed> | null,
  of: string,
): void {
  const limit = stated?.value;
  if (!stated || !limit) return;
  const { corners } = checking.evaluated;
  if (limit.ias && corners.all.some((one) => limitCas(checking, limit, one) === null)) {
    indicatedUnknown(checking, code, name, stated, skipped);
  }
  const worst = worstExcess(checking, limit, corners.all);
  if (!worst || !above(worst.corner.cas, worst.cas)) return;
  const nominalLimit = limitCas(checking, limit, corners.nominal);
  const nominalPasses = nominalLimit !== null && !above(corners.nominal.cas, nominalLimit);
  const [flown, most] = formatDistinct(worst.corner.cas, worst.cas, flownSpeed, (mps, more) =>
    formatSpeed(mps, more, { rounding: "down" }),
  );
  tell(
    checking,
    code,
    clauseFor(checking.point, "speed"),
    sentence(
      byTolerance(nominalPasses),
      `The speed ${flown} exceeds the ${name}${of}, ${most}: slow down${code === "over-vfe" ? " or change the configuration" : ""}.`,
    ),
    {
      figure: worst.corner.cas,
      related: [
        ...carriedFrom(checking.point, code === "over-vfe" ? ["speed", "config"] : ["speed"]),
        { origin: stated.origin, message: `The card states ${name} here.` },
      ],
    },
  );
}

function flownSpeed(mps: number, more: number): string {
  return formatSpeed(mps, more);
}

function worstExcess(checking: Checking, limit: CardSpeed, corners: readonly Corner[]) {
  let worst: { corner: Corner; cas: number } | null = null;
  for (const corner of corners) {
    const cas = limitCas(checking, limit, corner);
    if (cas === null) continue;
    if (!worst || worst.corner.cas - worst.cas < corner.cas - cas) worst = { corner, cas };
  }
  return worst;
}

/** An error with an engine out; a warning where an engine may fail next: takeoff, departure and missed. */
function checkMinimumControl(checking: Checking, skipped: NotEvaluated[]): void {
  const { point, evaluated } = checking;
  const { card } = evaluated.ready;
  const limit = card.vmca?.value;
  if (!card.vmca || !limit) return;
  const engineOut = evaluated.conditions.engineOut !== null;
  const exposed = point.phase === "takeoff" || point.phase === "departure" || point.phase === "missed";
  if (!engineOut && !exposed) return;
  if (limit.ias && evaluated.corners.all.some((one) => limitCas(checking, limit, one) === null)) {
    indicatedUnknown(checking, "below-vmca", "vmca", card.vmca, skipped);
  }
  for (const corner of [...evaluated.corners.all].sort((a, b) => a.cas - b.cas)) {
    const least = limitCas(checking, limit, corner);
    if (least === null || !above(least, corner.cas)) continue;
    const [flown, minimum] = formatDistinct(corner.cas, least, flownSpeed, (mps, more) =>
      formatSpeed(mps, more, { rounding: "up" }),
    );
    tell(
      checking,
      "below-vmca",
      clauseFor(point, "speed"),
      `The speed ${flown} is below the minimum control speed in the air, ${minimum}${engineOut ? ", with an engine out" : ", should an engine fail"}: fly faster.`,
      {
        severity: engineOut ? "error" : "warning",
        figure: corner.cas,
        related: [
          ...carriedFrom(point, ["speed"]),
          { origin: card.vmca.origin, message: "The card states vmca here." },
        ],
      },
    );
    return;
  }
}

function checkMach(checking: Checking): void {
  const { card } = checking.evaluated.ready;
  const limit = card.mmo?.value;
  const { mach } = checking.evaluated.conditions;
  if (!card.mmo || !limit || !above(mach.high, limit)) return;
  const [flown, most] = formatDistinct(mach.high, limit, formatMach);
  tell(
    checking,
    "over-mmo",
    clauseFor(checking.point, "speed"),
    sentence(
      byTolerance(!above(mach.nominal, limit)),
      `The Mach number ${flown} exceeds the mmo, ${most}: slow down or fly lower.`,
    ),
    {
      figure: mach.high,
      related: [
        ...carriedFrom(checking.point, ["speed", "altitude"]),
        { origin: card.mmo.origin, message: "The card states mmo here." },
      ],
    },
  );
}

function checkCeiling(checking: Checking): void {
  const { card } = checking.evaluated.ready;
  const limit = card.ceiling?.value;
  const { pressureAltitude } = checking.evaluated.conditions;
  if (!card.ceiling || !limit || !above(pressureAltitude.high, limit)) return;
  const [flown, most] = formatDistinct(pressureAltitude.high, limit, formatAltitude);
  tell(
    checking,
    "over-ceiling",
    clauseFor(checking.point, "altitude"),
    sentence(
      byTolerance(!above(pressureAltitude.nominal, limit)),
      `The pressure altitude ${flown} is above the ceiling of ${card.name}, ${most}: fly lower.`,
    ),
    {
      figure: pressureAltitude.high,
      related: [
        ...carriedFrom(checking.point, ["altitude"]),
        { origin: card.ceiling.origin, message: "The card states the ceiling here." },
      ],
    },
  );
}

function checkLoad(checking: Checking): void {
  const { configuration } = checking.evaluated.ready;
  const limit = configuration.load?.value;
  const { load } = checking.evaluated.conditions;
  if (!configuration.load || !limit) return;
  const over = above(load.high, limit.high);
  if (!over && !above(limit.low, load.low)) return;
  const [worst, bound, way] = over
    ? [load.high, limit.high, "bank or pull less"]
    : [load.low, limit.low, "unload less"];
  const nominalPasses = over ? !above(load.nominal, limit.high) : !above(limit.low, load.nominal);
  const [flown, allowed] = formatDistinct(worst, bound, formatLoad);
  const text = `The load factor ${flown} ${over ? "exceeds" : "is below"} the limit of ${configuration.name}, ${allowed}: ${way}.`;
  tell(
    checking,
    "over-load-limit",
    clauseFor(checking.point, "load"),
    sentence(byTolerance(nominalPasses), text),
    { related: [{ origin: configuration.load.origin, message: "The card states the load factors here." }] },
  );
}
