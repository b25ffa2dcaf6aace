import { describe, expect, it } from "vitest";
import { highlights, references } from "../../server/src/features/references.ts";
import { prepareRename, rename } from "../../server/src/features/rename.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import type { Folder } from "../../server/src/plan/folder.ts";
import type { Note } from "../../server/src/plan/note.ts";
import { type Mark, withBrackets } from "../support/fixture.ts";

interface Marked {
  readonly folder: Folder;
  readonly marks: readonly (Mark & { readonly note: Note })[];
}

/** Opens files in which every place of one thing is marked `gives` or `uses`. */
function open(files: Readonly<Record<string, string>>): Marked {
  const folder = createFolder({ today: "2026-12-01" });
  const marks = Object.entries(files).flatMap(([name, marked]) => {
    const { text, marks: own } = withBrackets(marked);
    const note = folder.open(`file:///notes/${name}`, text, name.endsWith(".md") ? "markdown" : "plumb");
    return own.map((mark) => ({ ...mark, note }));
  });
  return { folder, marks };
}

function show(uri: string, line: number, start: number, end: number, gives: boolean): string {
  return `${uri.split("/").pop()} ${line}:${start}-${end} ${gives ? "gives" : "uses"}`;
}

const folders: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  card: {
    "cards.plumb": `| aircraft ⟦=Twite-4⟧ "an invented trainer"; basis vsr; reference 4 t
| config clean stall 80 kt

| limits twite-4, from common-practice
| must any bank 40
`,
    "one.plumb": `| fly ⟦twite-4⟧; under twite-4

| phase cruise; fly ⟦TWITE-4⟧; bank 100 furlongs
`,
    "two.md": `Twite-4 in prose.

\`\`\`plumb
| fly ⟦twite-4⟧ (the twite-4); config clean
\`\`\`
`,
  },
  limits: {
    "limits.plumb": `| limits ⟦=base-rules⟧
| must any bank 40

| limits school-rules "base-rules", from ⟦Base-Rules⟧
| must any bank 35
`,
    "note.plumb": `| under ⟦base-rules⟧; weight

| under school-rules
`,
  },
  configuration: {
    "cards.plumb": `| aircraft twite-4; basis vsr; reference 4 t
| config clean stall 80 kt
| config ⟦=flaps⟧ stall 60 kt, landing
| lift-mach ⟦flaps⟧ 0.10 1.00, 0.60 0.80
| buffet ⟦Flaps⟧ 0.30 0.90, 0.60 0.60
| ias ⟦flaps⟧ 40 kt 45 kt, 90 kt 90 kt
| published vref ⟦flaps⟧ 3 t 80 kt, 4 t 90 kt

| aircraft linnet-2; basis vsr; reference 2 t
| config flaps stall 40 kt
`,
    // A second clause of the same kind in one block gives no value, and still names the configuration.
    "note.plumb": `| fly twite-4; config ⟦flaps⟧

| phase hold; config ⟦flaps⟧; weight 61.4
| config ⟦FLAPS⟧

| fly linnet-2; config flaps

| phase landing; config flaps
`,
  },
  contaminant: {
    "cards.plumb": `| aircraft twite-4; basis vsr; reference 4 t
| config clean stall 80 kt
| contamination ⟦=frost⟧ 30 %
| contamination drizzle 5 %, rain

| aircraft linnet-2; basis vsr; reference 2 t
| config clean stall 40 kt
| contamination frost 20 %
`,
    "note.plumb": `| fly twite-4; contamination ⟦frost⟧

| phase cruise; contamination ⟦Frost⟧

| fly linnet-2; contamination frost
`,
  },
};

describe.each(Object.entries(folders))("the name of a %s", (_, files) => {
  const { folder, marks } = open(files);
  const all = marks.map(({ note, line, start, end, says }) =>
    show(note.uri, line, start, end, says === "gives"),
  );

  it("is found in every note, from each of its places", () => {
    expect(marks.length).toBeGreaterThan(2);
    for (const { note, line, start, end } of marks) {
      for (const character of [start, end]) {
        const found = references(note, folder.notes, line, character, true);
        expect(
          found.map((one) => show(one.uri, one.line, one.span.start, one.span.end, one.defines)),
        ).toEqual(all);
      }
      expect(references(note, folder.notes, line, start, false)).toHaveLength(
        marks.filter(({ says }) => says === "uses").length,
      );
    }
  });

  it("is marked within its note", () => {
    for (const { note, line, start } of marks) {
      const own = marks.filter((mark) => mark.note === note);
      expect(highlights(note, line, start).map((one) => [one.line, one.span.start])).toEqual(
        own.map((mark) => [mark.line, mark.start]),
      );
    }
  });

  it("is changed everywhere, and everything still finds what it found", () => {
    for (const from of marks) {
      const fresh = open(files);
      const note = fresh.folder.note(from.note.uri) as Note;
      const before = codes(fresh.folder);
      const answer = rename(note, fresh.folder.notes, from.line, from.start, " Neu-é9 ");
      if ("refusal" in answer) throw new Error(answer.refusal);
      expect(answer.newName).toBe("Neu-é9");
      apply(fresh.folder, answer);
      expect(codes(fresh.folder)).toEqual(before);
      const again = references(note, fresh.folder.notes, from.line, from.start, true);
      expect(again).toHaveLength(all.length);
    }
  });
});

