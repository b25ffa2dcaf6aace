import type { Note } from "../plan/note.ts";
import { lineOf } from "../plan/origin.ts";
import type { Conditions, PointResult, Solved, SweepResult } from "../plan/point.ts";
import type { Spread } from "../plan/spread.ts";
import { figureIn } from "./figureIn.ts";
import { type FindingJson, findingsJson } from "./findingsJson.ts";
import { resultFigure } from "./resultFigure.ts";

export type JsonValue =
  | string
  | number
  | boolean
  | null
  | readonly JsonValue[]
  | { readonly [key: string]: JsonValue };

export type PointJson = { readonly [key: string]: JsonValue };

/** What `points --format json` and the server's `plumbline/points` say of one file. */
export interface FileJson {
  readonly path: string;
  readonly points: readonly PointJson[];
  readonly findings: readonly FindingJson[];
}

/** Figures to 15 digits; a value that cannot be known is null; lines count from 1. */
export function fileJson(note: Note, path: string): FileJson {
  const points: PointJson[] = [];
  for (const result of note.results()) if (result.kind === "point") points.push(pointJson(result.point));
  return { path, points, findings: findingsJson(note) };
}

export function pointJson(point: PointResult): PointJson {
  const { block } = point;
  return {
    line: block.start + 1,
    endLine: block.start + block.lines.length,
    phase: point.phase,
    title: point.title,
    aside: point.aside,
    emergency: point.emergency,
    aircraft: point.aircraft,
    limits: point.limitsName,
    rules: point.rules,
    ...computedJson(point),
    sweep: point.sweep && sweepJson(point.sweep),
    claims: point.claims.map((claim) => ({
      name: claim.name,
      claimed: resultFigure(claim.name, claim.claimed),
      computed: claim.computed === null ? null : resultFigure(claim.name, claim.computed),
      holds: claim.holds,
    })),
    expected: point.expected.map(({ code, not, came }) => ({ code, not, came })),
    accepted: point.accepted.map((one) => ({ ...one })),
    not_evaluated: point.notEvaluated.map(({ rule, why }) => ({ rule, why })),
    assumed: [...point.assumed],
    inherited: inheritedJson(point),
  };
}

/** Each value of a sweep with the same computed fields as a point, and what the point breaks there. */
function sweepJson({ what, rows }: SweepResult): readonly PointJson[] {
  return rows.map(({ written, point }) => ({
    what,
    value: written.value,
    unit: written.unit,
    of: written.of ?? null,
    ...computedJson(point),
    codes: point.findings.map(({ code }) => code),
  }));
}

function solvedJson(solved: Solved): PointJson {
  const { what, unit, best, blockedBy } = solved;
  const other = solved.other();
  return {
    what,
    value: best?.value ?? null,
    exact: best?.exact ?? null,
    unit,
    boundBy: best?.boundBy ?? null,
    blockedBy,
    other: other && { ...other },
  };
}

