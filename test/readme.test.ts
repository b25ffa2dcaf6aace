import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { vocabulary } from "../server/src/notation/vocabulary.ts";
import { createFolder } from "../server/src/plan/createFolder.ts";

const readme = readFileSync(new URL("../README.md", import.meta.url), "utf8");

describe("the README", () => {
  it("opens with the job in one paragraph, and shows the cautions", () => {
    const [title, job] = readme.split("\n\n");
    expect(title).toBe("# Plumbline");
    expect(job).toMatch(/^People who write about flights before they are flown/);
    expect(readme).toContain("planning aid, not approved data");
  });

  it("lists every keyword as the vocabulary has it", () => {
    const table = /<!-- keywords -->\n([\s\S]*?)\n<!-- \/keywords -->/
      .exec(readme)?.[1]
      ?.split("\n")
      .slice(2);
    const escaped = (text: string) => text.replaceAll("|", "\\|");
    expect(table).toEqual(
      vocabulary.map(
        ({ keyword, pattern, documentation }) =>
          `| \`${keyword}\` | ${escaped(pattern)} | ${escaped(documentation)} |`,
      ),
    );
  });

  it("has examples that are read without a finding", () => {
    const folder = createFolder({ today: "2026-12-01" });
    const note = folder.open("file:///README.md", readme, "markdown");
    expect(note.document.blocks.length).toBeGreaterThan(5);
    // What an example accepts or expects is meant to be there.
    const unmeant = note.findings().filter(({ finding }) => !finding.accepted && !finding.expected);
    expect(unmeant.map(({ line, finding }) => `${line + 1} ${finding.code}: ${finding.message}`)).toEqual([]);
  });
});
