import type { TextFinding } from "./finding.ts";
import type { Span } from "./span.ts";
import type { Token } from "./token.ts";
import type { Keyword, Phase, ResultName, SpeedName, Subject, Unit } from "./vocabulary.ts";

/** One bar line. It depends on the line's text alone; every span lies within that line. */
export interface BarLine {
  readonly text: string;
  readonly tokens: readonly Token[];
  readonly clauses: readonly Clause[];
  /** Findings of the line's own text; their `line` is 0. */
  readonly findings: readonly TextFinding[];
}

/**
 * A keyword and its arguments. A clause in error keeps what it understood (for completion and
 * hover), but gives no value.
 */
export interface Clause {
  readonly span: Span;
  readonly keywordSpan: Span;
  /** The keyword as the vocabulary spells it; null where the word is none. */
  readonly keyword: Keyword | null;
  /** Where `keyword` is null: the keyword that the first fix names, if there is one. */
  readonly meant: Keyword | null;
  /** True where a finding of this clause keeps it from giving a value. */
  readonly faulty: boolean;
  /** Null where too little was understood. A body that is there may still belong to a faulty clause. */
  readonly body: ClauseBody | null;
}

export interface Name {
  readonly text: string;
  readonly span: Span;
}

export interface Title {
  /** Without its marks. */
  readonly text: string;
  readonly span: Span;
}

/** A number with its unit as written. `unit` is null where none is written and none is due. */
export interface Quantity {
  readonly kind: "quantity";
  readonly value: number;
  readonly unit: Unit | null;
  /** The decimals the author wrote, which a claim is compared at. */
  readonly decimals: number;
  /** True where a sign was written. */
  readonly signed: boolean;
  readonly span: Span;
  /** The number alone, its sign included. */
  readonly numberSpan: Span;
}

export interface Tolerance {
  readonly value: number;
  readonly unit: Unit | null;
  readonly span: Span;
}

export interface Scalar {
  readonly kind: "scalar";
  readonly quantity: Quantity;
  readonly tolerance: Tolerance | null;
  readonly span: Span;
}

export interface Sweep {
  readonly kind: "sweep";
  readonly from: Quantity;
  readonly to: Quantity;
  readonly by: Quantity;
  readonly span: Span;
}

export interface Range {
  readonly kind: "range";
  readonly from: Quantity;
  readonly to: Quantity;
  readonly span: Span;
}

export interface Unknown {
  readonly kind: "unknown";
  readonly unit: Unit | null;
  readonly tolerance: Tolerance | null;
  readonly span: Span;
}

export type Value = Scalar | Sweep;

export type AirspeedKind = "cas" | "eas" | "tas" | "ias";

export type Speed =
  | { readonly kind: "mach"; readonly value: Value | Unknown; readonly span: Span }
  | { readonly kind: "airspeed"; readonly value: Value; readonly type: AirspeedKind; readonly span: Span }
  | Unknown
  /** `1.3 vs1g`, `1.1 to 1.5 by 0.1 vs1g`. */
  | {
      readonly kind: "multiple";
      readonly factor: Quantity | Sweep;
      readonly of: SpeedName;
      readonly ofSpan: Span;
      readonly span: Span;
    }
  /** `vref`, `vref + 5 kt +- 3 kt`, `warning +- 2 kt`. */
  | {
      readonly kind: "named";
      readonly name: SpeedName;
      readonly nameSpan: Span;
      /** Signed: `- 5 kt` has a negative value. */
      readonly offset: Quantity | null;
      readonly tolerance: Tolerance | null;
      readonly span: Span;
    };

export interface Pair {
  readonly argument: Quantity;
  readonly value: Quantity;
  readonly span: Span;
}

export interface PairTable {
  readonly pairs: readonly Pair[];
  readonly span: Span;
}

/** A sub-attribute of a card's `config`. */
export type ConfigAttribute =
  | { readonly kind: "stall"; readonly speed: Quantity; readonly ias: boolean; readonly span: Span }
  | { readonly kind: "load"; readonly range: Range; readonly span: Span }
  | { readonly kind: "vfe"; readonly speed: Quantity; readonly ias: boolean; readonly span: Span }
  | { readonly kind: "takeoff"; readonly span: Span }
  | { readonly kind: "landing"; readonly span: Span };

export interface CalendarDate {
  /** `2027-03-31`, a real day. */
  readonly text: string;
  readonly span: Span;
}

export type RowPhase = Phase | "any" | "emergency";

export type RowCondition =
  | { readonly kind: "above" | "below"; readonly level: Quantity; readonly span: Span }
  | { readonly kind: "ifr" | "vfr" | "engine-out" | "after-shear"; readonly span: Span };

