import type { ResultName } from "../notation/vocabulary.ts";
import type { Corner } from "./corner.ts";
import { type Corners, spreadOf } from "./corners.ts";
import type { Ready } from "./evaluateStated.ts";
import type { ReferenceSpeed } from "./point.ts";
import { manoeuvringCas, type Reference, type ReferenceName, referenceSpeed } from "./reference.ts";
import { exactly, type Spread } from "./spread.ts";

export type Results = Readonly<Record<ResultName, Spread | null>>;

/** Results that the corners give; the reference speeds hold at the nominal state alone. */
type CornerResult = Exclude<ResultName, ReferenceName | "va">;

const figureOf: Readonly<Record<CornerResult, (corner: Corner) => number>> = {
  vs1g: (corner) => corner.vs1g,
  overshoot: (corner) => corner.overshoot,
  stall: (corner) => corner.stall,
  warning: (corner) => corner.warning,
  ratio: (corner) => corner.ratio,
  margin: (corner) => corner.margin,
  load: (corner) => corner.load,
  "stall-load": (corner) => corner.stallLoad,
  "stall-bank": (corner) => corner.stallBank,
  "warning-bank": (corner) => corner.warningBank,
  "buffet-bank": (corner) => corner.buffetBank,
  "buffet-load": (corner) => corner.buffetLoad,
  radius: (corner) => corner.radius,
  rate: (corner) => corner.rate,
  "rate-one-bank": (corner) => corner.rateOneBank,
};

/** The reference speeds of a point, each with the reason where there is none. */
export type References = Readonly<Record<ReferenceName, Reference>> & {
  readonly va: ReturnType<typeof manoeuvringCas>;
};

export function referencesOf(ready: Ready): References {
  const { card, configuration, mass, air } = ready;
  const at = (name: ReferenceName) => referenceSpeed(name, card, configuration, mass.nominal, air.nominal);
  return {
    v2min: at("v2min"),
    vfto: at("vfto"),
    vref: at("vref"),
    va: manoeuvringCas(card, configuration, mass.nominal, air.nominal),
  };
}

/**
 * All results of a point. Each is worked out when it is first asked for: a check of a long note needs
 * few of them, and an editor those of the lines in view. The getters stand on the prototype once,
 * since 19 of them for each of 10,000 points would cost more than the figures.
 */
class LazyResults {
  readonly corners: Corners;
  readonly references: () => References;
  readonly known: Partial<Record<ResultName, Spread | null>> = {};

  constructor(corners: Corners, references: () => References) {
    this.corners = corners;
    this.references = references;
  }
}

function defineResult(name: ResultName, compute: (results: LazyResults) => Spread | null): void {
  Object.defineProperty(LazyResults.prototype, name, {
    enumerable: true,
    get(this: LazyResults) {
      let value = this.known[name];
      if (value === undefined) {
        value = compute(this);
        this.known[name] = value;
      }
      return value;
    },
  });
}

for (const name of Object.keys(figureOf) as CornerResult[]) {
  defineResult(name, ({ corners }) => spreadOf(corners, figureOf[name]));
}
for (const name of ["v2min", "vfto", "vref"] as const) {
  defineResult(name, ({ references }) => {
    const reference = references()[name];
    return "speed" in reference ? exactly(reference.speed.cas) : null;
  });
}
defineResult("va", ({ references }) => {
  const { va } = references();
  return "cas" in va ? exactly(va.cas) : null;
});

export function resultsOf(corners: Corners, references: () => References): Results {
  return new LazyResults(corners, references) as unknown as Results;
}

export function referenceSpeeds(
  references: References,
): Readonly<Record<ReferenceName, ReferenceSpeed | null>> {
  const speed = (name: ReferenceName) => {
    const reference = references[name];
    return "speed" in reference ? reference.speed : null;
  };
  return { v2min: speed("v2min"), vfto: speed("vfto"), vref: speed("vref") };
}
