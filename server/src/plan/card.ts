import type { Table } from "../flight/table.ts";
import type { Block } from "../notation/block.ts";
import type { Finding } from "./finding.ts";
import type { Origin } from "./origin.ts";

/** A value that a card states. `value` is null where the clause is in error: nothing may be computed from it. */
export interface Stated<T> {
  readonly value: T | null;
  readonly origin: Origin;
}

/** A speed of a card in m/s: calibrated, or what the indicator shows where the card says `ias`. */
export interface CardSpeed {
  readonly speed: number;
  readonly ias: boolean;
}

export interface Interval {
  readonly low: number;
  readonly high: number;
}

export interface Source {
  readonly title: string;
  readonly issue: string | null;
  readonly from: string | null;
}

/** What the card's stall speeds are. `factor` is vs / vs1g, so that V_c = vs / factor; 1 on the other bases. */
export interface Basis {
  readonly kind: "vsr" | "vs1g" | "vs";
  readonly factor: number;
}

export interface Configuration {
  readonly name: string;
  readonly origin: Origin;
  /** The stall speed as the card states it, calibrated, m/s. Null: absent or in error, so the configuration gives no figure. */
  readonly statedStall: number | null;
  /** V_c: the 1-g stall speed at the reference mass, m/s, from `statedStall` and the basis. */
  readonly stallSpeed: number | null;
  /** Limit manoeuvring load factors. */
  readonly load: Stated<Interval> | null;
  readonly vfe: Stated<CardSpeed> | null;
  readonly takeoff: boolean;
  readonly landing: boolean;
  readonly liftMach: Stated<Table> | null;
  /** Lift coefficient at buffet onset against Mach number; `cg` (fraction of mean chord) where the table states it. */
  readonly buffet: (Stated<Table> & { readonly cg: number | null }) | null;
  /** Indicated to calibrated, m/s, at 1 g and the reference mass. */
  readonly ias: Stated<Table> | null;
  /** Mass (kg) to speed (m/s). */
  readonly published: Readonly<Record<"vref" | "v2min" | "vfto", Stated<Table> | null>>;
}

export interface Contaminant {
  readonly name: string;
  /** Loss of maximum lift coefficient, 0 to below 1; null where in error. */
  readonly loss: number | null;
  readonly rain: boolean;
  readonly origin: Origin;
}

/** What is known of an aeroplane, in SI. */
export interface Card {
  readonly name: string;
  readonly title: string | null;
  readonly origin: Origin;
  readonly block: Block;
  readonly source: Source | null;
  /** Why the card gives no figures at all: the place and the code of the finding there. */
  readonly withheld: { readonly origin: Origin; readonly code: string } | null;
  readonly basis: Stated<Basis> | null;
  readonly referenceMass: Stated<number> | null;
  readonly mass: Stated<Interval> | null;
  readonly landingMass: Stated<number> | null;
  readonly configurations: readonly Configuration[];
  readonly wing: Stated<{
    readonly area: number;
    readonly chord: number | null;
    /** Lift-curve slope per rad: one figure, or against Mach number. */
    readonly slope: number | Table | null;
  }> | null;
  readonly vmo: Stated<CardSpeed> | null;
  readonly vmca: Stated<CardSpeed> | null;
  readonly vne: Stated<CardSpeed> | null;
  readonly vno: Stated<CardSpeed> | null;
  readonly mmo: Stated<number> | null;
  /** Pressure altitude, m. */
  readonly ceiling: Stated<number> | null;
  /** Speed of the stall warning over the stall speed. */
  readonly warning: Stated<number> | null;
  /** The factor of v2min where the card states one (1.08). */
  readonly v2min: Stated<number> | null;
  /** Factor on stall speed against cg, fraction of mean chord. */
  readonly cgEffect: Stated<Table> | null;
  /** Factor on stall speed against power, a fraction. */
  readonly powerEffect: Stated<Table> | null;
  readonly contaminants: readonly Contaminant[];
  readonly findings: readonly Finding[];
}
