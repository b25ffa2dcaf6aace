import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Document, Flavour } from "../../server/src/notation/document.ts";
import { layout } from "../../server/src/notation/layout.ts";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { parseLine } from "../../server/src/notation/parseLine.ts";
import { print } from "../../server/src/notation/print.ts";
import { demoFiles, notationLine, noteText } from "../support/sampleText.ts";

const anyLine = fc.oneof(
  notationLine,
  fc.string().map((text) => `|${text.replace(/[\r\n]/g, "")}`),
  fc.string({ unit: "binary" }).map((text) => `|${text.replace(/[\r\n]/g, "")}`),
);
const flavour = fc.constantFrom<Flavour>("plumb", "markdown");

describe("a bar line", () => {
  it("is tiled by its tokens, and printed as it was read", () => {
    fc.assert(
      fc.property(anyLine, (text) => {
        const line = parseLine(text);
        let end = 0;
        for (const token of line.tokens) {
          expect(token.start).toBe(end);
          expect(token.end).toBeGreaterThan(token.start);
          end = token.end;
        }
        expect(end).toBe(text.length);
        expect(print(line)).toBe(text);
      }),
      { numRuns: 3000 },
    );
  });

  it("has every span within it, and at most 20 findings", () => {
    fc.assert(
      fc.property(anyLine, (text) => {
        const { clauses, findings } = parseLine(text);
        const spans = [
          ...clauses.flatMap((one) => [one.span, one.keywordSpan]),
          ...findings.map((one) => one.span),
        ];
        for (const { start, end } of spans) {
          expect(0 <= start && start <= end && end <= text.length).toBe(true);
        }
        expect(findings.length).toBeLessThanOrEqual(20);
        for (const clause of clauses)
          if (clause.faulty || !clause.body) expect(findings.length).toBeGreaterThan(0);
      }),
      { numRuns: 2000 },
    );
  });

  it("of a million characters is read in linear time", () => {
    for (const text of [
      `| ${"bank 25; ".repeat(110_000)}`,
      `| ${"(".repeat(1_000_000)}`,
      `| "${"x".repeat(1_000_000)}`,
      `| ${"9".repeat(1_000_000)}`,
      `| ${",".repeat(1_000_000)}`,
    ]) {
      expect(parseLine(text).text).toHaveLength(text.length);
    }
  });
});

/** All that a document says of itself, without what is worked out on demand. */
function described(document: Document) {
  return {
    text: document.text(),
    kinds: Array.from({ length: document.lineCount }, (_, line) => document.lineKind(line)),
    blocks: document.blocks.map(({ kind, start, lines, clauses, findings }) => ({
      kind,
      start,
      lines: lines.map((line) => line.text),
      clauses,
      findings,
    })),
    findings: document.findings,
  };
}

describe("a document", () => {
  it("keeps its text, whatever its line ends", () => {
    fc.assert(
      fc.property(noteText, flavour, (text, kind) => {
        expect(openDocument(text, kind).text()).toBe(text);
      }),
    );
  });

  it("is after any edits what it would be if it were opened anew", () => {
    const edit = fc.record({
      from: fc.nat({ max: 20 }),
      to: fc.nat({ max: 20 }),
      fromCharacter: fc.nat({ max: 40 }),
      toCharacter: fc.nat({ max: 40 }),
      text: fc.oneof(
        noteText,
        fc.constantFrom("", "\n", "|", "```", "```plumb\n", "---\n", "x", "\r", "\r\n"),
      ),
    });
    fc.assert(
      fc.property(noteText, flavour, fc.array(edit, { minLength: 1, maxLength: 5 }), (text, kind, edits) => {
        const document = openDocument(text, kind);
        for (const { from, to, fromCharacter, toCharacter, text: newText } of edits) {
          document.edit(
            { line: from, character: fromCharacter },
            { line: to, character: toCharacter },
            newText,
          );
          expect(described(document)).toEqual(described(openDocument(document.text(), kind)));
        }
      }),
      { numRuns: 1500 },
    );
  });

  it("keeps the blocks that an edit does not touch, the same objects", () => {
    const document = openDocument("| phase hold\n\n| phase climb\n\n| phase landing", "plumb");
    const [first, , last] = document.blocks;
    document.edit({ line: 2, character: 0 }, { line: 2, character: 0 }, "prose\n\n");
    expect(document.blocks[0]).toBe(first);
    expect(document.blocks[2]).toBe(last);
    expect(last?.start).toBe(6);
  });
});

describe("the formatter", () => {
  const formatted = (text: string, kind: Flavour) => {
    const document = openDocument(text, kind);
    for (const { line, newText } of layout(document)) {
      document.edit({ line, character: 0 }, { line, character: document.lineText(line).length }, newText);
    }
    return document.text();
  };
  /** A document's clauses as they are understood, without where they stand. */
  const meaning = (text: string, kind: Flavour) =>
    JSON.stringify(
      openDocument(text, kind).blocks.map((block) => [
        block.kind,
        block.clauses.map(({ clause }) => clause.body),
      ]),
      (key, value) => (/[sS]pan$/.test(key) ? undefined : value),
    );

  it("changes nothing the second time, and never the meaning", () => {
    fc.assert(
      fc.property(noteText, flavour, (text, kind) => {
        const once = formatted(text, kind);
        expect(formatted(once, kind)).toBe(once);
        expect(meaning(once, kind)).toBe(meaning(text, kind));
      }),
      { numRuns: 1500 },
    );
  });

  it("leaves the demo as it is", () => {
    for (const { text, flavour: kind } of demoFiles) expect(formatted(text, kind)).toBe(text);
  });

  it.each([
    ['|  fly  x ;;phase departure"T"( r )', '| fly x; phase departure "T" ( r )'],
    ["| weight 61.4t+-.5 t;isa-3", "| weight 61.4 t +- .5 t; isa -3"],
    ["| speed vref-5kt+-3 kt;phase hold ; ", "| speed vref - 5 kt +- 3 kt; phase hold"],
    ["| bank 25°left;phase hold;altitude FL350", "| bank 25° left; phase hold; altitude FL350"],
    ["| speed  M.76 ;phase cruise", "| speed M .76; phase cruise"],
    ["\t|phase hold", "\t| phase hold"],
    ["| weight 61.4;  phase hold", "| weight 61.4;  phase hold"],
    ["|", "|"],
  ])("writes %j as %j", (text, expected) => {
    expect(formatted(text, "plumb")).toBe(expected);
  });
});
