import type { Atmosphere } from "../flight/atmosphere.ts";
import type { Block, PlacedClause } from "../notation/block.ts";
import type { Keyword, Phase, ResultName, Unit } from "../notation/vocabulary.ts";
import type { Card, Configuration } from "./card.ts";
import type { Acceptance, Finding } from "./finding.ts";
import type { FindingCode } from "./findings.ts";
import type { FurtherFigures } from "./further.ts";
import type { Limits, Row } from "./limits.ts";
import type { OpenClause, Written } from "./openClause.ts";
import type { Origin } from "./origin.ts";
import type { Spread } from "./spread.ts";

export type Assumption =
  | "wings level"
  | "level flight"
  | "ISA"
  | "no contamination"
  | "worst cg"
  | "power off"
  | "all engines"
  | "pressure altitude";

/** The state a point is evaluated at, in SI, after everything carried and assumed has been put in. */
export interface Conditions {
  readonly mass: Spread;
  /** As stated, m. */
  readonly altitude: Spread;
  readonly flightLevel: boolean;
  /** Pa, where one is in force. */
  readonly qnh: number | null;
  readonly pressureAltitude: Spread;
  /** K. */
  readonly deviation: Spread;
  /** At the nominal altitude and deviation. */
  readonly air: Atmosphere;
  readonly cas: Spread;
  readonly eas: Spread;
  readonly tas: Spread;
  readonly mach: Spread;
  /** Null where the card has no `ias` table for the configuration, or the table does not reach. */
  readonly ias: Spread | null;
  /** rad. */
  readonly bank: Spread;
  readonly bankSide: "left" | "right" | null;
  readonly path: Spread;
  readonly load: Spread;
  /** True where `load` was written, so that the bank does not give it. */
  readonly loadStated: boolean;
  /** Fraction of mean chord; null where not stated. */
  readonly cg: Spread | null;
  /** Loss of maximum lift coefficient. */
  readonly liftLoss: Spread;
  readonly contaminant: string | null;
  readonly cgFactor: Spread;
  readonly engineOut: "left" | "right" | null;
}

/** A reference speed: at least this, CAS in m/s. */
export interface ReferenceSpeed {
  readonly cas: number;
  /** True where it is the card's published figure, false where it is the least value of the rule. */
  readonly published: boolean;
  readonly configuration: string;
}

/** A row that applies to the point, with what it was held against. */
export interface HeldRow {
  readonly row: Row;
  /** The bound in force, SI: `rate-one` and `vs` already worked in. */
  readonly bound: number;
  /** The figure at its worst corner; null where it could not be known. */
  readonly figure: number | null;
  readonly holds: boolean | null;
  /** True where the row's `or rate-one` gave the bound. */
  readonly byRateOne: boolean;
}

export interface ClaimResult {
  readonly clause: PlacedClause;
  readonly name: ResultName;
  /** SI. */
  readonly claimed: number;
  /** SI, at the worst corner; null where unknown. */
  readonly computed: number | null;
  readonly holds: boolean | null;
}

/** A rule or a check that could not be held against the point, or does not exist for its card. */
export interface NotEvaluated {
  readonly rule: string;
  readonly why: string;
}

export interface Withheld {
  readonly origin: Origin;
  readonly code: string;
}

/** What an `expect` clause says, and whether it came. */
export interface Expectation {
  readonly code: FindingCode;
  readonly not: boolean;
  /** Null where the point has no figures, so that nothing can come. */
  readonly came: boolean | null;
}

/** One end of the values that keep every rule and check. */
export interface SolvedEnd {
  /** In the unit of {@link Solved}, rounded to the safe side and checked there. */
  readonly value: number;
  /** To 1e-6. */
  readonly exact: number;
  /** The rule, or the code of the check, that the next step breaks. */
  readonly boundBy: string;
}

export interface Solved {
  readonly what: "bank" | "speed" | "weight" | "altitude";
  readonly unit: Unit | "M";
  /** Null where no value keeps every rule; `blockedBy` then says what blocks. */
  readonly best: SolvedEnd | null;
  /** The other end of the values around the best that keep every rule; worked out when asked for. */
  other(): SolvedEnd | null;
  readonly blockedBy: string | null;
  /** The value as the fix writes it, and where. */
  readonly written: Written | null;
  readonly open: OpenClause;
}

export interface SweepRow {
  readonly written: Written;
  readonly point: PointResult;
}

export interface SweepResult {
  readonly what: Keyword;
  readonly open: OpenClause;
  readonly rows: readonly SweepRow[];
  readonly shown: number;
  /** True where a row breaks a rule or a check: the one that is shown is the first of them. */
  readonly breaks: boolean;
}

/** Everything a point has to say. One evaluation feeds hints, hovers, tables, sheets and findings. */
export interface PointResult {
  readonly block: Block;
  readonly phase: Phase | null;
  readonly title: string | null;
  readonly aside: boolean;
  readonly emergency: boolean;
  readonly aircraft: string | null;
  readonly card: Card | null;
  readonly configuration: Configuration | null;
  readonly limitsName: string;
  readonly limits: Limits | null;
  readonly rules: "ifr" | "vfr" | null;
  /** Null where the point gives no figures; `withheld` then says why. */
  readonly conditions: Conditions | null;
  /** SI; null where a figure cannot be known, and `absent` then says why in a sentence. */
  readonly results: Readonly<Record<ResultName, Spread | null>> | null;
  readonly reference: Readonly<Record<"v2min" | "vfto" | "vref", ReferenceSpeed | null>>;
  readonly absent: Readonly<Partial<Record<ResultName | "ias", string>>>;
  readonly rows: readonly HeldRow[];
  /** Rows that `none` switched off here. */
  readonly rowsOff: readonly Row[];
  /** The strictest `must` and `should` bank rows in force, rad. */
  readonly bankLimit: HeldRow | null;
  readonly bankAdvice: HeldRow | null;
  readonly claims: readonly ClaimResult[];
  readonly notEvaluated: readonly NotEvaluated[];
  /** Codes of the checks that were made here and found nothing. */
  readonly heldChecks: readonly FindingCode[];
  /** Null where the point gives no figures. */
  readonly further: FurtherFigures | null;
  /** The value that was sought with `?`. */
  readonly solved: Solved | null;
  /** The rows of a sweep, in its order; the point's own figures are those of the row `shown`. */
  readonly sweep: SweepResult | null;
  readonly accepted: readonly Acceptance[];
  readonly expected: readonly Expectation[];
  readonly assumed: readonly Assumption[];
  /** Where each input in force was written, this point's own clauses included. */
  readonly inputs: ReadonlyMap<Keyword, Origin>;
  readonly withheld: Withheld | null;
  readonly findings: readonly Finding[];
}
