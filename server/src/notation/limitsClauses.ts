import type { Cursor } from "./cursor.ts";
import type { ClauseReader } from "./planClauses.ts";
import { readQuantity } from "./quantities.ts";
import type { ClauseBody, Name, Quantity, RowCondition, RowPhase } from "./tree.ts";
import type { QuantityKind } from "./units.ts";
import { keywordOf, phases, type Subject, subjects, synonyms } from "./vocabulary.ts";
import { readName, readTitle, takeComma, tellUnknownWord, wordAfterComma } from "./words.ts";

/** What a row may say where a phase is due. */
export const rowPhases: readonly RowPhase[] = ["any", "emergency", ...phases];

/** What a subject is measured in. */
const subjectKinds: Readonly<Record<Subject, QuantityKind>> = {
  bank: "angle",
  load: "number",
  radius: "distance",
  ratio: "number",
  margin: "number",
  overshoot: "angle",
  buffet: "number",
};

/** A bound of each subject, for a message. */
const bounds: Readonly<Record<Subject, string>> = {
  bank: "30",
  load: "2.0",
  radius: "1.5 nm",
  ratio: "1.23",
  margin: "1.10",
  overshoot: "15",
  buffet: "1.3",
};

function readRow(verb: "must" | "should"): ClauseReader {
  return (cursor) => {
    const named = readPhases(cursor);
    if (!named) return null;
    const subject = readSubject(cursor);
    if (!subject) return null;
    const bound = readBound(cursor, subject.word);
    if (!bound) return null;
    const conditions = readConditions(cursor);
    return {
      kind: "row",
      verb,
      phases: named.phases,
      phasesSpan: named.span,
      subject: subject.word,
      subjectSpan: subject.span,
      ...bound,
      conditions,
    };
  };
}

function readPhases(cursor: Cursor) {
  cursor.skip();
  const start = cursor.at;
  const found: RowPhase[] = [];
  for (;;) {
    const comma = cursor.code() === 44;
    const word = comma ? wordAfterComma(cursor) : cursor.word();
    const phase = (synonyms[word] ?? word) as RowPhase;
    if (!rowPhases.includes(phase)) break;
    if (comma) takeComma(cursor);
    else if (found.length > 0) tellComma(cursor);
    cursor.take(cursor.at + word.length, "word");
    found.push(phase);
    cursor.skip();
  }
  if (found.length > 0 && cursor.code() === 44 && wordAfterComma(cursor)) {
    takeComma(cursor);
    tellUnknownWord(cursor, rowPhases, "unknown-phase", "phase");
    return null;
  }
  if (found.length > 0) return { phases: found, span: { start, end: cursor.lastEnd } };
  const typed = cursor.word();
  if (typed && !(subjects as readonly string[]).includes(typed)) {
    tellUnknownWord(cursor, rowPhases, "unknown-phase", "phase");
  } else if (typed) {
    const at = cursor.at;
    cursor.report(
      "missing-argument",
      { start: at, end: at + typed.length },
      "A row says in which phases it holds: write `any`, or the phases, before the subject.",
      [{ title: "Write any", edits: [{ line: 0, start: at, end: at, newText: "any " }] }],
    );
  }
  return null;
}

/** Two phases with nothing between them read one way only. */
function tellComma(cursor: Cursor): void {
  const at = cursor.lastEnd;
  const { length } = cursor.word();
  cursor.report(
    "separator",
    { start: cursor.at, end: cursor.at + length },
    "Phases are separated by commas: write one here.",
    [{ title: "Write a comma", preferred: true, edits: [{ line: 0, start: at, end: at, newText: "," }] }],
  );
}

function readSubject(cursor: Cursor) {
  cursor.skip();
  const typed = cursor.word();
  if ((subjects as readonly string[]).includes(typed)) {
    return { word: typed as Subject, span: cursor.take(cursor.at + typed.length, "word") };
  }
  if (typed) {
    tellUnknownWord(cursor, subjects, "unexpected-text", "subject of a row");
  }
  return null;
}

