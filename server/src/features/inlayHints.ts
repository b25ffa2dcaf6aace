import type { PlacedClause } from "../notation/block.ts";
import type { Unknown, Value } from "../notation/tree.ts";
import type { ResultName } from "../notation/vocabulary.ts";
import type { Card } from "../plan/card.ts";
import { formatFlightLevel, formatMass, formatResult, formatSpeed, formatSpoken } from "../plan/format.ts";
import type { FurtherFigures } from "../plan/further.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import { lineOf, type Origin } from "../plan/origin.ts";
import type { PointResult } from "../plan/point.ts";
import { resultEntry } from "../plan/results.ts";
import { type FurtherRow, gustRows, powerRows, shearRows, timingRows } from "../report/furtherRows.ts";
import { solvedText, sweepText } from "../report/openText.ts";
import { blocksBetween } from "./blocksBetween.ts";
import { allHintKinds, type HintKind, hintKindOf } from "./hintKinds.ts";

export type HintLevel = "full" | "brief" | "off";

/** A stretch of a hint with what stands behind it. */
export interface HintPart {
  readonly text: string;
  /** One plain sentence. */
  readonly tooltip: string | null;
  /** Where the value came from. */
  readonly origin: Origin | null;
}

/** A hint at the end of a clause; a computed number is never taken for the author's, for it begins with `≈`. */
export interface Hint {
  readonly line: number;
  readonly character: number;
  readonly kind: HintKind;
  readonly parts: readonly HintPart[];
}

/** The editor draws at most this many characters of hints on a line, and silently drops the rest. */
const MARKDOWN_LENGTH = 43;

/** The hints of the lines asked for, at most one a clause. In Markdown one a line, the point's own. */
export function inlayHints(
  note: Note,
  from: number,
  to: number,
  level: HintLevel,
  kinds: readonly HintKind[] = allHintKinds,
): readonly Hint[] {
  if (level === "off") return [];
  const hints: Hint[] = [];
  for (const result of blocksBetween(note, from, to)) {
    for (const hint of blockHints(note, result, level))
      if (from <= hint.line && hint.line <= to && kinds.includes(hint.kind)) hints.push(hint);
  }
  return hints;
}

/** The hints of one block. What is drawn nowhere has room for all of them, whatever the note is. */
export function blockHints(
  note: Pick<Note, "flavour">,
  result: BlockResult,
  level: Exclude<HintLevel, "off">,
): readonly Hint[] {
  switch (result.kind) {
    case "point":
      return note.flavour === "markdown"
        ? markdownHints(result.point, level)
        : pointHints(result.point, level);
    case "setting":
      return note.flavour === "markdown" ? [] : settingHints(result);
    case "card":
      return note.flavour === "markdown" ? onePerLine(cardHints(result.card)) : cardHints(result.card);
    case "limits":
      return [];
  }
}

function onePerLine(hints: readonly Hint[]): readonly Hint[] {
  return hints.filter(({ line }, i) => hints.findIndex((other) => other.line === line) === i);
}

function hintAt(
  point: { readonly block: BlockResult["block"] },
  placed: PlacedClause,
  parts: readonly HintPart[],
): Hint | null {
  if (parts.length === 0) return null;
  const [first, ...rest] = parts as [HintPart, ...HintPart[]];
  const joined = [
    { ...first, text: `≈ ${first.text}` },
    ...rest.map((part) => ({ ...part, text: `, ${part.text}` })),
  ];
  return {
    line: point.block.start + placed.line,
    character: placed.clause.span.end,
    kind: hintKindOf(placed.clause.keyword),
    parts: joined,
  };
}

/** A figure of the point as a part of a hint; nothing where it is not known. */
function resultPart(point: PointResult, name: ResultName, lead: string): readonly HintPart[] {
  const spread = point.results?.[name];
  if (!spread) return [];
  const shown = formatResult(name, spread);
  const whole = formatResult(name, spread, { spread: true });
  const { label } = resultEntry(name);
  return [
    {
      text: `${lead}${shown}`,
      tooltip: `The ${label} here is ${whole}.`,
      origin: point.configuration?.origin ?? null,
    },
  ];
}

/** In place of figures that wait for a line in error: nothing moves, and nothing stale is shown. */
function waiting(point: PointResult): readonly HintPart[] {
  const { withheld } = point;
  const tooltip = withheld
    ? `No figures: line ${lineOf(withheld.origin) + 1} has to be mended first (${withheld.code}).`
    : "No figures are known here.";
  return [{ text: "…", tooltip, origin: withheld?.origin ?? null }];
}

