import type { PlacedClause } from "../notation/block.ts";
import type { Keyword, ResultName } from "../notation/vocabulary.ts";
import { remarks } from "../plan/caution.ts";
import {
  formatAltitude,
  formatAngle,
  formatBank,
  formatClaim,
  formatDistinct,
  formatFactor,
  formatFlightLevel,
  formatLoad,
  formatMass,
  formatPercent,
  formatResult,
  formatResultValue,
  formatSpeed,
  formatSpoken,
} from "../plan/format.ts";
import type { FurtherFigures } from "../plan/further.ts";
import type { Limits, Row } from "../plan/limits.ts";
import type { Conditions, HeldRow, PointResult, SweepResult } from "../plan/point.ts";
import { resultEntry, resultNames } from "../plan/results.ts";
import { boundOf } from "../plan/ruleChecks.ts";
import { atMost } from "../plan/rules.ts";
import { exactly } from "../plan/spread.ts";
import {
  type FurtherRow,
  furtherRows,
  gustRows,
  powerRows,
  shearRows,
  timingRows,
} from "../report/furtherRows.ts";
import { otherEndText, solvedText, sweepText } from "../report/openText.ts";
import { plainMarkdown } from "../report/plainMarkdown.ts";
import { inputsText, speedText } from "./inputsText.ts";
import { place } from "./place.ts";

/** The result of a point, then how it came about with this note's values, as Markdown. */
export function derivation(point: PointResult, placed: PlacedClause, uri: string): string {
  const { conditions } = point;
  if (!conditions) return withheldText(point, uri);
  return [
    headline(point, conditions, placed),
    // How it came about and what it was held against come before the long table: a hover opens small.
    formulas(point, conditions, placed),
    inputsText(point, conditions, uri),
    rulesText(point, uri),
    openText(point),
    reviewText(point),
    resultsTable(point),
    absentText(point),
    remarksText(point, conditions),
  ]
    .filter(Boolean)
    .join("\n\n");
}

function withheldText(point: PointResult, uri: string): string {
  const { withheld, solved } = point;
  if (!withheld) return "No figures are known here.";
  if (solved && !solved.best)
    return `**${solved.what} ?: ${plainMarkdown(solvedText(solved))}**\n\nNo ${solved.what} keeps every rule and check of this point, so that it has no figures.`;
  return `No figures: ${place(withheld.origin, uri)} has to be mended first (\`${withheld.code}\`).`;
}

/** What the clause under the cursor is about comes first. */
function headline(point: PointResult, conditions: Conditions, placed: PlacedClause): string {
  const show = (names: readonly ResultName[]) =>
    names
      .flatMap((name) => {
        const spread = point.results?.[name];
        return spread ? [`${name} ${formatResult(name, spread, { spread: true })}`] : [];
      })
      .join(", ");
  const { keyword } = placed.clause;
  if (point.solved?.open.placed === placed) return `**${plainMarkdown(solvedText(point.solved))}**`;
  if (point.sweep?.open.placed === placed) return `**${plainMarkdown(sweepText(point.sweep))}**`;
  const further = point.further ? furtherBy[keyword ?? ""]?.(point.further) : undefined;
  if (further && further.length > 0)
    return `**${further.map(({ name, text }) => `${name} ${text}`).join(", ")}**`;
  switch (keyword) {
    case "bank":
    case "load":
    case "path":
      return `**${show(["warning-bank", "stall-bank", "load", "radius", "rate"])}**`;
    case "weight":
    case "burn":
      return `**${show(["vs1g", "stall"])}**`;
    case "speed":
      return `**${speedText(conditions)}, ${show(["margin", "ratio"])}**`;
    case "altitude":
      return `**${levelText(conditions)}**`;
    case "claim":
      return `**${claimText(point, placed)}**`;
    default:
      return `**${show(["margin", "ratio", "stall", "warning"])}**`;
  }
}

const furtherBy: Readonly<Record<string, (further: FurtherFigures) => readonly FurtherRow[]>> = {
  shear: shearRows,
  gust: gustRows,
  decel: timingRows,
  power: powerRows,
};

/** Both ends of the values that keep everything, and the rows of a sweep. */
function openText(point: PointResult): string {
  const { solved, sweep } = point;
  const parts: string[] = [];
  if (solved?.best) {
    const other = otherEndText(solved);
    parts.push(
      `${solved.what} ?: ${plainMarkdown(solvedText(solved))}${other ? `; ${plainMarkdown(other)}` : ""}.`,
    );
  }
  if (sweep) parts.push(sweepTable(sweep));
  return parts.join("\n\n");
}

