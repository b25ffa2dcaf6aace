import type { Keyword } from "../notation/vocabulary.ts";
import {
  formatAltitude,
  formatAngle,
  formatBank,
  formatDeviation,
  formatFlightLevel,
  formatLoad,
  formatMach,
  formatMass,
  formatPercent,
  formatQnh,
  formatSpeed,
} from "../plan/format.ts";
import type { Conditions, PointResult } from "../plan/point.ts";
import type { Spread } from "../plan/spread.ts";
import { place } from "./place.ts";

/** Each input of a point with the line it came from, then the tolerances and what is assumed, as Markdown. */
export function inputsText(point: PointResult, conditions: Conditions, uri: string): string {
  const at = (keyword: Keyword) => {
    const origin = point.inputs.get(keyword);
    return origin ? `(${place(origin, uri)})` : "(assumed)";
  };
  const { cg, liftLoss, contaminant, engineOut } = conditions;
  const parts = [
    `${formatMass(conditions.mass.nominal, referenceOf(point, conditions))} ${at("weight")}`,
    `${point.configuration?.name ?? ""} ${at("config")}`,
    altitudeText(conditions, at),
    `ISA ${formatDeviation(conditions.deviation.nominal)} ${at("isa")}`,
    `${speedText(conditions)} ${at("speed")}`,
    `bank ${formatBank(conditions.bank.nominal)} ${at("bank")}`,
    `path ${formatAngle(conditions.path.nominal)} ${at("path")}`,
  ];
  if (conditions.loadStated) parts.push(`load ${formatLoad(conditions.load.nominal)} ${at("load")}`);
  if (cg) parts.push(`cg ${formatPercent(cg.nominal)} ${at("cg")}`);
  if (0 < liftLoss.high)
    parts.push(
      `contamination ${contaminant ? `${contaminant} ` : ""}${formatPercent(liftLoss.nominal)} ${at("contamination")}`,
    );
  if (engineOut) parts.push(`${engineOut} engine out ${at("engine-out")}`);
  parts.push(`${point.card?.name ?? ""} ${at("fly")}`);
  const tolerances = tolerancesText(point, conditions);
  const assumed = point.assumed.length > 0 ? `Assumed: ${point.assumed.join(", ")}.` : "";
  return [`From: ${parts.join("; ")}.`, tolerances, assumed].filter(Boolean).join("\n\n");
}

/** One speed in every kind that is known: "191 kt = 202 kt tas = M 0.310". */
export function speedText({ cas, tas, mach, ias }: Conditions): string {
  return [
    formatSpeed(cas.nominal),
    formatSpeed(tas.nominal, 0, { type: "tas" }),
    formatMach(mach.nominal),
    ...(ias ? [formatSpeed(ias.nominal, 0, { type: "ias" })] : []),
  ].join(" = ");
}

function altitudeText({ altitude, flightLevel, qnh }: Conditions, at: (keyword: Keyword) => string): string {
  if (flightLevel) return `${formatFlightLevel(altitude.nominal)} ${at("altitude")}`;
  const feet = formatAltitude(altitude.nominal);
  return qnh === null
    ? `${feet} of pressure altitude ${at("altitude")}`
    : `${feet} ${at("altitude")} on ${formatQnh(qnh)} ${at("qnh")}`;
}

/** What is shown is the worst corner of these. */
function tolerancesText(point: PointResult, conditions: Conditions): string {
  const reference = referenceOf(point, conditions);
  const between = (name: string, { low, high }: Spread, format: (value: number) => string) =>
    format(low) === format(high) ? [] : [`${name} ${format(low)} to ${format(high)}`];
  const parts = [
    ...between("weight", conditions.mass, (kg) => formatMass(kg, reference)),
    ...between("altitude", conditions.altitude, (metres) => formatAltitude(metres)),
    ...between("ISA", conditions.deviation, (kelvin) => formatDeviation(kelvin)),
    ...between("speed", conditions.cas, (mps) => formatSpeed(mps)),
    ...between("bank", conditions.bank, (rad) => formatBank(rad)),
    ...between("path", conditions.path, (rad) => formatAngle(rad)),
    ...(conditions.cg ? between("cg", conditions.cg, (share) => formatPercent(share)) : []),
    ...between("contamination", conditions.liftLoss, (share) => formatPercent(share)),
  ];
  return parts.length > 0 ? `With their tolerances: ${parts.join("; ")}; the worst corner is shown.` : "";
}

function referenceOf({ card }: PointResult, { mass }: Conditions): number {
  return card?.referenceMass?.value ?? mass.nominal;
}