function pointHints(point: PointResult, level: "full" | "brief"): readonly Hint[] {
  const hints: Hint[] = [];
  for (const placed of point.block.clauses) {
    const parts = clauseParts(point, placed, level);
    if (!parts) continue;
    const hint = hintAt(point, placed, point.conditions || isOpenAt(point, placed) ? parts : waiting(point));
    if (hint) hints.push(hint);
  }
  return hints;
}

/** What stands behind a clause of a point; null where no hint ever does. */
function clauseParts(
  point: PointResult,
  placed: PlacedClause,
  level: "full" | "brief",
): readonly HintPart[] | null {
  const body = placed.clause.body;
  if (!body || !placed.counts) return spoiltParts(point, placed, level);
  if (isOpenAt(point, placed)) return openParts(point, placed, level);
  switch (body.kind) {
    case "phase":
      return phaseParts(point, level);
    case "gust":
      return furtherParts(point, gustRows, "load ");
    case "shear":
      return furtherParts(point, shearRows);
    case "decel":
      return furtherParts(point, timingRows);
    case "power":
      return point.further?.powerOnStall ? furtherParts(point, powerRows) : null;
    case "weight":
    case "burn":
    case "burn-rate":
      return level === "full" ? massParts(point) : null;
    case "altitude":
      return level === "full" && !isFlightLevel(body.value) ? altitudeParts(point) : null;
    case "speed":
      return isPlainSpeed(body.speed) ? null : speedParts(point, level);
    case "bank":
      return bankParts(point, level);
    default:
      return null;
  }
}

/** True for the clause whose value was sought, where it was, and for the one that is swept. */
function isOpenAt({ solved, sweep }: PointResult, placed: PlacedClause): boolean {
  return solved?.open.placed === placed || sweep?.open.placed === placed;
}

/** What was found for a `?` and what bounds it; the first value of a sweep that breaks something. */
function openParts(point: PointResult, placed: PlacedClause, level: "full" | "brief"): readonly HintPart[] {
  const { solved, sweep } = point;
  if (sweep?.open.placed === placed) {
    const row = sweep.rows[sweep.shown];
    const tooltip = `The figures shown at this point are those at ${sweep.what} ${row ? formatSpoken(row.written, sweep.what) : ""}; the table of points has every row.`;
    return [{ text: sweepText(sweep), tooltip, origin: null }];
  }
  if (!solved) return [];
  const tooltip = solved.best
    ? "This value keeps every rule and check of the point, and the next breaks what is named. A code action writes it in."
    : "No value keeps every rule and check of the point.";
  const found: HintPart = { text: solvedText(solved), tooltip, origin: null };
  return solved.what === "bank" && point.conditions ? [found, ...bankParts(point, level)] : [found];
}

/** Figures that a clause asks for, after their names. */
function furtherParts(
  point: PointResult,
  rows: (further: FurtherFigures) => readonly FurtherRow[],
  lead: string | null = null,
): readonly HintPart[] {
  const shown = point.further ? rows(point.further) : [];
  if (shown.length === 0)
    return [{ text: "…", tooltip: "It is not known here; the hover says why.", origin: null }];
  return shown.map(({ name, text, about }) => ({
    text: `${lead ?? `${name} `}${text}`,
    tooltip: `The ${name}: ${about}.`,
    origin: null,
  }));
}

/** A clause in error, which is being typed as a rule, keeps the place of its hint. */
function spoiltParts(
  point: PointResult,
  { clause }: PlacedClause,
  level: "full" | "brief",
): readonly HintPart[] | null {
  switch (clause.keyword) {
    case "phase":
      return phaseParts(point, level);
    case "weight":
    case "burn":
      return level === "full" ? waiting(point) : null;
    case "bank":
      return waiting(point);
    default:
      return null;
  }
}

function phaseParts(point: PointResult, level: "full" | "brief"): readonly HintPart[] {
  const { sweep } = point;
  const row = sweep?.rows[sweep.shown];
  const at: readonly HintPart[] =
    sweep && row
      ? [
          {
            text: `at ${sweep.what} ${formatSpoken(row.written, sweep.what)}`,
            tooltip: "One value of the sweep.",
            origin: null,
          },
        ]
      : [];
  return [...at, ...figureParts(point, level)];
}

function figureParts(point: PointResult, level: "full" | "brief"): readonly HintPart[] {
  const brief = [...resultPart(point, "margin", "margin "), ...resultPart(point, "ratio", "ratio ")];
  const parts =
    level === "full"
      ? [...brief, ...resultPart(point, "stall", "stall "), ...resultPart(point, "warning", "warning ")]
      : brief;
  return parts.length > 0
    ? parts
    : [{ text: "…", tooltip: "The stall is not known here; the hover says why.", origin: null }];
}

