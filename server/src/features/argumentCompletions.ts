import { findingCodes } from "../notation/codes.ts";
import { type QuantityKind, unitRule } from "../notation/units.ts";
import { phases, results, speedNames, subjects } from "../notation/vocabulary.ts";
import { catalogue, type FindingCode } from "../plan/findings.ts";
import { formatMass, formatResult, formatSpeed } from "../plan/format.ts";
import { resultEntry } from "../plan/results.ts";
import type { Completion, CompletionPlace } from "./completion.ts";
import { cardInUse } from "./target.ts";

/** What may stand after a keyword, as the clause is typed. */
export function argumentCompletions(place: CompletionPlace): readonly Completion[] {
  const [keyword = "", ...rest] = place.before.toLowerCase().split(/\s+/);
  // The word under the cursor is replaced, so only what stands before it says what is due.
  const done = place.word === "" ? rest.filter(Boolean) : rest.slice(0, -1).filter(Boolean);
  const last = done[done.length - 1] ?? "";
  switch (keyword) {
    case "fly":
      return done.length === 0 ? cardNames(place) : [];
    case "under":
      return done.length === 0 ? limitsNames(place) : [];
    case "limits":
      return last === "from" ? limitsNames(place) : done.length === 1 ? words(place, ["from"]) : [];
    case "config":
      return place.result?.block.kind === "card"
        ? configAttributes(place, done)
        : done.length === 0
          ? configurations(place)
          : [];
    case "lift-mach":
    case "buffet":
    case "ias":
      return done.length === 0
        ? configurations(place)
        : unitsAfterNumber(place, keyword === "ias" ? "speed" : "number");
    case "published":
      return done.length === 0
        ? words(place, ["vref", "v2min", "vfto"])
        : done.length === 1
          ? configurations(place)
          : [];
    case "rules":
      return done.length === 0 ? words(place, ["ifr", "vfr"]) : [];
    case "phase":
      return done.length === 0 ? words(place, phases) : [];
    case "engine-out":
      return done.length === 0 ? words(place, ["left", "right", "none"]) : [];
    case "basis":
      return done.length === 0 ? words(place, ["vsr", "vs1g", "vs"]) : [];
    case "contamination":
      return done.length === 0
        ? contaminants(place)
        : [...unitsAfterNumber(place, "per cent"), ...tolerance(place)];
    case "speed":
      return speedCompletions(place, done);
    case "bank":
      return done.length === 0 && place.word === ""
        ? words(place, ["rate-one"])
        : [
            ...unitsAfterNumber(place, "angle"),
            ...tolerance(place, "optional"),
            ...words(place, ["left", "right"]),
          ];
    case "burn":
      return last === "for"
        ? []
        : [
            ...unitsAfterNumber(place, done.includes("for") ? "time" : "mass"),
            ...(done.includes("for") ? [] : unitsAfterNumber(place, "flow")),
            ...(isFlow(last) ? words(place, ["for"]) : tolerance(place)),
          ];
    case "claim":
      return done.length === 0 ? claims(place) : [];
    case "expect":
    case "accept":
      return done.length === 0
        ? codes(place)
        : keyword === "accept"
          ? words(place, ["to", "because", "by", "until"])
          : [];
    case "must":
    case "should":
      return rowCompletions(place, done);
    default: {
      const kind = quantityKinds[keyword];
      if (!kind) return [];
      return [
        ...unitsAfterNumber(place, kind),
        ...(tolerated.has(keyword) ? tolerance(place, unitRule(kind).optional ? "optional" : "due") : []),
      ];
    }
  }
}

const quantityKinds: Readonly<Record<string, QuantityKind>> = {
  weight: "mass",
  mass: "mass",
  reference: "mass",
  altitude: "altitude",
  ceiling: "altitude",
  qnh: "pressure",
  oat: "temperature",
  isa: "deviation",
  path: "slope",
  cg: "per cent",
  load: "number",
  power: "per cent",
  gust: "gust",
  shear: "speed",
  decel: "decel",
  vmo: "speed",
  vmca: "speed",
  vne: "speed",
  vno: "speed",
  wing: "area",
};

/** What a note knows only so far. A card's figures and the qnh are stated as they are. */
const tolerated: ReadonlySet<string> = new Set(["weight", "altitude", "isa", "oat", "path", "load", "cg"]);

function isFlow(word: string): boolean {
  return (unitRule("flow").units as readonly string[]).includes(word);
}

/** `+-` behind a quantity that is complete, once. */
function tolerance(place: CompletionPlace, unit: "due" | "optional" = "due"): readonly Completion[] {
  const complete = unit === "due" ? /\d\s*(?!FL)[\p{L}°%/]+\s+$|FL\d{3}\s+$/iu : /\d\s*[\p{L}°%/]*\s+$/iu;
  if (!complete.test(place.before) || /\+-|±|\+\/-/.test(place.before)) return [];
  return [{ ...item(place, "+-", "value", "a tolerance", 50), insertText: "+- " }];
}

function item(
  place: CompletionPlace,
  label: string,
  kind: Completion["kind"],
  detail: string,
  rank = 1,
): Completion {
  return {
    label,
    kind,
    detail,
    documentation: null,
    insertText: label,
    snippet: false,
    rank,
    span: place.span,
  };
}

function words(place: CompletionPlace, list: readonly string[], detail = ""): readonly Completion[] {
  return list.map((word, i) => item(place, word, "word", detail, i));
}

function cardNames(place: CompletionPlace): readonly Completion[] {
  return place.note.definitions.cards.map((card) => item(place, card.name, "name", card.title ?? "card"));
}

