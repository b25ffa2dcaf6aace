import { isBlank, isDigit, isMinus } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import { atNumber } from "./numbers.ts";
import type { ClauseReader } from "./planClauses.ts";
import { readQuantity } from "./quantities.ts";
import type { ClauseBody, ConfigAttribute, Name, Pair, PairTable, Quantity, Range } from "./tree.ts";
import type { QuantityKind } from "./units.ts";
import { isRange, readUnknown, readValue } from "./values.ts";
import { readDate, readName, readTitle, takeComma, wordAfterComma } from "./words.ts";

/** Two or more pairs `ARGUMENT VALUE`, separated by commas. */
function readTable(cursor: Cursor, argument: QuantityKind, value: QuantityKind): PairTable | null {
  const pairs: Pair[] = [];
  cursor.skip();
  const start = cursor.at;
  for (;;) {
    const pair = readPair(cursor, argument, value);
    if (!pair) return null;
    pairs.push(pair);
    cursor.skip();
    if (!numberAfterComma(cursor)) break;
    takeComma(cursor);
  }
  return { pairs, span: { start, end: cursor.lastEnd } };
}

function readPair(cursor: Cursor, argument: QuantityKind, value: QuantityKind): Pair | null {
  cursor.skip();
  const start = cursor.at;
  const first = readQuantity(cursor, argument, { inPair: true });
  if (!first) return null;
  const second = readQuantity(cursor, value, { inPair: true });
  if (!second) {
    cursor.report(
      "bad-table",
      { start, end: cursor.lastEnd },
      "A table holds pairs, and this one has no second number: write it, with a comma after each pair.",
    );
    return null;
  }
  return { argument: first, value: second, span: { start, end: cursor.lastEnd } };
}

function numberAfterComma(cursor: Cursor): boolean {
  if (cursor.code() !== 44) return false;
  let at = cursor.at + 1;
  while (isBlank(cursor.text.charCodeAt(at))) at++;
  let code = cursor.text.charCodeAt(at);
  if (code === 43 || isMinus(code)) code = cursor.text.charCodeAt(at + 1);
  return isDigit(code) || code === 46;
}

/** The table told as too short where it is: its pairs are read all the same. */
function table(cursor: Cursor, argument: QuantityKind, value: QuantityKind): PairTable | null {
  const read = readTable(cursor, argument, value);
  if (read && read.pairs.length < 2 && !cursor.faulty) {
    cursor.report(
      "bad-table",
      read.span,
      "A table needs two pairs or more, since nothing is extrapolated: add a pair after a comma.",
    );
  }
  return read;
}

function speedLimit(kind: "vmo" | "vmca" | "vne" | "vno"): ClauseReader {
  return (cursor) => {
    const speed = readQuantity(cursor, "speed");
    if (!speed) return null;
    cursor.skip();
    return { kind, speed, ias: cursor.takeWord("ias") !== null };
  };
}

function factor(kind: "mmo" | "warning" | "v2min"): ClauseReader {
  return (cursor) => {
    const value = readQuantity(cursor, "number");
    return value && { kind, value };
  };
}

function readConfig(cursor: Cursor): ClauseBody | null {
  const name = readName(cursor);
  if (!name) return null;
  const attributes: ConfigAttribute[] = [];
  for (;;) {
    cursor.skip();
    const comma = cursor.code() === 44;
    const word = comma ? wordAfterComma(cursor) : cursor.word();
    if (!isAttribute(cursor, word, comma)) break;
    if (comma) takeComma(cursor);
    const attribute = readAttribute(cursor, word);
    if (!attribute) return { kind: "config", name, attributes };
    if (attributes.some((one) => one.kind === attribute.kind)) {
      cursor.report(
        "duplicate-clause",
        attribute.span,
        `${name.text} states its ${attribute.kind} twice here: keep one.`,
      );
    }
    attributes.push(attribute);
  }
  return { kind: "config", name, attributes };
}

/** `load` is an attribute when a range follows; else it begins the next clause. */
function isAttribute(cursor: Cursor, word: string, comma: boolean): boolean {
  if (word === "stall" || word === "vfe" || word === "takeoff" || word === "landing") return true;
  if (word !== "load") return false;
  const rest = cursor.text.slice(cursor.at + (comma ? 1 : 0));
  return /^\s*load\s+[-+−–]?\s*[\d.]+\s*to\b/i.test(rest);
}

