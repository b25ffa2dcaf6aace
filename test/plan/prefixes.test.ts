import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { demoFiles } from "../support/sampleText.ts";

/** Findings of the whole note, or of the use of a definition that is cut short where it stands. */
const ofTheWholeNote = new Set([
  "unclosed-fence",
  "unused-definition",
  "broken-definition",
  "no-bar-lines",
  "built-in-limits",
]);
/** What a use of a definition says that the cut has not reached yet. */
const ofCutDefinitions = new Set([
  "unknown-aircraft",
  "unknown-limits",
  "unknown-config",
  "unknown-contaminant",
  "missing-value",
  "not-evaluated",
  "claim-unchecked",
]);

describe("half-typed text", () => {
  it.each(demoFiles)(
    "of $name gives at every prefix no crash, and no finding outside its block",
    ({ name, text, flavour }) => {
      const folder = createFolder({ today: "2026-12-01" });
      for (const other of demoFiles) folder.open(`file:///demo/${other.name}`, other.text, other.flavour);
      const uri = `file:///demo/${name}`;
      const whole = new Set(
        folder
          .note(uri)
          ?.findings()
          .map(({ line, finding }) => `${line} ${finding.code}`),
      );
      const note = folder.open(uri, "", flavour);
      let line = 0;
      let character = 0;
      for (const letter of text) {
        note.edit({ line, character }, { line, character }, letter);
        if (letter === "\n") {
          line++;
          character = 0;
        } else character += letter.length;
        // At the start of a line the block above is still being typed.
        const typed = note.document.blockAt(line) ?? (line > 0 ? note.document.blockAt(line - 1) : null);
        for (const { line: at, finding } of note.findings()) {
          const inTyped = typed && typed.start <= at && at < typed.start + typed.lines.length;
          const expected =
            inTyped || ofTheWholeNote.has(finding.code) || whole.has(`${at} ${finding.code}`) || at === line;
          const inDefinitions = /aeroplanes|limits/.test(name) && ofCutDefinitions.has(finding.code);
          expect(
            expected || inDefinitions,
            `${finding.code} on line ${at + 1} after ${line + 1}:${character}: ${finding.message}`,
          ).toBe(true);
        }
      }
      expect(new Set(note.findings().map(({ line: at, finding }) => `${at} ${finding.code}`))).toEqual(whole);
    },
  );
});