function apply(folder: Folder, { newName, places }: Exclude<ReturnType<typeof rename>, { refusal: string }>) {
  for (const { uri, line, span } of places.toReversed()) {
    const note = folder.note(uri);
    note?.edit({ line, character: span.start }, { line, character: span.end }, newName);
  }
}

function codes(folder: Folder): string[] {
  return folder.notes.flatMap((note) => note.findings().map(({ finding }) => `${note.uri} ${finding.code}`));
}

describe("the built-in limits", () => {
  it("are found where they are used and where they are given, and keep their name", () => {
    const { folder, marks } = open({
      "note.plumb": "| limits own, from ⟦common-practice⟧\n| must any bank 40\n\n| under COMMON-practice\n",
    });
    const [mark] = marks;
    if (!mark) throw new Error("no mark");
    const found = references(mark.note, folder.notes, mark.line, mark.start, true);
    expect(found.map((one) => [one.uri, one.defines])).toEqual([
      ["file:///notes/note.plumb", false],
      ["file:///notes/note.plumb", false],
      ["plumbline:common-practice", true],
    ]);
    expect(prepareRename(mark.note, mark.line, mark.start)).toEqual({
      refusal: expect.stringContaining("is built in and keeps its name"),
    });
  });
});

describe("a renaming is refused", () => {
  const cards = `| aircraft twite-4; basis vsr; reference 4 t
| config clean stall 80 kt
| config flaps stall 60 kt
| contamination frost 30 %
| contamination drizzle 5 %, rain

| aircraft linnet-2; basis vsr; reference 2 t
| config clean stall 40 kt

| limits own-rules
| must any bank 40

| aircraft double-1; basis vsr; reference 2 t
| config clean stall 40 kt

| aircraft Double-1; basis vsr; reference 2 t
| config clean stall 40 kt
`;

  function refusal(line: string, word: string, newName: string): string {
    const { folder } = open({ "cards.plumb": cards, "note.plumb": line });
    const note = folder.note("file:///notes/note.plumb") as Note;
    const answer = rename(note, folder.notes, 0, line.lastIndexOf(word) + 1, newName);
    return "refusal" in answer ? answer.refusal : `${answer.places.length} places`;
  }

  it.each([
    ["| fly twite-4", "twite-4", "linnet-2", "This folder has a card called linnet-2 already"],
    ["| fly twite-4", "twite-4", "LINNET-2", "This folder has a card called LINNET-2 already"],
    ["| fly twite-4", "twite-4", "a b", "is no name"],
    ["| fly twite-4", "twite-4", "", "is no name"],
    ["| fly twite-4", "twite-4", "-4", "is no name"],
    ["| fly twite-4", "twite-4", "a;b", "is no name"],
    ["| fly twite-4", "twite-4", "a\nb", "is no name"],
    ["| fly twite-44", "twite-44", "x", "No card in this folder is called twite-44"],
    ["| fly double-1", "double-1", "x", "is given 2 times in this folder"],
    ["| under own-rules", "own-rules", "common-practice", "is the name of the built-in limits"],
    ["| under no-rules", "no-rules", "x", "No limits in this folder are called no-rules"],
    ["| fly twite-4; config clean", "clean", "flaps", "twite-4 has a configuration flaps already"],
    ["| fly twite-4; config cleen", "cleen", "x", "twite-4 has no configuration cleen"],
    ["| config clean", "clean", "x", "No line up to here says which aeroplane flies"],
    ["| fly twite-4; contamination frost", "frost", "drizzle", "twite-4 has a contaminant drizzle already"],
    ["| fly twite-4; contamination frost", "frost", "none", "would be read as something else"],
    ["| fly twite-4; contamination frost", "frost", "5", "would be read as something else"],
    ["| weight 5 t", "weight", "x", "Only the name of a card"],
    ["Prose about twite-4.", "twite-4", "x", "Only the name of a card"],
  ])("%s: %s to %s", (line, word, newName, message) => {
    expect(refusal(line, word, newName)).toContain(message);
  });

  it("but never for other letters of the same name, nor for a name of another kind", () => {
    expect(refusal("| fly twite-4", "twite-4", "TWITE-4")).toBe("2 places");
    expect(refusal("| fly twite-4", "twite-4", "own-rules")).toBe("2 places");
    expect(refusal("| fly linnet-2; config clean", "clean", "flaps")).toBe("2 places");
  });
});
