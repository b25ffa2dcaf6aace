import { findingCodes } from "./codes.ts";
import type { Cursor } from "./cursor.ts";
import { atNumber } from "./numbers.ts";
import { orListed } from "./orListed.ts";
import { readQuantity } from "./quantities.ts";
import { readSpeed } from "./speeds.ts";
import type { ClauseBody, Quantity, Title, Unknown, Value } from "./tree.ts";
import type { QuantityKind } from "./units.ts";
import { isRange, readUnknown, readValue } from "./values.ts";
import { phases, type ResultName, results, synonyms } from "./vocabulary.ts";
import { readDate, readName, readTitle, readWord } from "./words.ts";

/** Reads the arguments of one keyword. Null where they are missing or not understood. */
export type ClauseReader = (cursor: Cursor) => ClauseBody | null;

/** `QTY [+- …]` or a sweep. */
function value(cursor: Cursor, kind: QuantityKind): Value | null {
  const read = readValue(cursor, kind);
  if (!read) return null;
  if (!isRange(read)) return read;
  cursor.report("missing-argument", read.span, "A sweep needs its step: write `by` and the step after it.");
  return null;
}

function valueOrUnknown(cursor: Cursor, kind: QuantityKind): Value | Unknown | null {
  cursor.skip();
  return cursor.code() === 63 ? readUnknown(cursor, kind) : value(cursor, kind);
}

function named(kind: "fly" | "under"): ClauseReader {
  return (cursor) => {
    const name = readName(cursor);
    return name && { kind, name };
  };
}

function valued(
  kind: "path" | "load" | "gust" | "cg" | "power" | "decel",
  quantity: QuantityKind,
): ClauseReader {
  return (cursor) => {
    const read = value(cursor, quantity);
    return read && { kind, value: read };
  };
}

function readBurn(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  if (flowAhead(cursor)) {
    const rate = readQuantity(cursor, "flow");
    if (!rate) return null;
    cursor.skip();
    if (!cursor.takeWord("for")) {
      cursor.report(
        "missing-argument",
        rate.span,
        "A fuel flow needs its time: write `for` and the time, such as `for 35 min`.",
      );
      return null;
    }
    const time = readQuantity(cursor, "time");
    if (!time) return null;
    return { kind: "burn-rate", rate, time };
  }
  const amount = value(cursor, "mass");
  if (!amount) return null;
  if (amount.kind === "scalar") return { kind: "burn", amount };
  cursor.report(
    "bad-quantity",
    amount.span,
    "A burn is one figure and cannot be swept: sweep the weight instead.",
  );
  return null;
}

/** True where the burn is a flow and its time: `2.4 t/h for 35 min`. */
function flowAhead({ text, at }: Cursor): boolean {
  const slash = text.indexOf("/", at);
  const word = text.indexOf("for", at);
  if (slash < 0 && word < 0) return false;
  return /^[\d.]+\s*[a-z]+\s*\/|^[^;]*\bfor\b/i.test(text.slice(at));
}

function readIsa(cursor: Cursor): ClauseBody | null {
  const read = value(cursor, "deviation");
  if (!read) return null;
  const quantities = read.kind === "scalar" ? [read.quantity] : [read.from, read.to];
  for (const one of quantities) {
    if (one.signed || one.value === 0) continue;
    const at = one.numberSpan.start;
    cursor.report(
      "bad-quantity",
      one.span,
      `A deviation other than 0 has its sign: write +${one.value} or -${one.value}.`,
      [
        { title: `Write +${one.value}`, edits: [{ line: 0, start: at, end: at, newText: "+" }] },
        { title: `Write -${one.value}`, edits: [{ line: 0, start: at, end: at, newText: "-" }] },
      ],
    );
  }
  return { kind: "isa", value: read };
}