function limitsNames(place: CompletionPlace): readonly Completion[] {
  const own = place.note.definitions.limits.map((limits) =>
    item(place, limits.name, "name", limits.title ?? "limits"),
  );
  return [...own, item(place, "common-practice", "name", "built in", 2)].filter(
    (one, i, all) => all.findIndex((other) => other.label === one.label) === i,
  );
}

/** The configurations of the card in use, with the stall speed that the card states. */
function configurations(place: CompletionPlace): readonly Completion[] {
  const card = place.result && cardInUse(place.result);
  const reference = card?.referenceMass?.value;
  return (card?.configurations ?? []).map((one, i) => {
    const stall =
      one.statedStall === null
        ? ""
        : `stall ${formatSpeed(one.statedStall)}${reference ? ` at ${formatMass(reference, reference)}` : ""}`;
    return item(place, one.name, "name", stall, i);
  });
}

function contaminants(place: CompletionPlace): readonly Completion[] {
  const card = place.result && cardInUse(place.result);
  const named = (card?.contaminants ?? []).map((one) =>
    item(place, one.name, "name", one.rain ? "rain" : "not for takeoff"),
  );
  return [...named, item(place, "none", "word", "a clean wing", 2)];
}

function configAttributes(place: CompletionPlace, done: readonly string[]): readonly Completion[] {
  if (done.length === 0) return [];
  return [
    ...unitsAfterNumber(place, "speed"),
    ...words(place, ["stall", "load", "vfe", "takeoff", "landing"]),
  ];
}

/** Units once a number stands there, then `+-` and a sweep. */
function unitsAfterNumber(place: CompletionPlace, kind: QuantityKind): readonly Completion[] {
  // A flight level has its unit before it.
  if (!/\d\s*[\p{L}°%/]*$/u.test(place.before) || /FL\d+\s*$/i.test(place.before)) return [];
  const span = unitSpan(place);
  const units = unitRule(kind).units.filter((unit) => unit !== "FL");
  return units.map((unit, i): Completion => ({ ...item(place, unit, "unit", "unit", i), span }));
}

/** A unit may touch its number: only the letters behind it are replaced. */
function unitSpan(place: CompletionPlace) {
  const letters = /[\p{L}°%/]*$/u.exec(place.word)?.[0].length ?? 0;
  return { start: place.span.end - letters, end: place.span.end };
}

function speedCompletions(place: CompletionPlace, done: readonly string[]): readonly Completion[] {
  if (done.length === 0 && !/^\d/.test(place.word)) {
    const snippet = (label: string, insertText: string, detail: string, rank: number): Completion => ({
      ...item(place, label, "value", detail, rank),
      insertText,
      snippet: true,
    });
    return [
      snippet("M", "M $0", "Mach number", 0),
      snippet("vref +", "vref + ${1:5} kt$0", "least landing reference speed and an addition", 1),
      snippet("v2min +", "v2min + ${1:10} kt$0", "least take-off safety speed and an addition", 2),
      snippet("1.3 vs1g", "${1:1.3} vs1g$0", "a multiple of the 1-g stall speed", 3),
      ...speedNames
        .filter((name) => name !== "vs")
        .map((name, i) => item(place, name, "word", resultLabel(name), 4 + i)),
    ];
  }
  const units = unitsAfterNumber(place, "speed");
  const number = /^[\d.]+$/.test(done[done.length - 1] ?? "");
  const kinds = /(kt|kts|km\/h|m\/s|mph)$/.test(done[done.length - 1] ?? "")
    ? words(place, ["cas", "tas", "eas", "ias"])
    : [];
  return [...units, ...kinds, ...(number ? words(place, speedNames) : []), ...tolerance(place)];
}

function resultLabel(name: (typeof speedNames)[number]): string {
  return name === "vs" ? "" : resultEntry(name).label;
}

/** Each result with its value now, so that a claim is written as the formatter shows it. */
function claims(place: CompletionPlace): readonly Completion[] {
  const point = place.result?.kind === "point" ? place.result.point : null;
  return results.map((name, i): Completion => {
    const spread = point?.results?.[name];
    const value = spread ? formatResult(name, spread) : null;
    return {
      ...item(place, name, "value", value ?? "not known here", value ? i : 100 + i),
      insertText: value ? `${name} ${value}` : `${name} `,
    };
  });
}

/** This point's own findings first. */
function codes(place: CompletionPlace): readonly Completion[] {
  const own = new Set((place.result?.findings ?? []).map((one) => one.code as string));
  return findingCodes.map((code) =>
    item(place, code, "value", catalogue[code as FindingCode]?.title ?? "", own.has(code) ? 0 : 1),
  );
}

/** Phases, then the subject, then conditions. */
function rowCompletions(place: CompletionPlace, done: readonly string[]): readonly Completion[] {
  const subject = done.findIndex((word) => (subjects as readonly string[]).includes(word));
  if (subject < 0) {
    const first = done.length === 0 ? ["any", "emergency"] : [];
    return [
      ...words(place, [...first, ...phases], "phase"),
      ...(done.length > 0 ? words(place, subjects, "what the row bounds") : []),
    ];
  }
  const last = done[done.length - 1] ?? "";
  if (last === "when") return words(place, ["ifr", "vfr", "engine-out"]);
  if (last === "after") return words(place, ["shear"]);
  if (last === "or") return words(place, ["rate-one"]);
  if (done.length === subject + 1) return words(place, ["none"]);
  return words(place, ["above", "below", "when", "after", "or"], "condition");
}