function readAttribute(cursor: Cursor, word: string): ConfigAttribute | null {
  const start = cursor.at;
  cursor.take(start + word.length, "word");
  const span = () => ({ start, end: cursor.lastEnd });
  switch (word) {
    case "takeoff":
    case "landing":
      return { kind: word, span: span() };
    case "load": {
      const range = readRange(cursor, "number");
      return range && { kind: "load", range, span: span() };
    }
    default: {
      const speed = readQuantity(cursor, "speed");
      if (!speed) {
        cursor.report(
          "missing-argument",
          span(),
          `After \`${word}\` comes a speed: write it, such as ${word} 138 kt.`,
        );
        return null;
      }
      cursor.skip();
      const ias = cursor.takeWord("ias") !== null;
      return { kind: word === "vfe" ? "vfe" : "stall", speed, ias, span: span() };
    }
  }
}

function readRange(cursor: Cursor, kind: QuantityKind): Range | null {
  const read = readValue(cursor, kind);
  if (read && isRange(read)) return read;
  if (read)
    cursor.report("missing-argument", read.span, "A range has two ends: write `to` and the other one.");
  return null;
}

/** `mass 33 t to 59 t` is the range of a card; `mass 56 t` is the weight of a plan. */
function readMass(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  if (cursor.code() === 63) return { kind: "weight", value: readUnknown(cursor, "mass") };
  const read = readValue(cursor, "mass");
  if (!read) return null;
  if (!isRange(read)) return { kind: "weight", value: read };
  cursor.skip();
  let landing: Quantity | null = null;
  if (wordAfterComma(cursor) === "landing" || cursor.word() === "landing") {
    takeComma(cursor);
    cursor.takeWord("landing");
    landing = readQuantity(cursor, "mass");
    if (!landing) {
      cursor.report(
        "missing-argument",
        { start: read.span.start, end: cursor.lastEnd },
        "After `landing` comes the greatest landing mass: write it.",
      );
      return null;
    }
  }
  return { kind: "mass", range: read, landing };
}

function readBasis(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  if (cursor.takeWord("vsr")) return { kind: "basis", basis: "vsr" };
  if (cursor.takeWord("vs1g")) return { kind: "basis", basis: "vs1g" };
  const vs = cursor.takeWord("vs");
  if (!vs) {
    if (cursor.word()) {
      const span = cursor.take(cursor.nameEnd(), "unread");
      cursor.report(
        "unexpected-text",
        span,
        "A basis is vsr, vs1g, or vs with its factor, such as `basis vs 0.94`.",
      );
    }
    return null;
  }
  const value = readQuantity(cursor, "number");
  if (!value) {
    cursor.report(
      "missing-argument",
      vs,
      "The basis vs needs its factor, vs over the 1-g stall speed: 0.94 is usual for transport jets, 1.00 takes the figure as the 1-g speed. Write the one that holds.",
    );
    return null;
  }
  return { kind: "basis", basis: "vs", factor: value };
}

function readWing(cursor: Cursor): ClauseBody | null {
  const area = readQuantity(cursor, "area");
  if (!area) return null;
  let chord: Quantity | null = null;
  let slope: Quantity | PairTable | null = null;
  for (;;) {
    cursor.skip();
    const word = wordAfterComma(cursor);
    if (word !== "chord" && word !== "slope") break;
    takeComma(cursor);
    const at = cursor.takeWord(word);
    if (word === "chord") chord = readQuantity(cursor, "length");
    else slope = readSlope(cursor);
    if (!(word === "chord" ? chord : slope)) {
      if (at && !cursor.faulty)
        cursor.report("missing-argument", at, `After \`${word}\` comes its figure: write it.`);
      return null;
    }
  }
  return { kind: "wing", area, chord, slope };
}

