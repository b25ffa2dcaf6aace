import { describe, expect, it } from "vitest";
import { onEnter } from "../../server/src/features/onEnter.ts";
import { selectionRanges } from "../../server/src/features/selectionRanges.ts";
import { signatureHelp } from "../../server/src/features/signatureHelp.ts";
import { workspaceSymbols } from "../../server/src/features/workspaceSymbols.ts";
import type { Flavour } from "../../server/src/notation/document.ts";
import { vocabulary } from "../../server/src/notation/vocabulary.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { atCursor } from "../support/fixture.ts";
import { demoFiles } from "../support/sampleText.ts";

describe("a selection", () => {
  function steps(marked: string, flavour: Flavour = "plumb"): string[] {
    const { text, line, character } = atCursor(marked);
    const lines = text.split("\n");
    return selectionRanges(besideDemo(text, flavour), { line, character }).map(({ start, end }) =>
      start.line === end.line
        ? (lines[start.line]?.slice(start.character, end.character) ?? "")
        : `lines ${start.line} to ${end.line}`,
    );
  }

  it("grows from a word to argument, clause, line, block and note", () => {
    expect(
      steps("Prose.\n\n| fly twite-4; weight 56$0.4 t +- 0.4 t; isa +6\n| qnh 985 hPa\n\nProse."),
    ).toEqual([
      "56.4",
      "56.4 t",
      "56.4 t +- 0.4 t",
      "weight 56.4 t +- 0.4 t",
      "fly twite-4; weight 56.4 t +- 0.4 t; isa +6",
      "| fly twite-4; weight 56.4 t +- 0.4 t; isa +6",
      "lines 2 to 3",
      "lines 0 to 5",
    ]);
  });

  it("grows through a fence in Markdown", () => {
    expect(steps("Prose.\n\n```plumb\n| isa +6\n\n| qnh$0 985 hPa\n```\n", "markdown")).toEqual([
      "qnh",
      "qnh 985 hPa",
      "| qnh 985 hPa",
      "lines 3 to 5",
      "lines 2 to 6",
      "lines 0 to 7",
    ]);
  });

  it("begins with the word of a title, a remark or prose", () => {
    expect(steps('| phase hold "Noise tu$0rn"').slice(0, 4)).toEqual([
      "turn",
      '"Noise turn"',
      'phase hold "Noise turn"',
      '| phase hold "Noise turn"',
    ]);
    expect(steps("| isa +6 (mild$0 day)").slice(0, 2)).toEqual(["mild", "(mild day)"]);
    expect(steps("One line\nan$0d two.\n\nMore.")).toEqual([
      "and",
      "and two.",
      "lines 0 to 1",
      "lines 0 to 3",
    ]);
  });

  it.each(demoFiles)(
    "always grows, from every place of $name, to the whole of it",
    ({ text, flavour, name }) => {
      const folder = createFolder({ today: "2026-12-01" });
      const note = folder.open(name, text, flavour);
      const { lineCount } = note.document;
      for (let line = 0; line < lineCount; line++) {
        for (let character = 0; character <= note.document.lineText(line).length; character += 3) {
          const grown = selectionRanges(note, { line, character });
          const size = grown.map(({ start, end }) => [
            end.line - start.line,
            end.character - start.character,
          ]);
          for (const [i, [lines = 0, characters = 0]] of size.entries()) {
            const [before = 0, ofLine = 0] = size[i - 1] ?? [0, -1];
            expect(before < lines || (before === lines && (ofLine < characters || 0 < lines))).toBe(true);
          }
          expect(grown.at(-1)?.start).toEqual({ line: 0, character: 0 });
          expect(grown.at(-1)?.end.line).toBe(lineCount - 1);
        }
      }
    },
  );

  it("from a place beyond the text begins at its edge", () => {
    const note = besideDemo("| isa +6");
    expect(selectionRanges(note, { line: 99, character: 99 })).toEqual(
      selectionRanges(note, { line: 0, character: 8 }),
    );
    expect(selectionRanges(note, { line: -1, character: -1 })).toEqual(
      selectionRanges(note, { line: 0, character: 0 }),
    );
  });
});

