import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type Colour, colours, semanticTokens } from "../../server/src/features/semanticTokens.ts";
import { vocabulary } from "../../server/src/notation/vocabulary.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { withMarks } from "../support/fixture.ts";
import { demoFiles } from "../support/sampleText.ts";
import { hasScope } from "../syntaxes/checkScopes.ts";
import { loadGrammar, scopesOf } from "../syntaxes/grammars.ts";

const plumb = await loadGrammar("source.plumb");
const markdown = await loadGrammar("text.html.markdown");

/** The scopes of the grammar of which every stretch of a colour has one. */
const scopesOfColour: Readonly<Record<Colour, readonly string[]>> = {
  keyword: ["keyword.control", "storage.type.definition", "keyword.other"],
  class: ["entity.name.type"],
  namespace: ["entity.name.type"],
  property: ["variable.other.configuration"],
  enumMember: ["constant.language"],
  variable: ["support.variable"],
  type: ["support.type"],
  modifier: ["storage.modifier"],
  event: ["support.constant.finding"],
  number: ["constant.numeric", "constant.other.date"],
  unit: ["keyword.other.unit"],
  string: ["string"],
  comment: ["comment"],
  operator: ["keyword.operator"],
};

function disagreements(text: string, flavour: "plumb" | "markdown"): string[] {
  const note = besideDemo(text, flavour);
  const scopes = scopesOf(flavour === "plumb" ? plumb : markdown, text.split("\n"));
  return semanticTokens(note, 0, note.document.lineCount - 1).flatMap(({ line, start, end, colour }) => {
    const all = scopes[line]?.slice(start, end) ?? [];
    if (all.every((one) => scopesOfColour[colour].some((scope) => hasScope(one, scope)))) return [];
    return [`"${note.document.lineText(line).slice(start, end)}" is ${colour} and has ${all[0]}`];
  });
}

describe("the colours of words", () => {
  it("are of every kind, with the definitions of a card and of limits marked", () => {
    const { text, marks } = withMarks(`| aircraft twite-4 "trainer"; basis vs 0.94
  ^^^^^^^^ keyword
           ^^^^^^^ class definition
                   ^^^^^^^^^ string
                              ^^^^^ keyword
                                    ^^ enumMember
                                       ^^^^ number
| config clean stall 80 kt, load -1 to 2.5 (clean)
  ^^^^^^ keyword
         ^^^^^ property definition
               ^^^^^ type
                     ^^ number
                        ^^ unit
                            ^^^^ type
                                 ^ number
                                  ^ number
                                    ^^ keyword
                                       ^^^ number
                                           ^^^^^^^ comment

| limits own, from common-practice
  ^^^^^^ keyword
         ^^^ namespace definition
              ^^^^ keyword
                   ^^^^^^^^^^^^^^^ namespace
| must any margin 1.2 when ifr
  ^^^^ keyword
       ^^^ enumMember
           ^^^^^^ type
                  ^^^ number
                      ^^^^ keyword
                           ^^^ enumMember

| fly twite-4; phase hold; speed vref + 5 kt +- 2 kt
  ^^^ keyword
      ^^^^^^^ class
               ^^^^^ keyword
                     ^^^^ enumMember
                           ^^^^^ keyword
                                 ^^^^ variable
                                      ^ operator
                                        ^ number
                                          ^^ unit
                                             ^^ operator
                                                ^ number
                                                  ^^ unit
| config clean; weight ?; expect not stalled
  ^^^^^^ keyword
         ^^^^^ property
                ^^^^^^ keyword
                       ^ operator
                          ^^^^^^ keyword
                                 ^^^ operator
                                     ^^^^^^^ event
`);
    const found = semanticTokens(besideDemo(text), 0, 99).map(({ line, start, end, colour, defines }) => ({
      line,
      start,
      end,
      says: defines ? `${colour} definition` : colour,
    }));
    expect(found).toEqual(marks);
  });

  it.each(vocabulary.map(({ example }) => example))("are those of the grammar in: %s", (example) => {
    expect(disagreements(`| ${example}`, "plumb")).toEqual([]);
  });

  it.each([
    "speed M 0.82 +- 0.01",
    "speed 250 kts tas",
    "speed 1.3 vs1g",
    "altitude fl350",
    "oat -42 °C; bank rate-one left",
    "must takeoff, landing ratio 1.13, vs 1.2 when engine-out above FL300 (a (nested) remark)",
    "wing 104 m2, chord 3.7 m, slope 5 per rad",
    "mass 33 t to 59 t, landing 53 t",
    "vmo 200 kt ias",
    "buffet clean cg 20 %, 0.40 1.25, 0.79 0.62",
    'accept bank-over-limit to 35 because "x" by "y" until 2027-01-01',
  ])("are those of the grammar in: %s", (line) => expect(disagreements(`| ${line}`, "plumb")).toEqual([]));

  it.each(demoFiles)("are those of the grammar in $name", ({ text, flavour }) => {
    expect(disagreements(text, flavour)).toEqual([]);
  });

  it("are told for the lines asked for alone, and for bar lines alone", () => {
    const note = besideDemo("Prose 5 kt.\n\n| weight 5 t\n| isa +6\n");
    expect(semanticTokens(note, 3, 3).map(({ line }) => line)).toEqual([3, 3, 3]);
    expect(semanticTokens(note, 0, 1)).toEqual([]);
  });

  it("stay as the grammar has them where a theme knows no such words", () => {
    const manifest = JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8"));
    const [{ scopes }] = manifest.contributes.semanticTokenScopes;
    expect(Object.keys(scopes)).toEqual([...colours]);
    for (const colour of colours) {
      const [scope = ""] = scopes[colour];
      expect(
        scopesOfColour[colour].some((wanted) => hasScope(scope, wanted)),
        colour,
      ).toBe(true);
    }
  });
});