/** `slope 5.5 per rad`, or pairs of Mach number and slope. */
function readSlope(cursor: Cursor): Quantity | PairTable | null {
  cursor.skip();
  const start = cursor.at;
  const first = readQuantity(cursor, "number", { inPair: true });
  if (!first) return null;
  cursor.skip();
  let slope: Quantity | PairTable = first;
  if (atNumber(cursor)) {
    const second = readQuantity(cursor, "number", { inPair: true }) as Quantity;
    const pairs: Pair[] = [{ argument: first, value: second, span: { start, end: cursor.lastEnd } }];
    cursor.skip();
    while (numberAfterComma(cursor)) {
      takeComma(cursor);
      const pair = readPair(cursor, "number", "number");
      if (!pair) return null;
      pairs.push(pair);
      cursor.skip();
    }
    slope = { pairs, span: { start, end: cursor.lastEnd } };
  }
  const end = cursor.lastEnd;
  cursor.skip();
  const per = cursor.takeWord("per");
  cursor.skip();
  if (!per || !cursor.takeWord("rad")) {
    cursor.report(
      "missing-unit",
      { start, end },
      "A lift-curve slope is written per rad: write `per rad` after it.",
      [{ title: "Write per rad", edits: [{ line: 0, start: end, end, newText: per ? " rad" : " per rad" }] }],
    );
  }
  return slope;
}

function configTable(kind: "lift-mach" | "buffet" | "ias"): ClauseReader {
  return (cursor) => {
    const config = readName(cursor);
    if (!config) return null;
    if (kind === "ias") {
      const read = table(cursor, "speed", "speed");
      return read && { kind, config, table: read };
    }
    let cg: Quantity | null = null;
    cursor.skip();
    const at = cursor.takeWord("cg");
    if (at) {
      if (kind !== "buffet") {
        cursor.report(
          "unexpected-text",
          at,
          "Only a buffet table states its cg; the cg's effect on the stall is `cg-effect`: leave it out here.",
        );
      }
      cg = readQuantity(cursor, "per cent");
      if (!cg) return null;
      takeComma(cursor);
    }
    const read = table(cursor, "number", "number");
    return read && { kind, config, cg, table: read };
  };
}

function effect(kind: "cg-effect" | "power-effect"): ClauseReader {
  return (cursor) => {
    const read = table(cursor, "per cent", "number");
    return read && { kind, table: read };
  };
}

function readPublished(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  const speed = (["vref", "v2min", "vfto"] as const).find((one) => cursor.takeWord(one));
  if (!speed) {
    if (cursor.word()) {
      const span = cursor.take(cursor.nameEnd(), "unread");
      cursor.report("unexpected-text", span, "Published speeds are vref, v2min or vfto: write one of them.");
    }
    return null;
  }
  const config = readName(cursor);
  if (!config) return null;
  const read = table(cursor, "mass", "speed");
  return read && { kind: "published", speed, config, table: read };
}

/** `source "…" issue 3, from 2026-03-01`, in cards and limits. */
function readSource(cursor: Cursor): ClauseBody | null {
  const title = readTitle(cursor);
  if (!title) return null;
  cursor.skip();
  let issue: Name | null = null;
  if (cursor.takeWord("issue")) {
    issue = readName(cursor);
    if (!issue) {
      cursor.report("missing-argument", title.span, "After `issue` comes its number or name: write it.");
      return null;
    }
  }
  cursor.skip();
  let from: ReturnType<typeof readDate> = null;
  if (wordAfterComma(cursor) === "from" || cursor.word() === "from") {
    takeComma(cursor);
    cursor.takeWord("from");
    from = readDate(cursor);
    if (!from) {
      cursor.report(
        "missing-argument",
        title.span,
        "After `from` comes the day, such as 2026-03-01: write it.",
      );
      return null;
    }
  }
  return { kind: "source", title, issue, from };
}

export const cardClauses: Readonly<Record<string, ClauseReader>> = {
  aircraft: (cursor) => {
    const name = readName(cursor);
    return name && { kind: "aircraft", name, title: readTitle(cursor) };
  },
  source: readSource,
  basis: readBasis,
  reference: (cursor) => {
    const mass = readQuantity(cursor, "mass");
    return mass && { kind: "reference", mass };
  },
  mass: readMass,
  config: readConfig,
  wing: readWing,
  vmo: speedLimit("vmo"),
  vmca: speedLimit("vmca"),
  vne: speedLimit("vne"),
  vno: speedLimit("vno"),
  mmo: factor("mmo"),
  warning: factor("warning"),
  v2min: factor("v2min"),
  ceiling: (cursor) => {
    const altitude = readQuantity(cursor, "altitude");
    return altitude && { kind: "ceiling", altitude };
  },
  "lift-mach": configTable("lift-mach"),
  buffet: configTable("buffet"),
  ias: configTable("ias"),
  "cg-effect": effect("cg-effect"),
  "power-effect": effect("power-effect"),
  published: readPublished,
};