/** The most rows of a sweep in a hover; the table of points has them all. */
const MOST_ROWS = 12;

function sweepTable({ what, rows }: SweepResult): string {
  const shown = rows.slice(0, MOST_ROWS).map(({ written, point }) => {
    const figure = (name: ResultName) => {
      const spread = point.results?.[name];
      return spread ? formatResult(name, spread) : "-";
    };
    const found = point.solved ? [plainMarkdown(solvedText(point.solved))] : [];
    const codes = point.findings.map((one) => one.code).join(", ");
    return `| ${[formatSpoken(written, what), ...found, figure("stall"), figure("margin"), figure("warning-bank"), codes].join(" | ")} |`;
  });
  const head = [
    what,
    ...(rows.some(({ point }) => point.solved) ? ["found"] : []),
    "stall",
    "margin",
    "warning at",
    "findings",
  ];
  const more =
    rows.length > MOST_ROWS ? [`\n… and ${rows.length - MOST_ROWS} more rows in the table of points.`] : [];
  return [`| ${head.join(" | ")} |`, `|${" --- |".repeat(head.length)}`, ...shown, ...more].join("\n");
}

/** What the note accepts here and what it expects. */
function reviewText({ accepted, expected }: PointResult): string {
  const taken = accepted.map(
    ({ code, to, because, by, until }) =>
      `- accepted: ${code}${to ? ` to ${to}` : ""}${by ? ` by ${plainMarkdown(by)}` : ""}${until ? ` until ${until}` : ""} (${plainMarkdown(because)})`,
  );
  const meant = expected.map(
    ({ code, not, came }) =>
      `- expected: ${not ? "no " : ""}${code}, ${came === null ? "not known" : came === not ? "and it is otherwise" : "and so it is"}`,
  );
  return [...taken, ...meant].join("\n");
}

/** The pressure altitude that the figures hold for. */
function levelText({ pressureAltitude }: Conditions): string {
  const level = formatFlightLevel(pressureAltitude.nominal);
  return level.startsWith("FL")
    ? `pressure altitude ${formatAltitude(pressureAltitude.nominal)}, ${level}`
    : level;
}

/** The figure as the finding of a stale claim says it. */
function claimText({ claims }: PointResult, placed: PlacedClause): string {
  const { body } = placed.clause;
  const claim = claims.find((one) => one.clause === placed);
  if (!claim || claim.computed === null || body?.kind !== "claim")
    return "This claim cannot be checked here.";
  // What it was held against: in a sweep that is another row than the one that is shown.
  const figure = formatClaim(claim.name, exactly(claim.computed), body.value);
  return `${claim.name} ${figure} now: the claim ${claim.holds ? "holds" : "is stale"}`;
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
  const further = furtherRows(point).map(({ name, text, about }) => `| ${name} | ${text} | ${about} |`);
  return ["| result | value | |", "| --- | --- | --- |", ...rows, ...further].join("\n");
}

function referenceNote(point: PointResult, name: ResultName): string {
  if (name === "va")
    return ": one full smooth input, one axis, one direction, no reversals; the flight manual's va governs";
  if (name !== "v2min" && name !== "vfto" && name !== "vref") return "";
  const reference = point.reference[name];
  if (!reference) return "";
  return `: in ${reference.configuration} (${reference.published ? "published" : "least value of the rule"})`;
}

/** The formulas with this note's values in them. They show the nominal values; what is shown elsewhere is the worst corner. */
function formulas(point: PointResult, conditions: Conditions, { clause }: PlacedClause): string {
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
    `stall: V² f(M) = V_c² k² (n m / m_ref) / (1 - loss), V in eas, with m = ${mass}, k = ${formatFactor(conditions.cgFactor.nominal)}, loss = ${formatPercent(conditions.liftLoss.nominal)}: ${formatResultValue("stall", stall.nominal)}`,
  ];
  if (isAboutTheTurn(clause.keyword)) lines.push(...turnFormulas(point, conditions));
  else lines.push(...marginFormulas(point, conditions));
  lines.push(...loadLines(point, conditions));
  const check = weightCheck(point, conditions, reference);
  if (check) lines.push(check);
  return `At the nominal values:\n\n${lines.map((line) => `- ${line}`).join("\n")}`;
}

function isAboutTheTurn(keyword: Keyword | null): boolean {
  return keyword === "bank" || keyword === "load" || keyword === "path";
}