function massParts(point: PointResult): readonly HintPart[] {
  const { conditions, card } = point;
  if (!conditions) return [];
  const reference = card?.referenceMass?.value ?? conditions.mass.nominal;
  const mass: HintPart = {
    text: formatMass(conditions.mass.nominal, reference),
    tooltip: "The weight at this point.",
    origin: point.inputs.get("weight") ?? null,
  };
  return [mass, ...resultPart(point, "vs1g", "vs1g ")];
}

function altitudeParts(point: PointResult): readonly HintPart[] | null {
  const { conditions } = point;
  // Without a qnh no hint stands here, so none waits here.
  if (!conditions) return point.inputs.has("qnh") ? waiting(point) : null;
  const differs =
    conditions.qnh !== null &&
    Math.abs(conditions.pressureAltitude.nominal - conditions.altitude.nominal) > 0.5;
  if (!differs) return null;
  return [
    {
      text: formatFlightLevel(conditions.pressureAltitude.nominal),
      tooltip: "The pressure altitude on the qnh in force.",
      origin: point.inputs.get("qnh") ?? null,
    },
  ];
}

function isFlightLevel(value: Value | Unknown): boolean {
  return value.kind === "scalar" && value.quantity.unit === "FL";
}

function isPlainSpeed(speed: { readonly kind: string }): boolean {
  return speed.kind === "airspeed" && "type" in speed && speed.type === "cas";
}

function speedParts(point: PointResult, level: "full" | "brief"): readonly HintPart[] {
  const { conditions } = point;
  if (!conditions) return [];
  const cas: HintPart = {
    text: formatSpeed(conditions.cas.nominal),
    tooltip: "The calibrated airspeed.",
    origin: null,
  };
  if (level === "brief") return [cas];
  const tas = formatSpeed(conditions.tas.nominal, 0, { type: "tas" });
  return [cas, { text: tas, tooltip: "The true airspeed.", origin: null }];
}

function bankParts(point: PointResult, level: "full" | "brief"): readonly HintPart[] {
  const warning = resultPart(point, "warning-bank", "warning at ");
  const brief = warning.length > 0 ? warning : resultPart(point, "stall-bank", "stall at ");
  if (level === "brief") return brief;
  return [...brief, ...resultPart(point, "load", "load "), ...resultPart(point, "radius", "radius ")];
}

/** One hint a line, the point's own, and never longer than the editor draws. */
function markdownHints(point: PointResult, level: "full" | "brief"): readonly Hint[] {
  const placed = point.block.clauses.find((one) => one.clause.keyword === "phase");
  if (!placed) return [];
  const parts = point.conditions ? phaseParts(point, level) : waiting(point);
  for (let count = parts.length; count > 0; count--) {
    const hint = hintAt(point, placed, parts.slice(0, count));
    const length = hint?.parts.reduce((sum, part) => sum + part.text.length, 0) ?? 0;
    if (hint && length <= MARKDOWN_LENGTH) return [hint];
  }
  return [];
}

/** A speed that a setting reckons is shown where it is written. */
function settingHints(result: Extract<BlockResult, { kind: "setting" }>): readonly Hint[] {
  const placed = result.block.clauses.find((one) => one.counts && one.clause.body?.kind === "speed");
  const body = placed?.clause.body;
  if (!placed || body?.kind !== "speed" || isPlainSpeed(body.speed) || body.speed.kind === "mach") return [];
  const flown = result.after.carried.speed?.value;
  const part: HintPart =
    flown?.kind === "cas"
      ? {
          text: formatSpeed(flown.speed.nominal),
          tooltip: "The calibrated airspeed that goes on from here.",
          origin: null,
        }
      : { text: "…", tooltip: "This speed is not known here.", origin: null };
  const hint = hintAt(result, placed, [part]);
  return hint ? [hint] : [];
}

/** Each configuration of a card shows its 1-g stall speed at the reference mass. */
function cardHints(card: Card): readonly Hint[] {
  const reference = card.referenceMass?.value;
  return card.block.clauses.flatMap((placed) => {
    const body = placed.clause.body;
    if (body?.kind !== "config") return [];
    const configuration = card.configurations.find((one) => one.name === body.name.text);
    const known = !card.withheld && reference && configuration && configuration.stallSpeed !== null;
    const text = known
      ? `vs1g ${formatSpeed(configuration.stallSpeed as number)} at ${formatMass(reference, reference)}`
      : "…";
    const tooltip = known ? "The 1-g stall speed at the reference mass." : "The card has to be mended first.";
    const hint = hintAt(card, placed, [{ text, tooltip, origin: card.basis?.origin ?? null }]);
    return hint ? [hint] : [];
  });
}
