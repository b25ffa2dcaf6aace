import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

const read = (path: string) => readFileSync(new URL(`../../${path}`, import.meta.url), "utf8");

describe("the licences of what is bundled", () => {
  const notices = read("dist/THIRD-PARTY-NOTICES.txt");

  it("stand in the package with their texts", () => {
    for (const name of [
      "commander",
      "chokidar",
      "ignore",
      "jsonc-parser",
      "vscode-languageclient",
      "vscode-languageserver",
    ]) {
      const [, after = ""] = notices.split(`\n${name} `);
      expect(after, name).toMatch(/^\d+\.\d+\.\d+ \((MIT|ISC)\)\n\n[\s\S]{0,200}(Permission|Copyright)/);
    }
    expect(notices).not.toContain("has no text of its licence");
  });

  it("are those of every package whose code a bundle holds", () => {
    const bundles = ["dist/server/cli.cjs", "dist/server/main.node.cjs", "dist/client/extension.cjs"]
      .map(read)
      .join("");
    // Words that only the package's own code has.
    for (const [word, name] of [
      ["commander.helpDisplayed", "commander"],
      ["textDocument/semanticTokens/full/delta", "vscode-languageserver-protocol"],
    ] as const) {
      expect(bundles).toContain(word);
      expect(notices).toContain(`\n${name} `);
    }
  });
});