/** Writes a result at its nominal value; null where it is not known. */
function nominal(results: PointResult["results"]) {
  return (name: ResultName): string | null => {
    const spread = results?.[name];
    return spread ? formatResultValue(name, spread.nominal) : null;
  };
}

/** How ratio and margin, and the warning they are kept clear of, come about. */
function marginFormulas({ card, results }: PointResult, { cas }: Conditions): readonly string[] {
  const at = nominal(results);
  const [vs1g, stall, warning] = [at("vs1g"), at("stall"), at("warning")];
  const [ratio, margin] = [at("ratio"), at("margin")];
  const flown = formatSpeed(cas.nominal);
  const factor = card?.warning?.value;
  return [
    vs1g && `vs1g: the same with n = 1: ${vs1g}`,
    warning && factor && `warning = ${formatFactor(factor)} times the stall speed with loss = 0: ${warning}`,
    ratio && `ratio = V / vs1g = ${flown} / ${vs1g} = ${ratio}`,
    margin && `margin = V / stall = ${flown} / ${stall} = ${margin}`,
  ].filter((line) => typeof line === "string");
}

/** How the banks of stall and warning, and the turn itself, come about. */
function turnFormulas({ card, results }: PointResult, conditions: Conditions): readonly string[] {
  const at = nominal(results);
  const [load, stallBank, warningBank] = [at("stall-load"), at("stall-bank"), at("warning-bank")];
  const radius = at("radius");
  const path = formatAngle(conditions.path.nominal);
  const tas = formatSpeed(conditions.tas.nominal, 0, { type: "tas" });
  const eas = formatSpeed(conditions.eas.nominal, 0, { type: "eas" });
  const bank = formatBank(conditions.bank.nominal);
  const factor = card?.warning?.value;
  return [
    load && `stall-load = (m_ref / m) (V / V_c)² f(M) (1 - loss) / k², V = ${eas}: ${load}`,
    stallBank && `stall-bank = arccos(cos ${path} / ${load}) = ${stallBank}`,
    warningBank &&
      factor &&
      `warning-bank: the same at V / ${formatFactor(factor)} with loss = 0, never beyond the stall: ${warningBank}`,
    radius &&
      (conditions.loadStated
        ? `radius = TAS² cos² ${path} / (n g sin ${bank}), TAS = ${tas}: ${radius}`
        : `radius = TAS² cos ${path} / (g tan ${bank}), TAS = ${tas}: ${radius}`),
  ].filter((line) => typeof line === "string");
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

function rulesText(point: PointResult, uri: string): string {
  const rows = point.rows.map(
    (held) =>
      `- ${heldText(held)} *(${held.row.remark === null ? "no source stated" : plainMarkdown(held.row.remark)}; ${rowPlace(held, uri)})*`,
  );
  if (!point.limits) return `No rule is held: ${point.limitsName} cannot be used.`;
  const off = point.rowsOff.map((row) => `- ${plainMarkdown(row.text)}: switched off`);
  if (rows.length + off.length === 0) return `No row of ${point.limitsName} applies here.`;
  return `Held against ${point.limitsName}:\n\n${[...rows, ...off].join("\n")}`;
}

function rowPlace({ row }: HeldRow, uri: string): string {
  return row.origin.uri.startsWith("plumbline:") ? "built in" : place(row.origin, uri);
}

function heldText({ row, bound, figure, holds }: HeldRow): string {
  if (figure === null) return `${plainMarkdown(row.text)}: ${holds === false ? "broken" : "not evaluated"}`;
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
  const asked = boundOf(row);
  // What is broken never reads as kept, nor the other way round.
  const [has, bounded] = holds
    ? keptAs(row, figure, bound, show)
    : formatDistinct(figure, bound, show, asked);
  return `${row.text}: ${has}, ${atMost(row.subject) ? "at most" : "at least"} ${bounded}, ${holds ? "kept" : "broken"}`;
}

/** A figure with as many decimals more as its bound has, where it would read as beyond it without them. */
function keptAs(
  row: Row,
  figure: number,
  bound: number,
  show: (value: number, more: number) => string,
): readonly [string, string] {
  const asked = boundOf(row)(bound, 0);
  const way = atMost(row.subject) ? 1 : -1;
  const reads = [0, 1, 2].map((more) => show(figure, more));
  const kept = reads.find((one) => way * (Number.parseFloat(one) - Number.parseFloat(asked)) <= 0);
  return [kept ?? show(figure, 0), asked];
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
  return `${name}: ${plainMarkdown(source.title)}${source.issue ? `, issue ${source.issue}` : ""}.`;
}