describe("the arguments of a clause", () => {
  function at(marked: string): string | null {
    const { text, line, character } = atCursor(marked);
    const found = signatureHelp(besideDemo(text), line, character);
    const span = found?.parameters[found.active];
    return found && span ? found.label.slice(span.start, span.end) : null;
  }

  it.each([
    ["| weight $0", "MASS"],
    ["| weight 56.4$0", "MASS"],
    ["| weight 56.4 $0", "MASS"],
    ["| weight 56.4 t$0", "MASS"],
    ["| weight 56.4 t $0", "[+- MASS]"],
    ["| weight 56.4 t +- $0", "[+- MASS]"],
    ["| weight 56.4 t +- 0.4 t$0", "[+- MASS]"],
    ["| weight 56$0.4 t +- 0.4 t", "MASS"],
    ["| isa +6; burn $0; isa +3", "MASS | FLOW"],
    ["| burn 2.4 t/h $0", "for TIME"],
    ["| burn 2.4 t/h for 3$0", "for TIME"],
    ["| altitude FL350 $0", "ALTITUDE"],
    ["| phase $0", "PHASE"],
    ["| phase hold $0", '["TITLE"]'],
    ["| bank $0", "ANGLE | rate-one"],
    ["| bank 25 $0", "[left|right]"],
    ["| bank rate-one l$0", "[left|right]"],
    ["| claim $0", "RESULT"],
    ["| claim margin $0", "VALUE"],
    ["| claim margin 1.34 within $0", "[within VALUE]"],
    ["| expect $0", "[not]"],
    ["| expect st$0", "CODE"],
    ["| expect not $0", "CODE"],
    ["| accept bank-over-limit $0", "to VALUE"],
    ["| accept bank-over-limit to 35 $0", 'because "…"'],
    ['| accept bank-over-limit to 35 because "x" by $0', 'by "…"'],
    ["| basis vs $0", "FACTOR"],
    ["| mass 33 t $0", "to MASS"],
    ["| mass 33 t to 59 t, $0", "[, landing MASS]"],
    ["| mass 33 t to 59 t, landing 5$0", "[, landing MASS]"],
    ["| limits own, $0", "[, from NAME]"],
    ["| must takeoff, $0", "PHASES"],
    ["| must takeoff, departure $0", "SUBJECT"],
    ["| must takeoff, departure bank $0", "VALUE"],
    ["| must any bank 30 $0", "[conditions]"],
    ["| lift-mach clean $0", "MACH"],
    ["| lift-mach clean 0.30 $0", "FACTOR"],
    ["| lift-mach clean 0.30 1.00, $0", "MACH"],
    ["| lift-mach clean 0.30 1.00, 0.79 $0", "FACTOR"],
    ["| buffet clean cg $0", "[cg PER CENT,]"],
    ["| buffet clean cg 20 %, $0", "MACH"],
    ["| published vref flaps-30 45 t $0", "SPEED"],
  ])("%s", (marked, wanted) => expect(at(marked)).toBe(wanted));

  it.each([
    "Prose wei$0ght 5 t",
    "| $0",
    "| wei$0",
    "| weight$0",
    "| wieght $0",
    "| aside $0",
    "| isa +6 (a re$0mark)",
    "| isa +6; $0",
  ])("are not told at %s", (marked) => expect(at(marked)).toBeNull());

  it.each(vocabulary.filter(({ pattern }) => pattern !== ""))(
    "are followed through $example, and leave none of the pattern out",
    ({ keyword, pattern, example }) => {
      const text = `| ${example}`;
      const note = besideDemo(text);
      for (let character = keyword.length + 3; character <= text.length; character++) {
        const found = signatureHelp(note, 0, character);
        expect(found?.label).toBe(`${keyword} ${pattern}`);
        expect(found?.parameters[found.active]).toBeDefined();
      }
      const { label, parameters } = signatureHelp(note, 0, text.length) ?? { label: "", parameters: [] };
      let rest = label.slice(keyword.length).replace(/, …$/, "");
      for (const { start, end } of parameters) rest = rest.replace(label.slice(start, end), "");
      expect(rest.trim()).toBe("");
    },
  );
});