/** Everything that is computed of a point, or of one value of its sweep. */
function computedJson(point: PointResult): PointJson {
  const { conditions, further } = point;
  const spread = (name: keyof NonNullable<PointResult["results"]>) => point.results?.[name] ?? null;
  const vs1g = spread("vs1g");
  const stall = spread("stall");
  const warning = spread("warning");
  const ratio = spread("ratio");
  const margin = spread("margin");
  return {
    config: point.configuration?.name ?? null,
    ...conditionsJson(conditions),
    vs1g_kt: knots(vs1g?.nominal),
    vs1g_high_kt: knots(vs1g?.high),
    stall_kt: knots(stall?.nominal),
    stall_high_kt: knots(stall?.high),
    warning_kt: knots(warning?.nominal),
    warning_high_kt: knots(warning?.high),
    ratio: known(ratio?.nominal),
    margin: known(margin?.nominal),
    margin_low: known(margin?.low),
    margin_high: known(margin?.high),
    ratio_low: known(ratio?.low),
    ratio_high: known(ratio?.high),
    stall_load: known(spread("stall-load")?.nominal),
    stall_load_low: known(spread("stall-load")?.low),
    stall_bank_deg: degrees(spread("stall-bank")?.nominal),
    stall_bank_low_deg: degrees(spread("stall-bank")?.low),
    warning_bank_deg: degrees(spread("warning-bank")?.nominal),
    warning_bank_low_deg: degrees(spread("warning-bank")?.low),
    overshoot_deg: degrees(spread("overshoot")?.nominal),
    overshoot_low_deg: degrees(spread("overshoot")?.low),
    buffet_load: known(spread("buffet-load")?.nominal),
    buffet_load_low: known(spread("buffet-load")?.low),
    buffet_bank_deg: degrees(spread("buffet-bank")?.nominal),
    buffet_bank_low_deg: degrees(spread("buffet-bank")?.low),
    low_buffet_mach: known(further?.lowBuffetMach?.nominal),
    low_buffet_mach_high: known(further?.lowBuffetMach?.high),
    high_buffet_mach: known(further?.highBuffetMach?.nominal),
    high_buffet_mach_low: known(further?.highBuffetMach?.low),
    buffet_altitude_ft: inUnit(further?.buffetAltitude?.nominal, "ft"),
    buffet_altitude_low_ft: inUnit(further?.buffetAltitude?.low, "ft"),
    gust_load: known(further?.gustUp?.nominal),
    gust_load_high: known(further?.gustUp?.high),
    gust_load_down: known(further?.gustDown?.nominal),
    gust_load_down_low: known(further?.gustDown?.low),
    margin_after_shear: known(further?.afterShear?.margin?.nominal),
    margin_after_shear_low: known(further?.afterShear?.margin?.low),
    ratio_after_shear: known(further?.afterShear?.ratio?.nominal),
    ratio_after_shear_low: known(further?.afterShear?.ratio?.low),
    va_kt: knots(spread("va")?.nominal),
    ...referenceJson(point),
    power_on_stall_kt: knots(further?.powerOnStall?.nominal),
    radius_nm: inUnit(spread("radius")?.nominal, "nm"),
    radius_high_nm: inUnit(spread("radius")?.high, "nm"),
    rate_deg_s: degrees(spread("rate")?.nominal),
    rate_one_bank_deg: degrees(spread("rate-one-bank")?.nominal),
    bank_limit_deg: degrees(point.bankLimit?.bound),
    bank_advice_deg: degrees(point.bankAdvice?.bound),
    seconds_to_warning: known(further?.secondsToWarning?.nominal),
    seconds_to_warning_low: known(further?.secondsToWarning?.low),
    seconds_to_stall: known(further?.secondsToStall?.nominal),
    seconds_to_stall_low: known(further?.secondsToStall?.low),
    approach_category: further?.categories
      ? { icao: further.categories.icao, faa: further.categories.faa }
      : null,
    solved: point.solved && solvedJson(point.solved),
    withheld: point.withheld ? { line: lineOf(point.withheld.origin) + 1, code: point.withheld.code } : null,
  };
}

function conditionsJson(conditions: Conditions | null): PointJson {
  return {
    mass_kg: known(conditions?.mass.nominal),
    altitude_ft: inUnit(conditions?.altitude.nominal, "ft"),
    pressure_altitude_ft: inUnit(conditions?.pressureAltitude.nominal, "ft"),
    isa_deviation_c: known(conditions?.deviation.nominal),
    cg_percent: percent(conditions?.cg),
    lift_loss_percent: percent(conditions?.liftLoss),
    bank_deg: degrees(conditions?.bank.nominal),
    bank_side: conditions?.bankSide ?? null,
    path_deg: degrees(conditions?.path.nominal),
    load: known(conditions?.load.nominal),
    engine_out: conditions?.engineOut ?? null,
    speed: conditions
      ? {
          cas_kt: knots(conditions.cas.nominal),
          eas_kt: knots(conditions.eas.nominal),
          tas_kt: knots(conditions.tas.nominal),
          mach: known(conditions.mach.nominal),
          ias_kt: knots(conditions.ias?.nominal),
        }
      : null,
  };
}

function referenceJson({ reference }: PointResult): PointJson {
  return {
    v2min_kt: knots(reference.v2min?.cas),
    vfto_kt: knots(reference.vfto?.cas),
    vref_kt: knots(reference.vref?.cas),
  };
}

/** Clause keyword to line, for every carried clause that this point does not state. */
function inheritedJson(point: PointResult): PointJson {
  const inherited: { [key: string]: number } = {};
  const first = point.block.start;
  const last = first + point.block.lines.length - 1;
  for (const [keyword, origin] of point.inputs) {
    const line = lineOf(origin);
    if (line < first || last < line) inherited[inheritedName[keyword] ?? keyword] = line + 1;
  }
  return inherited;
}

const inheritedName: Readonly<Record<string, string>> = { fly: "aircraft", under: "limits" };

/** A figure that is not a number is not known. */
function known(value: number | null | undefined): number | null {
  return value !== undefined && value !== null && Number.isFinite(value) ? value : null;
}

function inUnit(value: number | null | undefined, unit: "kt" | "ft" | "nm" | "deg"): number | null {
  const si = known(value);
  return si === null ? null : figureIn(si, unit);
}

function knots(value: number | null | undefined): number | null {
  return inUnit(value, "kt");
}

function degrees(value: number | null | undefined): number | null {
  return inUnit(value, "deg");
}

function percent(fraction: Spread | null | undefined): number | null {
  const si = known(fraction?.nominal);
  return si === null ? null : figureIn(si, "%");
}
