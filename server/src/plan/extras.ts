import { measured, spreadIn } from "./carry.ts";
import type { Clauses } from "./clauses.ts";
import type { Finding } from "./finding.ts";
import type { Spread } from "./spread.ts";

/** What a point asks beyond its own state; none of it carries on. Null where it is not stated, or in error. */
export interface Extras {
  /** Derived gust, m/s EAS. */
  readonly gust: Spread | null;
  /** Sudden loss of airspeed, m/s CAS. */
  readonly shear: number | null;
  /** Deceleration, m/s2. */
  readonly decel: Spread | null;
}

export function readExtras({ gust, shear, decel }: Clauses, findings: Finding[]): Extras {
  return {
    gust: gust && spreadIn({ findings }, gust.placed, gust.body.value, "gust"),
    shear: shear && measured({ findings }, shear.placed, shear.body.value, "shear"),
    decel: decel && spreadIn({ findings }, decel.placed, decel.body.value, "decel"),
  };
}