describe("Enter", () => {
  /** The text after Enter was pressed at the mark, in an editor that writes `own` on the new line. */
  function enter(marked: string, own = "", flavour: Flavour = "plumb"): string {
    const { text, line, character } = atCursor(marked.replace("$0", `\n${own}$0`));
    const note = besideDemo(text, flavour);
    for (const edit of onEnter(note, line, character).toReversed()) {
      note.edit(
        { line: edit.line, character: edit.start },
        { line: edit.line, character: edit.end },
        edit.newText,
      );
    }
    return note.document.text();
  }

  it.each([
    ["lays out the line that was left", "|  weight 5t ;isa   +6$0", "| ", "| weight 5 t; isa +6\n| "],
    ["writes the bar where the editor does not", "| weight 5 t$0\nProse", "", "| weight 5 t\n| \nProse"],
    ["behind a bar alone ends the block", "| weight 5 t\n| $0", "", "| weight 5 t\n|\n"],
    ["cuts a line in two", "| weight 5 t; $0isa +6", "", "| weight 5 t\n| isa +6"],
    ["cuts a line in two once only", "| weight 5 t; $0isa +6", "| ", "| weight 5 t\n| isa +6"],
    ["keeps the indentation", "  |  weight 5 t$0", "  ", "  | weight 5 t\n  | "],
    ["leaves a line in error as it is", "|  weight 5; isa   +6$0", "| ", "|  weight 5; isa   +6\n| "],
    [
      "leaves other lines as they are",
      "|  isa   +6\n| qnh   985 hPa$0\n|  cg   20 %",
      "| ",
      "|  isa   +6\n| qnh 985 hPa\n| \n|  cg   20 %",
    ],
    [
      "aligns a configuration with its neighbours",
      "| aircraft a\n| config landing stall 50 kt\n| config up stall   60 kt$0",
      "| ",
      "| aircraft a\n| config landing stall 50 kt\n| config up      stall 60 kt\n| ",
    ],
    ["does nothing in prose", "Prose  here$0", "", "Prose  here\n"],
    ["does nothing above a bar line", "$0|  weight 5 t", "", "\n|  weight 5 t"],
    ["does nothing in a table", "| a | b |\n| - | - |\n| c | d |$0", "", "| a | b |\n| - | - |\n| c | d |\n"],
  ])("%s", (_, marked, own, wanted) => expect(enter(marked, own)).toBe(wanted));

  it("does so in a fence, and nothing outside", () => {
    expect(enter("```plumb\n| isa   +6$0\n```\n", "", "markdown")).toBe("```plumb\n| isa +6\n| \n```\n");
    expect(enter("| isa   +6$0\n", "", "markdown")).toBe("| isa   +6\n\n");
  });
});

describe("symbols of all notes", () => {
  const folder = createFolder({ today: "2026-12-01" });
  for (const { name, text, flavour } of demoFiles) folder.open(`file:///demo/${name}`, text, flavour);
  const names = (query: string) => workspaceSymbols(folder.notes, query).map(({ entry }) => entry.name);

  it.each([
    ["noise", "departure: Noise turn"],
    ["dep noi", "departure: Noise turn"],
    ["DNT", "departure: Noise turn"],
    ["brambling", "brambling-37"],
    ["shuttle-r", "shuttle-rules"],
    ["flaps-15", "flaps-15"],
  ])("%s finds %s", (query, wanted) => expect(names(query)).toContain(wanted));

  it("are none for letters that no name has, and all for none", () => {
    expect(names("zzz")).toEqual([]);
    const points = folder.notes.flatMap((note) => note.results().filter(({ kind }) => kind === "point"));
    expect(workspaceSymbols(folder.notes, " ").filter(({ entry }) => entry.kind === "point")).toHaveLength(
      points.length,
    );
    expect(workspaceSymbols(folder.notes, "").some(({ entry }) => entry.kind === "setting")).toBe(false);
  });

  it("that hold the query in one piece come first, and of these the ones that begin with it", () => {
    const one = createFolder({ today: "2026-12-01" });
    one.open("a.plumb", '| phase climb "a pivot"\n\n| phase hold "rap"\n\n| limits ap-1', "plumb");
    const found = workspaceSymbols(one.notes, "ap").map(({ entry }) => entry.name);
    expect(found).toEqual(["ap-1", "climb: a pivot", "hold: rap"]);
  });

  it("know the card of a configuration", () => {
    const found = workspaceSymbols(folder.notes, "flaps-15").find(({ entry }) => entry.name === "flaps-15");
    expect(found).toMatchObject({ uri: "file:///demo/aeroplanes.plumb", container: "brambling-37" });
  });
});