function readBound(cursor: Cursor, subject: Subject) {
  cursor.skip();
  if (cursor.takeWord("none")) return { value: null, vs: null, rateOne: false };
  const value = readQuantity(cursor, subjectKinds[subject]);
  if (!value) {
    const at = cursor.lastEnd;
    const span = { start: at - subject.length, end: at };
    cursor.report(
      "missing-argument",
      span,
      `After \`${subject}\` comes its bound, a figure such as ${bounds[subject]}, or \`none\`: write it.`,
    );
    return null;
  }
  let vs: Quantity | null = null;
  let rateOne = false;
  cursor.skip();
  if (subject === "ratio" && cursor.isWord("vs")) {
    const at = cursor.lastEnd;
    const span = { start: cursor.at, end: cursor.at + 2 };
    cursor.report(
      "unexpected-text",
      span,
      "The figure for cards on the vs basis stands behind a comma: write `, vs`.",
      [{ title: "Write a comma", preferred: true, edits: [{ line: 0, start: at, end: at, newText: "," }] }],
    );
  }
  if (wordAfterComma(cursor) === "vs") {
    takeComma(cursor);
    const at = cursor.takeWord("vs");
    vs = readQuantity(cursor, "number");
    if (at && !vs) {
      cursor.report(
        "missing-argument",
        at,
        "After `vs` comes the figure for cards on the vs basis: write it.",
      );
      return null;
    }
    if (at && subject !== "ratio") {
      cursor.report(
        "unexpected-text",
        at,
        "Only a ratio has another figure for cards on the vs basis: leave `vs` out.",
      );
    }
  }
  cursor.skip();
  if (cursor.word() === "or") {
    const at = cursor.takeWord("or");
    cursor.skip();
    rateOne = cursor.takeWord("rate-one") !== null;
    if (!rateOne && at)
      cursor.report("missing-argument", at, "After `or` only `rate-one` may follow: write it.");
    else if (at && subject !== "bank") {
      cursor.report("unexpected-text", at, "Only a bank can be held to rate one: leave `or rate-one` out.");
    }
  }
  return { value, vs, rateOne };
}

function readConditions(cursor: Cursor): RowCondition[] {
  const conditions: RowCondition[] = [];
  for (;;) {
    cursor.skip();
    const start = cursor.at;
    const word = cursor.word();
    const condition = readCondition(cursor, word, start);
    if (!condition) {
      if (word && !keywordOf(word) && !cursor.faulty) tellNoCondition(cursor);
      return conditions;
    }
    conditions.push(condition);
  }
}

function tellNoCondition(cursor: Cursor): void {
  const said = cursor.text.slice(cursor.at, cursor.nameEnd());
  cursor.report(
    "unexpected-text",
    cursor.take(cursor.nameEnd(), "unread"),
    `${said} is no condition of a row: write \`above\` or \`below\` and a level, \`when ifr\`, \`when vfr\`, \`when engine-out\` or \`after shear\`, or leave it out.`,
  );
}

function readCondition(cursor: Cursor, word: string, start: number): RowCondition | null {
  const span = () => ({ start, end: cursor.lastEnd });
  switch (word) {
    case "above":
    case "below": {
      cursor.takeWord(word);
      const level = readQuantity(cursor, "altitude");
      if (!level) {
        cursor.report(
          "missing-argument",
          span(),
          `After \`${word}\` comes a level, such as FL250 or 10000 ft: write it.`,
        );
        return null;
      }
      return { kind: word, level, span: span() };
    }
    case "when": {
      cursor.takeWord(word);
      cursor.skip();
      const found = (["ifr", "vfr", "engine-out"] as const).find((one) => cursor.takeWord(one));
      if (!found) {
        cursor.report(
          "missing-argument",
          span(),
          "After `when` comes ifr, vfr or engine-out: write one of them.",
        );
        return null;
      }
      return { kind: found, span: span() };
    }
    case "after": {
      cursor.takeWord(word);
      cursor.skip();
      if (!cursor.takeWord("shear")) {
        cursor.report("missing-argument", span(), "After `after` comes `shear`: write it.");
        return null;
      }
      return { kind: "after-shear", span: span() };
    }
    default:
      return null;
  }
}

function readLimits(cursor: Cursor): ClauseBody | null {
  const name = readName(cursor);
  if (!name) return null;
  const title = readTitle(cursor);
  cursor.skip();
  let from: Name | null = null;
  if (wordAfterComma(cursor) === "from" || cursor.word() === "from") {
    takeComma(cursor);
    const at = cursor.takeWord("from");
    from = readName(cursor);
    if (!from && at) {
      cursor.report(
        "missing-argument",
        at,
        "After `from` comes the name of the limits whose rows are taken: write it.",
      );
      return null;
    }
  }
  return { kind: "limits", name, title, from };
}

export const limitsClauses: Readonly<Record<string, ClauseReader>> = {
  limits: readLimits,
  must: readRow("must"),
  should: readRow("should"),
};
