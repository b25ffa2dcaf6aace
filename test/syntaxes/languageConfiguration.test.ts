import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";

interface LanguageConfiguration {
  readonly comments: { readonly lineComment: string };
  readonly wordPattern: { readonly pattern: string; readonly flags: string };
  readonly onEnterRules: readonly {
    readonly beforeText: string;
    readonly action: { readonly appendText: string };
  }[];
}

const file = new URL("../../syntaxes/languageConfiguration.json", import.meta.url);
const configuration = JSON.parse(readFileSync(file, "utf8")) as LanguageConfiguration;

describe("the language configuration", () => {
  const words = (text: string) =>
    text.match(new RegExp(configuration.wordPattern.pattern, `g${configuration.wordPattern.flags}`));

  it("takes names with hyphens, numbers with decimals and names of any script as one word each", () => {
    expect(words("| config flaps-15; weight 56.4 t; speed M.76; accept bank-over-limit; fly ærø-7")).toEqual([
      ...["config", "flaps-15", "weight", "56.4", "t", "speed", "M", ".76"],
      ...["accept", "bank-over-limit", "fly", "ærø-7"],
    ]);
  });

  it("turns a bar line into prose with the comment command, which puts a blank after its mark", () => {
    const mark = configuration.comments.lineComment;
    const document = openDocument(
      `| bank 25\n${mark} | bank 25\n${mark}| bank 25\n  ${mark} | bank 25\n`,
      "plumb",
    );
    expect([0, 1, 2, 3].map((line) => document.lineKind(line))).toEqual(["bar", "prose", "prose", "prose"]);
  });

  it("begins the next bar on Enter after a bar line that says something, and nowhere else", () => {
    const [rule] = configuration.onEnterRules;
    const continues = (before: string) => new RegExp(rule?.beforeText ?? "").test(before);
    expect(rule?.action.appendText).toBe("| ");
    expect(["| bank 25", "  | bank 25;", "|x"].map(continues)).toEqual([true, true, true]);
    expect(["|", "| ", "  |  ", "", "prose", "prose | bank 25", "\\| bank 25"].map(continues)).toEqual(
      Array(7).fill(false),
    );
  });
});
