import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import fc from "fast-check";
import { findingCodes } from "../../server/src/notation/codes.ts";
import type { Flavour } from "../../server/src/notation/document.ts";
import { phases, results, speedNames, subjects, vocabulary } from "../../server/src/notation/vocabulary.ts";

/** A file of the demo folder. */
export interface DemoFile {
  readonly name: string;
  readonly text: string;
  readonly flavour: Flavour;
}

export const demoFolder = fileURLToPath(new URL("../../demo/", import.meta.url));

export const demoFiles: readonly DemoFile[] = readdirSync(demoFolder)
  .filter((name) => /\.(plumb|md)$/.test(name))
  .sort()
  .map((name) => ({
    name,
    text: readFileSync(demoFolder + name, "utf8"),
    flavour: name.endsWith(".md") ? "markdown" : "plumb",
  }));

/** Words and marks that mean something in the notation, and some that only look like it. */
const fragments = [
  ...vocabulary.flatMap((one) => [one.keyword, one.example]),
  ...phases,
  ...results,
  ...speedNames,
  ...subjects,
  ...findingCodes.slice(0, 6),
  ...[
    "61.4",
    "61,4",
    "3.000",
    "3 000",
    "FL350",
    "FL35",
    "+-",
    "±",
    "-",
    "–",
    "+",
    "?",
    "to",
    "by",
    "for",
    "or",
  ],
  ...["t", "kg", "kt", "ft", "%", "°", "deg", "hPa", "nm", "none", "rate-one", "left", "any", "when ifr"],
  ...[
    '"title"',
    '"',
    "(remark)",
    "(",
    ")",
    "(TAS)",
    ",",
    ";",
    ":",
    "=",
    "|",
    "\\|",
    "\u200b",
    "é",
    "東京",
    "🛩",
  ],
  ...["brambling-37", "flaps-5", "clean", "2027-03-31", "M", "M.76", "vref+5kt", "isa-3"],
];

/** A line that is made of the notation's own words, in an order that seldom makes sense. */
export const notationLine = fc
  .array(fc.tuple(fc.constantFrom(...fragments), fc.constantFrom("", " ", "; ", "  ")), { maxLength: 14 })
  .map((parts) => `| ${parts.map(([word, gap]) => word + gap).join("")}`);

/** Lines of a note: bar lines, prose, fences, tables, front matter and blanks. */
export const noteLine = fc.oneof(
  { weight: 5, arbitrary: notationLine },
  {
    weight: 3,
    arbitrary: fc.constantFrom(
      "",
      "Prose.",
      "---",
      "```plumb",
      "```",
      "~~~",
      "````",
      "| a | b |",
      "| - | - |",
      "\\| prose",
      "bank 25; speed 200 kt",
      "  | phase hold",
    ),
  },
  { weight: 1, arbitrary: fc.string({ maxLength: 30 }) },
);

export const noteText = fc
  .tuple(fc.array(noteLine, { maxLength: 16 }), fc.constantFrom("\n", "\r\n", "\r"))
  .map(([lines, end]) => lines.map((line) => line.replace(/[\r\n]/g, " ")).join(end));
