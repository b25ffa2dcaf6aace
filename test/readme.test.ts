import { readFileSync } from "node:fs";
import { parse as parseToml } from "smol-toml";
import { describe, expect, it } from "vitest";
import { parse as parseYaml } from "yaml";
import { phases, results, subjects, vocabulary } from "../server/src/notation/vocabulary.ts";
import { commonPracticeText } from "../server/src/plan/commonPractice.ts";
import { createFolder } from "../server/src/plan/createFolder.ts";
import { resultEntry } from "../server/src/plan/results.ts";

const readme = readFileSync(new URL("../README.md", import.meta.url), "utf8");

describe("the README", () => {
  it("opens with the job in one paragraph, and shows the cautions", () => {
    const [title, job] = readme.split("\n\n");
    expect(title).toBe("# Plumbline");
    expect(job).toMatch(/^People who write about flights before they are flown/);
    expect(readme).toContain("planning aid, not approved data");
  });

  it("lists every keyword as the vocabulary has it", () => {
    const table = between("keywords")?.slice(2);
    const escaped = (text: string) => text.replaceAll("|", "\\|");
    expect(table).toEqual(
      vocabulary.map(
        ({ keyword, pattern, documentation }) =>
          `| \`${keyword}\` | ${escaped(pattern)} | ${escaped(documentation)} |`,
      ),
    );
  });

  const between = (mark: string) =>
    new RegExp(`<!-- ${mark} -->\\n([\\s\\S]*?)\\n<!-- /${mark} -->`).exec(readme)?.[1]?.split("\n");

  it("lists every result with its meaning and unit", () => {
    expect(between("results")?.slice(2)).toEqual(
      results.map((name) => {
        const { label, unit } = resultEntry(name);
        return `| \`${name}\` | ${label} | ${unit ?? ""} |`;
      }),
    );
  });

  it("lists every phase and every subject of a row", () => {
    expect(readme).toContain(`and in rows: ${phases.map((phase) => `\`${phase}\``).join(", ")}.\n`);
    const table = readme.split("| subject of a row | bounds |\n| --- | --- |\n")[1]?.split("\n\n")[0];
    expect(table?.split("\n").map((row) => /^\| `(\w+)`/.exec(row)?.[1])).toEqual([...subjects]);
  });

  it("prints the built-in limits as they are held", () => {
    const rows = commonPracticeText.split("\n").filter((line) => line.startsWith("|"));
    expect(between("built-in")).toEqual(["```text", ...rows, "```"]);
  });

  it("has examples that are read without a finding", () => {
    const folder = createFolder({ today: "2026-12-01" });
    const note = folder.open("file:///README.md", readme, "markdown");
    expect(note.document.blocks.length).toBeGreaterThan(5);
    // What an example accepts or expects is meant to be there.
    const unmeant = note.findings().filter(({ finding }) => !finding.accepted && !finding.expected);
    expect(unmeant.map(({ line, finding }) => `${line + 1} ${finding.code}: ${finding.message}`)).toEqual([]);
  });

  const appendix = readme.split("## Appendix: set-ups for other editors")[1] ?? "";
  const setUps = (language: string) =>
    [...appendix.matchAll(/```(\w+)\n([\s\S]*?)```/g)]
      .filter(([, of]) => of === language)
      .map(([, , text]) => text ?? "");
  const command = ["plumbline", "serve", "--stdio"];

  it("has set-ups for other editors whose TOML, JSON and YAML are read, and start the server", () => {
    const helix = parseToml(setUps("toml")[0] ?? "");
    expect(helix["language-server"]).toEqual({ plumbline: { command: command[0], args: command.slice(1) } });
    expect(helix.language).toMatchObject([
      { name: "plumb", "file-types": ["plumb"], "language-servers": ["plumbline"] },
      { name: "markdown", "language-servers": expect.arrayContaining(["plumbline"]) },
    ]);
    const [sublime, kate] = setUps("json").map((text) => JSON.parse(text));
    expect(sublime.clients.plumbline).toMatchObject({ command });
    expect(kate.servers.markdown).toMatchObject({ command });
    const syntax = parseYaml(setUps("yaml")[0] ?? "");
    expect(sublime.clients.plumbline.selector.split(" | ")).toContain(syntax.scope);
    expect(syntax.file_extensions).toEqual(["plumb"]);
  });

  it("has no set-up in a language that nothing reads", () => {
    const languages = [...appendix.matchAll(/```(\w+)\n/g)].map(([, language]) => language);
    expect([...new Set(languages)].sort()).toEqual(["elisp", "json", "lua", "toml", "yaml"]);
  });
});
