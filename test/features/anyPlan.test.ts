import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { codeActions } from "../../server/src/features/codeActions.ts";
import { copiedText } from "../../server/src/features/copiedText.ts";
import { hover } from "../../server/src/features/hover.ts";
import { inlayHints } from "../../server/src/features/inlayHints.ts";
import { readLine } from "../../server/src/features/readLine.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { passedJson } from "../../server/src/report/passed.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";
import { tableRows } from "../../server/src/report/pointsTable.ts";

const definitions = `| aircraft testbed-1; basis vsr; reference 55 t; mass 33 t to 59 t, landing 53 t; warning 1.03; vmo 318 kt; mmo 0.79
| config clean stall 138 kt, load -1 to 2.5
| config flaps-15 stall 117 kt, load 0 to 2, vfe 208 kt, takeoff
| config flaps-30 stall 106 kt, load 0 to 2, vfe 178 kt, landing
| wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9 per rad; ceiling FL385; vmca 101 kt
| lift-mach clean 0.30 1.00, 0.50 0.92, 0.70 0.78, 0.79 0.68
| buffet clean 0.40 1.25, 0.60 1.05, 0.74 0.82, 0.79 0.62
| cg-effect 14 % 1.000, 24 % 0.990, 34 % 0.982; power-effect 0 % 1.00, 100 % 0.96
| contamination frost 30 %; contamination heavy-rain 15 %, rain
| published vref flaps-30 45 t 119 kt, 53 t 131 kt

| aircraft testbed-2; basis vs 1.00; reference 740 kg; mass 480 kg to 740 kg
| config clean stall 49 kt, load -1.5 to 3.8
| config full stall 42 kt, load 0 to 2, vfe 85 kt ias, landing
| vne 138 kt ias; vno 108 kt ias; ceiling 12000 ft; warning 1.09
| ias clean 43 kt 49 kt, 50 kt 54 kt, 60 kt 62 kt, 80 kt 80 kt, 120 kt 118 kt

| limits own, from common-practice
| must any bank 30
| should any overshoot 15
| should landing margin 1.10 after shear
| should any radius 2
| should any buffet 1.3 above FL250

| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 220 kt

`;

const one = (...texts: readonly string[]) => fc.constantFrom(...texts);

/** Clauses of every kind, among them what is missing, in error, beyond a table or circular. */
const clause = fc.oneof(
  one("bank ?", "bank 25", "bank ? +- 3", "bank 0 to 60 by 20", "bank rate-one", "bank 20 left", "bank 95"),
  one(
    "speed ?",
    "speed 200 kt",
    "speed M ?",
    "speed M 0.7",
    "speed 150 kt to 250 kt by 50 kt",
    "speed vref + 5 kt",
  ),
  one("speed 1.3 vs1g", "speed 60 kt ias", "speed warning", "speed 100 kt tas"),
  one(
    "weight ?",
    "weight 50 t",
    "weight 50 t +- 1 t",
    "weight 35 t to 58 t by 10 t",
    "weight 600 kg",
    "weight ? lb",
  ),
  one(
    "burn 1 t",
    "burn 10 kg",
    "altitude ?",
    "altitude FL350",
    "altitude 3000 ft",
    "altitude 500 ft",
    "qnh 990 hPa",
  ),
  one(
    "altitude FL200 to FL400 by 5000 ft",
    "isa +10",
    "oat -40 C",
    "isa -10 to +10 by 10",
    "cg 20 %",
    "cg 10 %",
  ),
  one("contamination frost", "contamination 5 %", "contamination none", "contamination 0 % to 20 % by 10 %"),
  one("gust 30 ft/s", "gust 10 ft/s to 50 ft/s by 20 ft/s", "shear 10 kt", "shear 140 kt", "decel 1 kt/s"),
  one("decel 2 kt/s", "power 70 %", "power 120 %", "load 1.5", "load 0", "load -1", "load 0.5 to 2 by 0.5"),
  one("path -3 deg", "path 2 %", "path -700 ft/min", "engine-out left", "aside", 'emergency "a test"'),
  one("expect stalled", "expect not stalled", 'accept bank-over-limit to 45 because "a test"'),
  one(
    'accept stalled because "a test"',
    "claim stall 120 kt",
    "claim margin 1.5 within 0.1",
    "claim radius 1 nm",
  ),
  one(
    "config clean",
    "config flaps-15",
    "config flaps-30",
    "config full",
    "fly testbed-1",
    "fly testbed-2",
    "rules ifr",
  ),
);

const phase = one("takeoff", "departure", "cruise", "hold", "approach", "landing", "manoeuvre", "missed");

const block = fc
  .tuple(
    fc.option(phase, { freq: 5 }),
    fc.uniqueArray(clause, { minLength: 1, maxLength: 7, selector: keywordOf }),
  )
  .map(([where, clauses]) => `| ${[...(where ? [`phase ${where}`] : []), ...clauses].join("; ")}`);

/** What may be given several times counts by its whole text. */
function keywordOf(text: string): string {
  return /^(accept|expect|claim) /.test(text) ? text : (text.split(" ")[0] as string);
}

const madeUp = /NaN|undefined|null|\[object|Infinity/;
const open = (text: string) =>
  createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");

describe("any plan", () => {
  it("shows no figure that is none, anywhere, and no point without figures goes untold", () => {
    fc.assert(
      fc.property(fc.array(block, { minLength: 1, maxLength: 5 }), (blocks) => {
        const note = open(`${definitions}${blocks.join("\n\n")}\n`);
        const file = fileJson(note, "note");
        expect(JSON.stringify(file)).not.toMatch(/NaN|undefined|Infinity/);
        expect(JSON.stringify(passedJson(note))).not.toMatch(/NaN|undefined|Infinity/);
        const last = note.document.lineCount - 1;
        const from = definitions.split("\n").length - 1;
        const shown = [
          ...inlayHints(note, 0, last, "full").flatMap(({ parts }) =>
            parts.flatMap(({ text, tooltip }) => [text, tooltip ?? ""]),
          ),
          ...note.findings().map(({ finding }) => finding.message),
          ...codeActions(note, 0, last).flatMap(({ title, edits }) => [
            title,
            ...edits.map(({ newText }) => newText),
          ]),
          ...tableRows(note).flat(),
          copiedText(note, from, last, "markdown"),
        ];
        for (let line = from; line <= last; line++)
          shown.push(hover(note, line, 3)?.text ?? "", readLine(note, line) ?? "");
        for (const text of shown) expect(text).not.toMatch(madeUp);
        const isTold = file.findings.some(({ severity }) => severity === "error" || severity === "warning");
        if (file.points.some(({ withheld }) => withheld !== null)) expect(isTold).toBe(true);
      }),
      { numRuns: 150 },
    );
  }, 120_000);

  it("is after an edit what it would be if it were opened anew", () => {
    fc.assert(
      fc.property(fc.array(block, { minLength: 1, maxLength: 5 }), block, fc.nat(4), (blocks, other, at) => {
        const note = open(`${definitions}${blocks.join("\n\n")}\n`);
        fileJson(note, "note");
        const line = definitions.split("\n").length - 1 + 2 * (at % blocks.length);
        note.edit({ line, character: 0 }, { line, character: note.document.lineText(line).length }, other);
        expect(fileJson(note, "note")).toEqual(fileJson(open(note.document.text()), "note"));
      }),
      { numRuns: 150 },
    );
  }, 120_000);
});
