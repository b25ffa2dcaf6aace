import { describe, expect, it } from "vitest";
import { type CodeAction, codeActions } from "../../server/src/features/codeActions.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { catalogue, type FindingCode } from "../../server/src/plan/findings.ts";
import type { Note } from "../../server/src/plan/note.ts";

function open(text: string): Note {
  return createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
}

function count(note: Note, code: FindingCode): number {
  return note.findings().filter(({ finding }) => finding.code === code).length;
}

/** As an editor does it: from the end, so that no edit moves another. */
function apply(note: Note, { edits }: CodeAction): void {
  for (const { line, start, end, newText, wholeLine } of [...edits].sort(
    (a, b) => b.line - a.line || b.start - a.start,
  )) {
    const to = wholeLine ? { line: line + 1, character: 0 } : { line, character: end };
    note.edit({ line, character: wholeLine ? 0 : start }, to, newText);
  }
}

const fixes = (note: Note) =>
  codeActions(note, 0, Number.MAX_SAFE_INTEGER).filter(({ kind }) => kind === "fix");

const offered = (Object.keys(catalogue) as FindingCode[]).flatMap((code) => {
  const { breaks } = catalogue[code];
  return fixes(open(breaks)).map(({ finding, title }, i) => {
    if (!finding) throw new Error(`${title} mends nothing.`);
    return [finding.code, title, breaks, i] as const;
  });
});

describe("quick fixes", () => {
  it("are offered for a good part of the catalogue", () => {
    expect(new Set(offered.map(([code]) => code)).size).toBeGreaterThan(10);
  });

  it.each(offered)("%s: %s takes the finding away", (code, _, breaks, i) => {
    const note = open(breaks);
    const before = count(note, code);
    apply(note, fixes(note)[i] as CodeAction);
    expect(count(note, code)).toBe(before - 1);
  });

  // A stale claim alone is mended with a figure that is computed: that is what a claim is.
  const written = offered.filter(([code]) => code !== "claim-stale");

  it.each(written)("%s: %s writes no figure that the author did not give", (_code, _title, breaks, i) => {
    const action = fixes(open(breaks))[i] as CodeAction;
    // A comma is read as a mark between groups or as the decimal mark; both readings are the author's.
    const readings = (text: string) =>
      (text.match(/\d+(?:[., ]\d+)*/g) ?? []).flatMap((one) => [
        Number(one.replace(/[., ]/g, "")),
        Number(one.replace(/[, ]/g, ".")),
      ]);
    const given = new Set(readings(breaks));
    for (const { newText } of action.edits) {
      for (const figure of newText.match(/\d+(?:\.\d+)?/g) ?? []) expect(given).toContain(Number(figure));
    }
  });
});

describe("taking a finding", () => {
  const taken = (Object.keys(catalogue) as FindingCode[]).flatMap((code) => {
    const note = open(catalogue[code].breaks);
    return codeActions(note, 0, Number.MAX_SAFE_INTEGER)
      .filter(({ kind, title }) => kind === "review" && title.startsWith("Accept"))
      .map((action) => [action.finding?.code as FindingCode, catalogue[code].breaks, action] as const);
  });

  it("is offered for every code that can be accepted and has an example", () => {
    expect(new Set(taken.map(([code]) => code)).size).toBeGreaterThan(18);
  });

  it.each(taken)(
    "%s: is refused until the reason is written, and then covers the figure",
    (code, breaks, action) => {
      const note = open(breaks);
      apply(note, action);
      const codes = () => note.findings().map(({ finding }) => finding.code);
      expect(codes()).toContain("accept-refused");
      const line = note.document.lineCount;
      for (let i = 0; i < line; i++) {
        const at = note.document.lineText(i).indexOf('because ""');
        if (0 <= at) note.edit({ line: i, character: at + 9 }, { line: i, character: at + 9 }, "it is meant");
      }
      expect(codes()).not.toContain("accept-refused");
      const found = note.findings().find(({ finding }) => finding.code === code)?.finding;
      expect(found).toMatchObject({ severity: "information", accepted: { code, because: "it is meant" } });
    },
  );
});

describe("taking a finding", () => {
  const card =
    "| aircraft a-1; basis vsr; reference 55 t; warning 1.03\n| config flaps stall 106 kt, landing\n\n| limits own\n| must landing overshoot 30 after shear\n\n| fly a-1; under own; weight 55 t; config flaps; altitude 0 ft; speed 118 kt\n\n";

  it.each([
    ["shear 5 kt; bank 15", ["accept overshoot-short to 6"]],
    // The warning has come: there is no figure that a clause could take it up to.
    ["shear 15 kt; bank 15", []],
  ])("is offered where it has a figure: %s", (clauses, wanted) => {
    const note = open(`${card}| phase landing; ${clauses}\n`);
    expect(count(note, "overshoot-short")).toBe(1);
    const review = codeActions(note, 0, Number.MAX_SAFE_INTEGER).filter(({ kind }) => kind === "review");
    expect(review.map(({ edits }) => edits[0]?.newText.replace(/^\n\| | because.*$/g, ""))).toEqual(wanted);
  });
});
