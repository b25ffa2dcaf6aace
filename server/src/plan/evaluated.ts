import type { ResultName } from "../notation/vocabulary.ts";
import { whyAbsent } from "./absent.ts";
import { conditionsOf } from "./conditions.ts";
import { type Corners, type PointInputs, slowed } from "./corners.ts";
import type { Point, Ready } from "./evaluateStated.ts";
import { type References, type Results, referencesOf, resultsOf } from "./figures.ts";
import type { Conditions } from "./point.ts";

/** A point whose figures could be computed. */
export interface Evaluated {
  readonly ready: Ready;
  readonly corners: Corners;
  readonly conditions: Conditions;
  readonly results: Results;
  references(): References;
  /** The corners after the stated loss of airspeed; null where none is stated, or no speed is left. */
  readonly sheared: Corners | null;
  /** Why a result is not known, as a sentence; null where it is. */
  absent(name: ResultName | "ias"): string | null;
}

export function evaluated(point: Point, ready: Ready, corners: Corners): Evaluated {
  return new EvaluatedPoint(point, ready, corners);
}

class EvaluatedPoint implements Evaluated {
  readonly #point: Point;
  readonly ready: Ready;
  readonly corners: Corners;
  #conditions: Conditions | null = null;
  #results: Results | null = null;
  #references: References | null = null;
  #sheared: Corners | null | undefined;

  constructor(point: Point, ready: Ready, corners: Corners) {
    this.#point = point;
    this.ready = ready;
    this.corners = corners;
  }

  get conditions(): Conditions {
    this.#conditions ??= conditionsOf(this.#point, this.ready, this.corners);
    return this.#conditions;
  }

  get results(): Results {
    this.#results ??= resultsOf(this.corners, () => this.references());
    return this.#results;
  }

  references(): References {
    this.#references ??= referencesOf(this.ready);
    return this.#references;
  }

  get sheared(): Corners | null {
    if (this.#sheared === undefined) this.#sheared = this.#slowed();
    return this.#sheared;
  }

  #slowed(): Corners | null {
    const { frame, extras } = this.ready;
    if (extras.shear === null) return null;
    const found = slowed(frame, this.corners, extras.shear);
    return typeof found === "string" ? null : found;
  }

  absent(name: ResultName | "ias"): string | null {
    return whyAbsent(this, name);
  }
}

/** The inputs of a point's corners. */
export function pointInputs(ready: Ready): PointInputs {
  return {
    mass: ready.mass,
    pressureAltitude: ready.air.pressureAltitude,
    deviation: ready.air.deviation,
    air: ready.air.nominal,
    speed: ready.speed,
    bank: ready.turn.bank,
    path: ready.turn.path,
    load: ready.turn.load,
    liftLoss: ready.liftLoss,
    cgFactor: ready.cgFactor,
    shear: ready.extras.shear,
  };
}