export type ClauseBody =
  // points and settings
  | { readonly kind: "fly" | "under"; readonly name: Name }
  | { readonly kind: "rules"; readonly rules: "ifr" | "vfr" }
  | { readonly kind: "aside" }
  | { readonly kind: "phase"; readonly phase: Phase; readonly title: Title | null }
  | { readonly kind: "weight"; readonly value: Value | Unknown }
  | { readonly kind: "burn"; readonly amount: Scalar }
  | { readonly kind: "burn-rate"; readonly rate: Quantity; readonly time: Quantity }
  | { readonly kind: "qnh"; readonly value: Quantity }
  | { readonly kind: "altitude"; readonly value: Value | Unknown }
  | { readonly kind: "isa" | "oat"; readonly value: Value }
  | { readonly kind: "speed"; readonly speed: Speed }
  | {
      readonly kind: "bank";
      readonly value: Value | Unknown | "rate-one";
      readonly side: "left" | "right" | null;
    }
  | { readonly kind: "path" | "load" | "gust" | "cg" | "power" | "decel"; readonly value: Value }
  | { readonly kind: "shear"; readonly value: Quantity }
  | { readonly kind: "contamination"; readonly value: Value | Name | "none" }
  | { readonly kind: "engine-out"; readonly engine: "left" | "right" | "none" }
  | { readonly kind: "emergency"; readonly title: Title | null }
  | {
      readonly kind: "claim";
      readonly result: ResultName;
      readonly value: Quantity;
      readonly within: Quantity | null;
    }
  | { readonly kind: "expect"; readonly not: boolean; readonly code: string; readonly codeSpan: Span }
  | {
      readonly kind: "accept";
      readonly code: string;
      readonly codeSpan: Span;
      readonly to: Quantity | null;
      readonly because: Title | null;
      readonly by: Title | null;
      readonly until: CalendarDate | null;
    }
  // both: `config flaps-5` in a point has no attributes
  | { readonly kind: "config"; readonly name: Name; readonly attributes: readonly ConfigAttribute[] }
  // cards
  | { readonly kind: "aircraft"; readonly name: Name; readonly title: Title | null }
  | {
      readonly kind: "source";
      readonly title: Title;
      readonly issue: Name | null;
      readonly from: CalendarDate | null;
    }
  | { readonly kind: "basis"; readonly basis: "vsr" | "vs1g" }
  | { readonly kind: "basis"; readonly basis: "vs"; readonly factor: Quantity }
  | { readonly kind: "reference"; readonly mass: Quantity }
  | { readonly kind: "mass"; readonly range: Range; readonly landing: Quantity | null }
  | {
      readonly kind: "wing";
      readonly area: Quantity;
      readonly chord: Quantity | null;
      readonly slope: Quantity | PairTable | null;
    }
  | {
      readonly kind: "vmo" | "vmca" | "vne" | "vno";
      readonly speed: Quantity;
      readonly ias: boolean;
    }
  | { readonly kind: "mmo" | "warning" | "v2min"; readonly value: Quantity }
  | { readonly kind: "ceiling"; readonly altitude: Quantity }
  | {
      readonly kind: "lift-mach" | "buffet";
      readonly config: Name;
      readonly cg: Quantity | null;
      readonly table: PairTable;
    }
  | { readonly kind: "ias"; readonly config: Name; readonly table: PairTable }
  | { readonly kind: "cg-effect" | "power-effect"; readonly table: PairTable }
  | {
      readonly kind: "contaminant"; // `contamination frost 30 %, rain` of a card
      readonly name: Name;
      readonly loss: Quantity;
      readonly rain: boolean;
    }
  | {
      readonly kind: "published";
      readonly speed: "vref" | "v2min" | "vfto";
      readonly config: Name;
      readonly table: PairTable;
    }
  // limits
  | { readonly kind: "limits"; readonly name: Name; readonly title: Title | null; readonly from: Name | null }
  | {
      readonly kind: "row";
      readonly verb: "must" | "should";
      readonly phases: readonly RowPhase[];
      readonly phasesSpan: Span;
      readonly subject: Subject;
      readonly subjectSpan: Span;
      /** Null for `none`, which switches the row off. */
      readonly value: Quantity | null;
      readonly vs: Quantity | null;
      readonly rateOne: boolean;
      readonly conditions: readonly RowCondition[];
    };

/** The body of a clause that states one kind of thing; several kinds may share a shape. */
export type BodyOf<K extends ClauseBody["kind"], B = ClauseBody> = B extends { kind: infer X }
  ? K extends X
    ? B
    : never
  : never;
