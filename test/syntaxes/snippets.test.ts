import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { Flavour } from "../../server/src/notation/document.ts";
import { phases } from "../../server/src/notation/vocabulary.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";

interface Snippet {
  readonly prefix: string;
  readonly body: readonly string[];
  readonly description: string;
}

const read = (path: string) => readFileSync(new URL(`../../${path}`, import.meta.url), "utf8");
const snippetsOf = (path: string) => Object.values(JSON.parse(read(path)) as Record<string, Snippet>);
const snippets = snippetsOf("syntaxes/snippets.json");

/** A snippet as it stands where nothing was typed over, once for each word that may be chosen in it. */
function texts({ body }: Snippet): readonly string[] {
  let all = [body.join("\n")];
  for (let choice = /\$\{(\d+)\|([^|]*)\|\}/.exec(all[0] ?? ""); choice; ) {
    const [, stop, words = ""] = choice;
    const same = new RegExp(String.raw`\$\{${stop}\|[^|]*\|\}`, "g");
    all = all.flatMap((text) => words.split(",").map((word) => text.replace(same, word)));
    choice = /\$\{(\d+)\|([^|]*)\|\}/.exec(all[0] ?? "");
  }
  return all.map((text) => text.replace(/\$\{\d+:([^}]*)\}/g, "$1").replace(/\$\d/g, ""));
}

const first = (prefix: string) => texts(snippets.find((one) => one.prefix === prefix) as Snippet)[0] ?? "";

function findings(text: string, flavour: Flavour = "plumb"): readonly string[] {
  const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, flavour);
  return note.findings().map(({ line, finding }) => `${line + 1} ${finding.code}: ${finding.message}`);
}

const card = first("card");
const limits = first("limits");
const setting = first("setting");

describe("a snippet", () => {
  it.each(snippets.map((one) => [one.prefix, one] as const))(
    "reads without findings: %s",
    (prefix, snippet) => {
      const every = texts(snippet);
      expect(every.length).toBeGreaterThan(0);
      for (const text of every) {
        expect(text).not.toContain("$");
        if (prefix === "card" || prefix === "card-light" || prefix === "limits")
          expect(findings(text)).toEqual([]);
        const start = [prefix === "card" ? text : card, prefix === "limits" ? text : limits];
        const flight = prefix === "setting" ? [text, first("point-cruise")] : [setting];
        if (prefix === "remark") flight.push(first("point-cruise").trimEnd() + text);
        else if (/^point-|^engine-out$/.test(prefix)) flight.push(text);
        else if (prefix !== "setting") flight.push(first("point-cruise"));
        const note = [...start, ...flight].join("\n\n");
        expect(findings(note), note).toEqual([]);
      }
    },
  );

  it("is there for each phase", () => {
    const prefixes = snippets.map(({ prefix }) => prefix);
    expect(prefixes.filter((one) => one.startsWith("point-"))).toEqual(
      phases.map((phase) => `point-${phase}`),
    );
    expect(new Set(prefixes).size).toBe(prefixes.length);
  });

  it("makes a fence in Markdown", () => {
    const [fence] = snippetsOf("syntaxes/fenceSnippets.json");
    const note = [card, limits].map((text) => `\`\`\`plumb\n${text}\n\`\`\`\n`).join("\n");
    for (const text of texts(fence as Snippet)) {
      const point = first("point-cruise").trimEnd();
      expect(findings(`${note}\n${text.replace(/```\s*$/, `\n${point}\n\`\`\`\n`)}`, "markdown")).toEqual([]);
    }
  });

  it("is no source of figures that pass for the manual's", () => {
    for (const prefix of ["card", "card-light"])
      expect(first(prefix)).toMatch(/source "example figures: replace them/);
  });
});

describe("the sample note", () => {
  const sample = read("client/media/walkthrough/sample.plumb");

  it("has the one steep turn that the walkthrough speaks of", () => {
    expect(findings(sample).map((one) => one.replace(/^\d+ |:.*$/g, ""))).toEqual(["bank-over-limit"]);
    expect(findings(sample.replace("bank 35 left", "bank 20 left"))).toEqual([]);
  });
});