function readBank(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  const read = cursor.takeWord("rate-one") ? ("rate-one" as const) : valueOrUnknown(cursor, "angle");
  if (!read) return null;
  cursor.skip();
  const side = cursor.takeWord("left") ? "left" : cursor.takeWord("right") ? "right" : null;
  if (typeof read === "object" && read.kind !== "unknown") {
    const first = read.kind === "scalar" ? read.quantity : read.from;
    if (first.signed) {
      const digits = Math.abs(first.value);
      cursor.report(
        "bad-quantity",
        first.span,
        `A bank is never signed: write ${digits} left or ${digits} right.`,
        [{ title: `Write ${digits}`, edits: [{ line: 0, ...first.numberSpan, newText: String(digits) }] }],
      );
    }
  }
  return { kind: "bank", value: read, side };
}

function readContamination(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  if (cursor.takeWord("none")) return { kind: "contamination", value: "none" };
  if (atNumber(cursor)) {
    const read = value(cursor, "per cent");
    return read && { kind: "contamination", value: read };
  }
  const name = readName(cursor);
  if (!name) return null;
  cursor.skip();
  if (!atNumber(cursor)) return { kind: "contamination", value: name };
  const loss = readQuantity(cursor, "per cent");
  if (!loss) return null;
  cursor.skip();
  let rain = false;
  if (cursor.code() === 44) {
    const at = cursor.at;
    cursor.take(at + 1, "comma");
    cursor.skip();
    rain = cursor.takeWord("rain") !== null;
    if (!rain)
      cursor.report(
        "unexpected-text",
        { start: at, end: at + 1 },
        "After the loss only `rain` may follow: write `, rain` or nothing.",
      );
  }
  return { kind: "contaminant", name, loss, rain };
}

const resultKinds: Readonly<Record<ResultName, QuantityKind>> = {
  vs1g: "speed",
  overshoot: "angle",
  stall: "speed",
  warning: "speed",
  ratio: "number",
  margin: "number",
  load: "number",
  "stall-load": "number",
  "stall-bank": "angle",
  "warning-bank": "angle",
  "buffet-bank": "angle",
  "buffet-load": "number",
  radius: "distance",
  rate: "rate",
  "rate-one-bank": "angle",
  v2min: "speed",
  vfto: "speed",
  vref: "speed",
  va: "speed",
};

function readClaim(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  if (atNumber(cursor)) return tellNoResult(cursor);
  // A result may spell a keyword: where a result is due, one is read.
  const typed = cursor.word();
  const known = (results as readonly string[]).includes(typed);
  const result = known
    ? { word: typed as ResultName, span: cursor.take(cursor.at + typed.length, "word") }
    : readWord(cursor, results, "unknown-result", "result that can be claimed");
  if (!result) return null;
  const kind = resultKinds[result.word];
  const claimed = readQuantity(cursor, kind);
  if (!claimed) return null;
  cursor.skip();
  let within: Quantity | null = null;
  if (cursor.takeWord("within")) {
    within = readQuantity(cursor, kind, { unitLater: true });
    if (!within) {
      cursor.report(
        "missing-argument",
        claimed.span,
        "After `within` comes how far the figure may be off: write it.",
      );
      return null;
    }
    if (!within.unit && claimed.unit) within = { ...within, unit: claimed.unit };
  }
  return { kind: "claim", result: result.word, value: claimed, within };
}

/** `claim 106 kt` says a figure and not of what. */
function tellNoResult(cursor: Cursor): null {
  cursor.report(
    "missing-argument",
    cursor.take(Math.max(cursor.nameEnd(), cursor.at + 1), "unread"),
    `A claim names a result, then its figure, as in \`claim stall 106 kt\`: write ${orListed(results)} first.`,
  );
  return null;
}

function readCode(cursor: Cursor) {
  return readWord(cursor, findingCodes, "unknown-code", "code of a finding");
}

function readExpect(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  const not = cursor.takeWord("not") !== null;
  const code = readCode(cursor);
  return code && { kind: "expect", not, code: code.word, codeSpan: code.span };
}

