import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type QuantityKind, unitOf, unitRule } from "../../server/src/notation/units.ts";
import {
  keywords,
  phases,
  results,
  speedNames,
  subjects,
  vocabulary,
} from "../../server/src/notation/vocabulary.ts";
import { checkScopes, hasScope } from "./checkScopes.ts";
import { loadGrammar, rawGrammar, scopesOf } from "./grammars.ts";

const plumb = await loadGrammar("source.plumb");
const markdown = await loadGrammar("text.html.markdown");
const note = (name: string) => readFileSync(new URL(`notes/${name}.txt`, import.meta.url), "utf8");

describe("the grammar of notes", () => {
  it.each(["points", "definitions", "prose"])("colours %s", (name) => checkScopes(plumb, note(name)));

  it("finds no bar line in a row of a table, whatever follows it", () => {
    const scopes = scopesOf(plumb, ["| a | b |", "| - | - |", "", "| bank 25"]);
    expect(scopes.map((line) => line.some((one) => hasScope(one, "meta.bar-line")))).toEqual([
      false,
      false,
      false,
      true,
    ]);
  });
});

describe("the injection into Markdown", () => {
  it("colours fences that begin with the word plumb, and no others", () =>
    checkScopes(markdown, note("markdown")));
});

describe("the grammar and the vocabulary", () => {
  const misses = (scope: string, lines: readonly (readonly [line: string, word: string])[]) =>
    lines.filter(([line, word]) => {
      const at = line.lastIndexOf(word);
      const scopes = scopesOf(plumb, [line])[0] ?? [];
      return !scopes.slice(at, at + word.length).every((one) => hasScope(one, scope));
    });

  it("colours every keyword at the head of its example", () => {
    const uncoloured = vocabulary.filter(({ keyword, example }) => {
      const scopes = (scopesOf(plumb, [`| ${example}`])[0] ?? []).slice(2, 2 + keyword.length);
      return !scopes.every((one) => hasScope(one, "keyword.control") || hasScope(one, "storage.type"));
    });
    expect(uncoloured.map(({ keyword }) => keyword)).toEqual([]);
  });

  it("colours every phase, subject, speed name and result", () => {
    expect(
      misses(
        "constant.language.phase",
        phases.map((one) => [`| phase ${one}`, one]),
      ),
    ).toEqual([]);
    expect(
      misses(
        "constant.language.phase",
        phases.map((one) => [`| must ${one}`, one]),
      ),
    ).toEqual([]);
    expect(
      misses(
        "support.type.subject",
        subjects.map((one) => [`| must any ${one}`, one]),
      ),
    ).toEqual([]);
    expect(
      misses(
        "support.variable.speed",
        speedNames.map((one) => [`| speed ${one}`, one]),
      ),
    ).toEqual([]);
    expect(
      misses(
        "support.variable.result",
        results.map((one) => [`| claim ${one}`, one]),
      ),
    ).toEqual([]);
  });

  it("colours every unit after a number", () => {
    const kinds: readonly QuantityKind[] = [
      ...([
        "mass",
        "flow",
        "time",
        "speed",
        "altitude",
        "pressure",
        "deviation",
        "temperature",
        "angle",
      ] as const),
      ...(["slope", "per cent", "gust", "decel", "area", "length", "distance", "rate", "number"] as const),
    ];
    const units = new Set(kinds.flatMap((kind) => unitRule(kind).units));
    const lines = [...units]
      .filter((unit) => unit !== "FL")
      .map((unit) => [`| path 1 ${unit}`, unit] as const);
    expect(lines.length).toBeGreaterThan(25);
    expect(misses("keyword.other.unit", lines)).toEqual([]);
  });

  it("has no keyword and no unit that the notation has not", () => {
    const { repository } = rawGrammar("source.plumb") as unknown as {
      repository: { keyword: unknown; argument: { patterns: readonly { match?: string }[] } };
    };
    const known: ReadonlySet<string> = new Set(keywords);
    const words = alternatives(JSON.stringify(repository.keyword));
    expect(words.filter((word) => !known.has(word))).toEqual([]);
    expect(words.length).toBeGreaterThan(40);
    const units = repository.argument.patterns.flatMap(({ match = "" }) =>
      match.includes("kg/h") ? alternatives(match) : [],
    );
    expect(units.filter((unit) => unitOf(unit) === null)).toEqual([]);
    expect(units.length).toBeGreaterThan(30);
  });
});

/** The words of the pattern's case-blind groups, `(?i:one|two)`. */
function alternatives(pattern: string): string[] {
  return [...pattern.matchAll(/\(\?i:([^()]+)\)/g)].flatMap(([, group = ""]) => group.split("|"));
}
