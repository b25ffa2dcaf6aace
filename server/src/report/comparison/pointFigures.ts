import {
  formatAltitude,
  formatAngle,
  formatBank,
  formatDeviation,
  formatFlightLevel,
  formatMach,
  formatMass,
  formatPercent,
  formatResult,
  formatSpeed,
  formatSpoken,
} from "../../plan/format.ts";
import { lineOf } from "../../plan/origin.ts";
import type { Conditions, PointResult } from "../../plan/point.ts";
import { resultEntry, resultNames } from "../../plan/results.ts";
import { furtherRows } from "../furtherRows.ts";
import { solvedText } from "../openText.ts";
import { type JsonValue, type PointJson, pointJson } from "../pointsJson.ts";
import { resultFigure } from "../resultFigure.ts";
import { fieldName, resultOfField, shownField } from "./shownField.ts";

/** Something that is known of a point: as it is shown, and in full. */
export interface Figure {
  readonly name: string;
  readonly shown: string;
  /** A result as its nominal value, its corners and their unit; else as the points' JSON has it. */
  readonly value: JsonValue;
}

/**
 * All that is computed of a point, in the order it is listed: the state it is evaluated at, the
 * results, and every other field that its JSON has.
 */
export function pointFigures(point: PointResult): readonly Figure[] {
  const json = pointJson(point);
  const { conditions } = point;
  const state = conditions ? stateFigures(point, conditions) : [];
  return [
    given(point),
    ...["aircraft", "limits", "rules", "config"].map((name) => fieldFigure(name, json[name] ?? null)),
    ...state.map(([name, shown, field]): Figure => ({ name, shown, value: fieldValue(json, field) })),
    soughtFigure(point, json),
    ...resultFigures(point),
    ...furtherFigures(point),
    ...sweepFigures(point, json),
    ...otherFigures(json),
  ];
}

function given({ conditions, withheld }: PointResult): Figure {
  const why = withheld ? `${withheld.code}, line ${lineOf(withheld.origin) + 1}` : "";
  const shown = conditions ? "computed" : why ? `none (${why})` : "none";
  return { name: "figures", shown, value: conditions ? "computed" : (withheld?.code ?? null) };
}

/** Name, figure as it is shown, and its field in the JSON. */
function stateFigures(
  { card }: PointResult,
  conditions: Conditions,
): readonly (readonly [string, string, string])[] {
  const { mass, altitude, flightLevel, pressureAltitude, deviation, cg, liftLoss, contaminant } = conditions;
  const { cas, tas, mach, ias, bank, bankSide, path, engineOut } = conditions;
  return [
    ["weight", formatMass(mass.nominal, card?.referenceMass?.value ?? mass.nominal), "mass_kg"],
    [
      "altitude",
      flightLevel ? formatFlightLevel(altitude.nominal) : formatAltitude(altitude.nominal),
      "altitude_ft",
    ],
    ["pressure altitude", formatAltitude(pressureAltitude.nominal), "pressure_altitude_ft"],
    ["isa", formatDeviation(deviation.nominal), "isa_deviation_c"],
    ["cg", cg ? formatPercent(cg.nominal) : "-", "cg_percent"],
    [
      "contamination",
      contaminant ? `${contaminant} ${formatPercent(liftLoss.nominal)}` : formatPercent(liftLoss.nominal),
      "lift_loss_percent",
    ],
    ["engine-out", engineOut ?? "none", "engine_out"],
    ["speed", formatSpeed(cas.nominal), "speed.cas_kt"],
    ["tas", formatSpeed(tas.nominal, 0, { type: "tas" }), "speed.tas_kt"],
    ["mach", formatMach(mach.nominal), "speed.mach"],
    ["ias", ias ? formatSpeed(ias.nominal, 0, { type: "ias" }) : "-", "speed.ias_kt"],
    ["bank", `${formatBank(bank.nominal)}${bankSide ? ` ${bankSide}` : ""}`, "bank_deg"],
    ["path", formatAngle(path.nominal), "path_deg"],
  ];
}

function fieldValue(json: PointJson, field: string): JsonValue {
  const [group, name] = field.split(".") as [string, string | undefined];
  const value = json[group] ?? null;
  return name === undefined ? value : ((value as PointJson | null)?.[name] ?? null);
}

function resultFigures({ results }: PointResult): readonly Figure[] {
  return resultNames.map((name): Figure => {
    const spread = results?.[name];
    if (!spread) return { name, shown: "-", value: null };
    const value = {
      nominal: resultFigure(name, spread.nominal),
      low: resultFigure(name, spread.low),
      high: resultFigure(name, spread.high),
      unit: resultEntry(name).unit,
    };
    return { name, shown: formatResult(name, spread), value };
  });
}

/** Told above, as a clause of the point or as a finding; or no figure at all. */
const elsewhere = new Set([
  ...[
    "line",
    "endLine",
    "phase",
    "title",
    "aside",
    "emergency",
    "claims",
    "accepted",
    "inherited",
    "withheld",
    "solved",
    "sweep",
  ],
  ...["aircraft", "limits", "rules", "config", "speed", "bank_side", "engine_out"],
  ...["mass_kg", "altitude_ft", "pressure_altitude_ft", "isa_deviation_c", "cg_percent"],
  ...["lift_loss_percent", "bank_deg", "path_deg"],
]);

/** What is asked for with `shear`, `gust`, `decel` and `power`, and buffet and category, as shown everywhere. */
function furtherFigures(point: PointResult): readonly Figure[] {
  return furtherRows(point).map(({ name, text }): Figure => ({ name, shown: text, value: text }));
}

/** The fields that those stand for. */
const ofFurther =
  /^(low_buffet|high_buffet|buffet_altitude|gust_load|power_on|seconds_to|approach_category)|_after_shear/;

/** Every other field of the JSON, as its name says. */
function otherFigures(json: PointJson): readonly Figure[] {
  return Object.keys(json)
    .filter((name) => !elsewhere.has(name) && !ofFurther.test(name) && resultOfField(name) === null)
    .map((name) => fieldFigure(name, json[name] ?? null));
}

/** What was found for a `?`, as its hint says it. */
function soughtFigure({ solved }: PointResult, json: PointJson): Figure {
  return {
    name: "found",
    shown: solved ? `${solved.what} ${solvedText(solved)}` : "-",
    value: json.solved ?? null,
  };
}

/** One for each value of a sweep, with the figures that say most. */
function sweepFigures({ sweep }: PointResult, json: PointJson): readonly Figure[] {
  if (!sweep) return [];
  const rows = (json.sweep ?? []) as readonly PointJson[];
  return sweep.rows.map(({ written, point }, i): Figure => {
    const { results, withheld, findings } = point;
    const shown = sweptResults.flatMap((name) => {
      const spread = results?.[name];
      return spread ? [`${name} ${formatResult(name, spread)}`] : [];
    });
    const codes = [...(withheld ? [withheld.code] : []), ...findings.map(({ code }) => code)];
    return {
      name: `${sweep.what} ${formatSpoken(written, sweep.what)}`,
      shown: [...shown, ...new Set(codes)].join(", ") || "-",
      value: rows[i] ?? null,
    };
  });
}

const sweptResults = ["margin", "ratio", "stall", "warning"] as const;

function fieldFigure(field: string, value: JsonValue): Figure {
  return { name: fieldName(field), shown: shownField(field, value), value };
}