function readAccept(cursor: Cursor): ClauseBody | null {
  const code = readCode(cursor);
  if (!code) return null;
  let to: Quantity | null = null;
  let because: Title | null = null;
  let by: Title | null = null;
  let until: ReturnType<typeof readDate> = null;
  for (;;) {
    cursor.skip();
    const at = cursor.at;
    if (cursor.takeWord("to")) to = readLooseQuantity(cursor);
    else if (cursor.takeWord("because")) because = readTitle(cursor);
    else if (cursor.takeWord("by")) by = readTitle(cursor);
    else if (cursor.takeWord("until")) until = readDate(cursor);
    else break;
    if (cursor.lastEnd <= at + 7 && cursor.atClauseEnd()) break;
  }
  if (!because) {
    const at = cursor.lastEnd;
    cursor.report(
      "missing-argument",
      code.span,
      "What is accepted needs its reason: write `because` and the reason in quotation marks.",
      [{ title: "Write because", edits: [{ line: 0, start: at, end: at, newText: ' because ""' }] }],
    );
  }
  return { kind: "accept", code: code.word, codeSpan: code.span, to, because, by, until };
}

/** The figure of an accepted finding: its unit depends on the finding, which the text alone does not know. */
function readLooseQuantity(cursor: Cursor): Quantity | null {
  cursor.skip();
  const rest = cursor.text.slice(cursor.at);
  const unit = /^[-+−–]?[\d.]+\s*([A-Za-z°%]+(?:\/[A-Za-z]+)?)/.exec(rest)?.[1]?.toLowerCase() ?? "";
  const kinds: Readonly<Record<string, QuantityKind>> = {
    kt: "speed",
    kts: "speed",
    "km/h": "speed",
    "m/s": "speed",
    mph: "speed",
    t: "mass",
    kg: "mass",
    lb: "mass",
    lbs: "mass",
    n: "mass",
    kn: "mass",
    ft: "altitude",
    m: "altitude",
    fl: "altitude",
    nm: "distance",
    km: "distance",
    "kt/s": "decel",
    "°": "angle",
    deg: "angle",
  };
  return readQuantity(
    cursor,
    rest.slice(0, 2).toLowerCase() === "fl" ? "altitude" : (kinds[unit] ?? "number"),
  );
}

export const planClauses: Readonly<Record<string, ClauseReader>> = {
  fly: named("fly"),
  under: named("under"),
  rules: (cursor) => {
    const rules = readWord(cursor, ["ifr", "vfr"] as const, "unexpected-text", "set of flight rules");
    return rules && { kind: "rules", rules: rules.word };
  },
  aside: () => ({ kind: "aside" }),
  phase: (cursor) => {
    const phase = readWord(cursor, phases, "unknown-phase", "phase", synonyms);
    // The title is read all the same, so that an unknown phase spoils nothing behind it.
    const title = readTitle(cursor);
    return phase && { kind: "phase", phase: phase.word, title };
  },
  weight: (cursor) => {
    const read = valueOrUnknown(cursor, "mass");
    return read && { kind: "weight", value: read };
  },
  burn: readBurn,
  qnh: (cursor) => {
    const read = readQuantity(cursor, "pressure");
    return read && { kind: "qnh", value: read };
  },
  altitude: (cursor) => {
    const read = valueOrUnknown(cursor, "altitude");
    return read && { kind: "altitude", value: read };
  },
  isa: readIsa,
  oat: (cursor) => {
    const read = value(cursor, "temperature");
    return read && { kind: "oat", value: read };
  },
  speed: readSpeed,
  bank: readBank,
  path: valued("path", "slope"),
  load: valued("load", "number"),
  gust: valued("gust", "gust"),
  shear: (cursor) => {
    const read = readQuantity(cursor, "speed");
    return read && { kind: "shear", value: read };
  },
  cg: valued("cg", "per cent"),
  contamination: readContamination,
  power: valued("power", "per cent"),
  decel: valued("decel", "decel"),
  "engine-out": (cursor) => {
    const engine = readWord(cursor, ["left", "right", "none"] as const, "unexpected-text", "engine");
    return engine && { kind: "engine-out", engine: engine.word };
  },
  emergency: (cursor) => ({ kind: "emergency", title: readTitle(cursor) }),
  claim: readClaim,
  expect: readExpect,
  accept: readAccept,
};
