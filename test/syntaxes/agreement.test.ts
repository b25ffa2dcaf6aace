import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { parseLine } from "../../server/src/notation/parseLine.ts";
import type { TokenKind } from "../../server/src/notation/token.ts";
import { vocabulary } from "../../server/src/notation/vocabulary.ts";
import { hasScope } from "./checkScopes.ts";
import { loadGrammar, scopesOf } from "./grammars.ts";

const plumb = await loadGrammar("source.plumb");
const markdown = await loadGrammar("text.html.markdown");
const demo = new URL("../../demo/", import.meta.url);
const notes = readdirSync(demo);

/** The scopes of which a token of a kind has one; kinds that stand for many things are left out. */
const scopesOfKind: Partial<Record<TokenKind, readonly string[]>> = {
  bar: ["punctuation.definition.bar"],
  separator: ["punctuation.separator.clause"],
  keyword: ["keyword.control", "storage.type.definition"],
  word: ["constant", "keyword", "storage.modifier", "support"],
  number: ["constant.numeric", "constant.other.date"],
  unit: ["keyword.other"],
  unknown: ["keyword.operator"],
  title: ["string"],
  remark: ["comment"],
};

/** Where the grammar calls a token something else than the parser does. */
function disagreements(text: string, scopes: readonly string[]): string[] {
  return parseLine(text).tokens.flatMap(({ kind, start, end }) => {
    const wanted = scopesOfKind[kind];
    const all = scopes.slice(start, end);
    if (!wanted || all.every((one) => wanted.some((scope) => hasScope(one, scope)))) return [];
    return [`${text}: "${text.slice(start, end)}" is a ${kind} and has ${all[0]}`];
  });
}

describe("the grammar and the parser", () => {
  it.each(vocabulary.map(({ example }) => example))("agree on the words of: %s", (example) => {
    const line = `| ${example}`;
    expect(disagreements(line, scopesOf(plumb, [line])[0] ?? [])).toEqual([]);
  });

  it.each(notes)("agree on the lines and the words of %s", (name) => {
    const text = readFileSync(new URL(name, demo), "utf8");
    const lines = text.split("\n");
    const flavour = name.endsWith(".plumb") ? "plumb" : "markdown";
    const scopes = scopesOf(flavour === "plumb" ? plumb : markdown, lines);
    const document = openDocument(text, flavour);
    const bars = lines.flatMap((_, line) => (document.lineKind(line) === "bar" ? [line] : []));
    const coloured = lines.flatMap((_, line) =>
      scopes[line]?.some((one) => hasScope(one, "meta.bar-line")) ? [line] : [],
    );
    expect(coloured).toEqual(bars);
    expect(bars.flatMap((line) => disagreements(lines[line] ?? "", scopes[line] ?? []))).toEqual([]);
    expect(bars.length).toBeGreaterThan(0);
  });
});
