import type { PlacedClause } from "../notation/block.ts";
import type { ResultName } from "../notation/vocabulary.ts";
import { remarks } from "../plan/caution.ts";
import {
  formatAltitude,
  formatAngle,
  formatBank,
  formatDeviation,
  formatDistinct,
  formatFactor,
  formatFlightLevel,
  formatLoad,
  formatMach,
  formatMass,
  formatPercent,
  formatQnh,
  formatResult,
  formatResultValue,
  formatSpeed,
} from "../plan/format.ts";
import type { Limits } from "../plan/limits.ts";
import { fileName } from "../plan/names.ts";
import { lineOf, type Origin } from "../plan/origin.ts";
import type { Conditions, HeldRow, PointResult } from "../plan/point.ts";
import { resultEntry, resultNames } from "../plan/results.ts";
import { atMost } from "../plan/rules.ts";

/** The result of a point, then how it came about with this note's values, as Markdown. */
export function derivation(point: PointResult, placed: PlacedClause, uri: string): string {
  const { conditions } = point;
  if (!conditions) return withheldText(point, uri);
  return [
    headline(point, placed),
    resultsTable(point),
    formulas(point, conditions),
    inputsText(point, conditions, uri),
    rulesText(point, uri),
    absentText(point),
    remarksText(point, conditions),
  ]
    .filter(Boolean)
    .join("\n\n");
}

function withheldText(point: PointResult, uri: string): string {
  const { withheld } = point;
  if (!withheld) return "No figures are known here.";
  return `No figures: ${place(withheld.origin, uri)} has to be mended first (\`${withheld.code}\`).`;
}

function place(origin: Origin, uri: string): string {
  const line = `line ${lineOf(origin) + 1}`;
  return origin.uri === uri ? line : `${fileName(origin.uri)}, ${line}`;
}

/** What the clause under the cursor is about comes first. */
function headline(point: PointResult, { clause }: PlacedClause): string {
  const show = (names: readonly ResultName[]) =>
    names
      .flatMap((name) => {
        const spread = point.results?.[name];
        return spread ? [`${name} ${formatResult(name, spread, { spread: true })}`] : [];
      })
      .join(", ");
  switch (clause.keyword) {
    case "bank":
    case "load":
      return `**${show(["warning-bank", "stall-bank", "load", "radius", "rate"])}**`;
    case "weight":
    case "burn":
      return `**${show(["vs1g", "stall"])}**`;
    default:
      return `**${show(["margin", "ratio", "stall", "warning"])}**`;
  }
}

function resultsTable(point: PointResult): string {
  const rows = resultNames.flatMap((name) => {
    const spread = point.results?.[name];
    if (!spread) return [];
    const least = name === "v2min" || name === "vfto" || name === "vref" ? "at least " : "";
    return [
      `| ${name} | ${least}${formatResult(name, spread, { spread: true })} | ${resultEntry(name).label}${referenceNote(point, name)} |`,
    ];
  });
  return ["| result | value | |", "| --- | --- | --- |", ...rows].join("\n");
}

function referenceNote(point: PointResult, name: ResultName): string {
  if (name === "va")
    return ": one full smooth input, one axis, one direction, no reversals; the flight manual's va governs";
  if (name !== "v2min" && name !== "vfto" && name !== "vref") return "";
  const reference = point.reference[name];
  if (!reference) return "";
  return `: in ${reference.configuration} (${reference.published ? "published" : "least value of the rule"})`;
}

/** The formulas with this note's values in them. */
function formulas(point: PointResult, conditions: Conditions): string {
  const { configuration, card, results } = point;
  const reference = card?.referenceMass?.value;
  const basis = card?.basis?.value;
  const stall = results?.stall;
  if (!configuration || configuration.stallSpeed === null || !reference || !basis || !stall) return "";
  const mass = formatMass(conditions.mass.nominal, reference);
  const lines = [
    conditions.loadStated
      ? `n = ${formatLoad(conditions.load.nominal)}, as stated`
      : `n = cos ${formatAngle(conditions.path.nominal)} / cos ${formatBank(conditions.bank.nominal)} = ${formatLoad(conditions.load.nominal)}`,
    `V_c = ${formatSpeed(configuration.stallSpeed)} (${configuration.name}, ${basis.kind}${basis.kind === "vs" ? ` / ${basis.factor}` : ""}, at ${formatMass(reference, reference)})`,
    `stall: V² f(M) = V_c² k² (n m / m_ref) / (1 - loss), with m = ${mass}, k = ${formatFactor(conditions.cgFactor.nominal)}, loss = ${formatPercent(conditions.liftLoss.nominal)}: ${formatResultValue("stall", stall.nominal)}`,
  ];
  lines.push(...loadLines(point, conditions));
  const check = weightCheck(point, conditions, reference);
  if (check) lines.push(check);
  return lines.map((line) => `- ${line}`).join("\n");
}

/** Which comes first as the load grows: the stall, buffet, or the limit load factor. */
function loadLines(point: PointResult, conditions: Conditions): readonly string[] {
  const { configuration, results } = point;
  const stall = results?.["stall-load"];
  const buffet = results?.["buffet-load"];
  const lines: string[] = [];
  if (stall && buffet) {
    const usable = buffet.low < stall.low ? buffet : stall;
    lines.push(
      `usable load factor: ${formatResultValue("stall-load", usable.low)}, where ${usable === buffet ? "buffet begins" : "the wing stalls"}${configuration?.buffet?.cg === null ? " (buffet table: cg not stated)" : ""}`,
    );
  }
  const limit = configuration?.load?.value;
  if (stall && limit && conditions.loadStated) {
    const first = stall.low < limit.high ? "the stall" : "the limit load";
    lines.push(
      `at this speed ${first} comes first: stall at ${formatResultValue("stall-load", stall.low)}, limit ${formatLoad(limit.high)}`,
    );
  }
  return lines;
}

