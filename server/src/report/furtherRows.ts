import {
  formatFlightLevel,
  formatLoad,
  formatMach,
  formatMass,
  formatResultValue,
  formatSeconds,
} from "../plan/format.ts";
import type { FurtherFigures } from "../plan/further.ts";
import type { PointResult } from "../plan/point.ts";
import type { Spread } from "../plan/spread.ts";

/** A figure beside the results, as it is shown. */
export interface FurtherRow {
  readonly name: string;
  readonly text: string;
  /** A few plain words. */
  readonly about: string;
}

/** The figures that a point asks for with `shear`, `gust`, `decel` and `power`, and those of buffet and category. */
export function furtherRows(point: PointResult): readonly FurtherRow[] {
  const { further } = point;
  if (!further) return [];
  return [
    ...shearRows(further),
    ...gustRows(further),
    ...timingRows(further),
    ...powerRows(further),
    ...buffetRows(further, point),
    ...categoryRows(further, point),
  ];
}

export function shearRows({ afterShear }: FurtherFigures): readonly FurtherRow[] {
  if (!afterShear) return [];
  return (["margin", "ratio", "overshoot"] as const).flatMap((name) => {
    const spread = afterShear[name];
    if (!spread) return [];
    return [
      {
        name: `${name} after shear`,
        text: formatResultValue(name, spread.low),
        about: "after the sudden loss of airspeed, before anybody acts",
      },
    ];
  });
}

export function gustRows({ gustUp, gustDown }: FurtherFigures): readonly FurtherRow[] {
  if (!gustUp || !gustDown) return [];
  return [
    { name: "load in the gust", text: formatLoad(gustUp.high), about: "load factor in the gust upwards" },
    // The lowest is never read as less low than it is.
    {
      name: "load in the gust down",
      text: formatResultValue("stall-load", gustDown.low),
      about: "load factor in the gust downwards",
    },
  ];
}

export function timingRows({ secondsToWarning, secondsToStall }: FurtherFigures): readonly FurtherRow[] {
  return [
    ...timingRow("time to warning", secondsToWarning, "the stall warning"),
    ...timingRow("time to stall", secondsToStall, "the stall"),
  ];
}

function timingRow(name: string, seconds: Spread | null, what: string): readonly FurtherRow[] {
  if (!seconds) return [];
  const passed = seconds.low === 0 ? `: ${what} is already passed` : "";
  return [{ name, text: formatSeconds(seconds.low), about: `slowing down as stated, to ${what}${passed}` }];
}

export function powerRows({ powerOnStall }: FurtherFigures): readonly FurtherRow[] {
  if (!powerOnStall) return [];
  return [
    {
      name: "stall with power",
      text: formatResultValue("stall", powerOnStall.high),
      about: "with the stated power, for information: no rule uses it",
    },
  ];
}

function buffetRows(further: FurtherFigures, { configuration }: PointResult): readonly FurtherRow[] {
  const cg = configuration?.buffet?.cg === null ? "; buffet table: cg not stated" : "";
  const { lowBuffetMach, highBuffetMach, buffetAltitude, buffetLoadKept } = further;
  return [
    ...buffetRow(
      "low buffet Mach",
      lowBuffetMach?.high,
      (mach) => formatMach(mach, 0, "up"),
      `slower, the load flown buffets${cg}`,
    ),
    ...buffetRow(
      "high buffet Mach",
      highBuffetMach?.low,
      (mach) => formatMach(mach, 0, "down"),
      `faster, the load flown buffets${cg}`,
    ),
    ...buffetRow(
      "buffet altitude",
      buffetAltitude?.low,
      formatFlightLevel,
      `up to here ${formatResultValue("buffet-load", buffetLoadKept)} is free of buffet at this Mach number, wings level${cg}`,
    ),
  ];
}

/** The worst end, as every figure of a point is shown; nothing where a corner has none. */
function buffetRow(
  name: string,
  worst: number | undefined,
  format: (figure: number) => string,
  about: string,
): readonly FurtherRow[] {
  return worst === undefined || Number.isNaN(worst) ? [] : [{ name, text: format(worst), about }];
}

function categoryRows({ categories }: FurtherFigures, { card }: PointResult): readonly FurtherRow[] {
  if (!categories) return [];
  const { icao, faa, configuration, mass, landingMass } = categories;
  const reference = card?.referenceMass?.value ?? mass;
  const with_ = `${configuration} at ${formatMass(mass, reference)}, the greatest ${landingMass ? "landing mass" : "mass, for the card states no landing mass"}`;
  const text =
    icao === faa ? (icao ?? "none") : `${icao ?? "none"} (ICAO), ${faa ?? "not known"} (14 CFR 97.3)`;
  return [{ name: "approach category", text, about: with_ }];
}
