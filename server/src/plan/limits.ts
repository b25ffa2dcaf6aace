import type { Block } from "../notation/block.ts";
import type { RowPhase } from "../notation/tree.ts";
import type { Subject } from "../notation/vocabulary.ts";
import type { Source } from "./card.ts";
import type { Finding } from "./finding.ts";
import type { Origin } from "./origin.ts";

export interface Level {
  readonly kind: "above" | "below";
  /** Metres. */
  readonly altitude: number;
  /** True for a flight level, which is compared with the pressure altitude; else with the altitude as stated. */
  readonly flightLevel: boolean;
}

export interface Row {
  readonly verb: "must" | "should";
  readonly phases: readonly RowPhase[];
  readonly subject: Subject;
  /** SI (rad for bank and overshoot, m for radius); null for `none`. */
  readonly value: number | null;
  /** The figure for a card on the `vs` basis. */
  readonly vs: number | null;
  readonly rateOne: boolean;
  readonly levels: readonly Level[];
  readonly when: readonly ("ifr" | "vfr" | "engine-out")[];
  readonly afterShear: boolean;
  /** The row as it is quoted in messages and hovers: `must any bank 30`. */
  readonly text: string;
  /** The remark at the row's end, if any: its source. */
  readonly remark: string | null;
  /** The limits the row was written in, which `from` may have taken from another set. */
  readonly limitsName: string;
  readonly origin: Origin;
}

/** The rules a plan is held against, with the rows of `from` already taken in. */
export interface Limits {
  readonly name: string;
  readonly title: string | null;
  readonly origin: Origin;
  readonly block: Block;
  readonly source: Source | null;
  readonly builtIn: boolean;
  /** Why no row of this set is held. */
  readonly withheld: { readonly origin: Origin; readonly code: string } | null;
  readonly rows: readonly Row[];
  /** Rows in error, as they are written: they are not held, and a point says so. */
  readonly lost: readonly string[];
  readonly findings: readonly Finding[];
}