/** The rule of thumb stands beside the exact figure, never instead of it. */
function weightCheck(point: PointResult, conditions: Conditions, reference: number): string | null {
  const { configuration, results } = point;
  const vs1g = results?.vs1g?.nominal;
  if (!vs1g || !configuration?.stallSpeed) return null;
  const change = conditions.mass.nominal / reference - 1;
  if (Math.abs(change) < 0.005) return null;
  const exact = Math.sqrt(conditions.mass.nominal / reference) - 1;
  return `cross-check: the weight is ${signedPercent(change)} off the reference, so the stall speed is about ${signedPercent(change / 2)} off (half of it; exactly ${signedPercent(exact)})`;
}

function signedPercent(fraction: number): string {
  return `${fraction < 0 ? "" : "+"}${formatPercent(fraction)}`;
}

/** Each input, with the line it came from. */
function inputsText(point: PointResult, conditions: Conditions, uri: string): string {
  const reference = point.card?.referenceMass?.value ?? conditions.mass.nominal;
  const parts: string[] = [];
  const add = (keyword: Parameters<typeof point.inputs.get>[0], text: string) => {
    const origin = point.inputs.get(keyword);
    parts.push(origin ? `${text} (${place(origin, uri)})` : `${text} (assumed)`);
  };
  add("weight", formatMass(conditions.mass.nominal, reference));
  add("config", point.configuration?.name ?? "");
  add(
    "altitude",
    conditions.flightLevel
      ? formatFlightLevel(conditions.altitude.nominal)
      : `${formatAltitude(conditions.altitude.nominal)}${conditions.qnh === null ? " of pressure altitude" : ` on ${formatQnh(conditions.qnh)}`}`,
  );
  add("isa", `ISA ${formatDeviation(conditions.deviation.nominal)}`);
  const speeds = [
    formatSpeed(conditions.cas.nominal),
    formatSpeed(conditions.tas.nominal, 0, { type: "tas" }),
    formatMach(conditions.mach.nominal),
    ...(conditions.ias ? [formatSpeed(conditions.ias.nominal, 0, { type: "ias" })] : []),
  ];
  add("speed", speeds.join(" = "));
  add("bank", `bank ${formatBank(conditions.bank.nominal)}`);
  add("path", `path ${formatAngle(conditions.path.nominal)}`);
  if (conditions.cg) add("cg", `cg ${formatPercent(conditions.cg.nominal)}`);
  const assumed = point.assumed.length > 0 ? `\n\nAssumed: ${point.assumed.join(", ")}.` : "";
  return `From: ${parts.join("; ")}.${assumed}`;
}

function rulesText(point: PointResult, uri: string): string {
  const rows = point.rows.map(
    (held) => `- ${heldText(held)} *(${held.row.remark ?? "no source stated"}; ${rowPlace(held, uri)})*`,
  );
  if (rows.length === 0) return point.limits ? "" : `No rule is held: ${point.limitsName} cannot be used.`;
  const off = point.rowsOff.map((row) => `- ${row.text}: switched off`);
  return `Held against ${point.limitsName}:\n\n${[...rows, ...off].join("\n")}`;
}

function rowPlace({ row }: HeldRow, uri: string): string {
  return row.origin.uri.startsWith("plumbline:") ? "built in" : place(row.origin, uri);
}

function heldText({ row, bound, figure, holds }: HeldRow): string {
  if (figure === null) return `${row.text}: not evaluated`;
  const show = (value: number, more: number) => {
    switch (row.subject) {
      case "bank":
        return formatBank(value, more);
      case "buffet":
        return formatResultValue("buffet-load", value, more);
      case "load":
        return formatLoad(value, more);
      default:
        return formatResultValue(row.subject, value, more);
    }
  };
  const [has, asked] = holds
    ? [show(figure, 0), show(bound, 0)]
    : // What is broken never reads as kept.
      formatDistinct(figure, bound, show);
  return `${row.text}: ${has}, ${atMost(row.subject) ? "at most" : "at least"} ${asked}, ${holds ? "kept" : "broken"}`;
}

function absentText(point: PointResult): string {
  const reasons = Object.entries(point.absent).map(([name, why]) => `- ${name}: ${why}`);
  const skipped = point.notEvaluated.map(({ rule, why }) => `- ${rule}: ${why}`);
  if (reasons.length + skipped.length === 0) return "";
  return `Not known or not checked here:\n\n${[...reasons, ...skipped].join("\n")}`;
}

/** The cautions that belong beside these numbers. */
function remarksText(point: PointResult, conditions: Conditions): string {
  const { card, limits } = point;
  const shown = [
    conditions.ias ? null : remarks.cas,
    remarks.steady,
    conditions.engineOut ? null : remarks.engines,
    remarks.stillAir,
    0 < conditions.liftLoss.high ? remarks.contamination : null,
  ].filter((one) => one !== null);
  const sources = [card, limits].flatMap((one) => (one ? [sourceText(one)] : []));
  return `*${[...shown, ...sources].join(" ")}*`;
}

function sourceText({ name, source }: Pick<Limits, "name" | "source">): string {
  if (!source) return `${name}: no source stated.`;
  return `${name}: ${source.title}${source.issue ? `, issue ${source.issue}` : ""}.`;
}
