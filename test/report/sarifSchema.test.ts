import { spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { Ajv2020 } from "ajv/dist/2020.js";
import formats from "ajv-formats";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { catalogue, type FindingCode } from "../../server/src/plan/findings.ts";
import { findingsJson } from "../../server/src/report/findingsJson.ts";
import { passedJson } from "../../server/src/report/passed.ts";
import { sarifLog } from "../../server/src/report/sarif.ts";

/*
 * The schema of the OASIS Standard "Static Analysis Results Interchange Format (SARIF) Version 2.1.0", as
 * published with version 5.7.0 of the npm package @microsoft/sarif-multitool-linux (MIT).
 */
const schema = JSON.parse(readFileSync(new URL("sarif-2.1.0.schema.json", import.meta.url), "utf8"));
const root = fileURLToPath(new URL("../..", import.meta.url));

const ajv = new Ajv2020({ strict: false, allErrors: true });
formats.default(ajv);
const validate = ajv.compile(schema);

function problems(log: unknown): unknown {
  // As it is printed: what is undefined is not there.
  return validate(JSON.parse(JSON.stringify(log))) ? [] : validate.errors;
}

function logOf(text: string, path = "note.plumb") {
  const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
  return sarifLog([{ path, findings: findingsJson(note), passed: passedJson(note) }], "0.0.0", "caution");
}

describe("SARIF is valid against the schema of the standard", () => {
  it("which refuses what is not", () => {
    expect(problems({ version: "2.1.0", runs: [{ results: [] }] })).not.toEqual([]);
    expect(problems({ version: "2.1.0", runs: [] })).toEqual([]);
  });

  it.each([
    ["as it is", []],
    ["with what was held", ["--passed"]],
  ])("over the demo, %s", (_, more) => {
    const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
    const args = [cli, "check", "demo", "--format", "sarif", "--today", "2026-12-01", ...more];
    const { stdout } = spawnSync(process.execPath, args, { cwd: root, encoding: "utf8" });
    const log = JSON.parse(stdout);
    expect(problems(log)).toEqual([]);
    expect(log.runs[0].results.length).toBeGreaterThan(10);
  });

  it.each(Object.keys(catalogue) as FindingCode[])("%s", (code) => {
    const log = logOf(catalogue[code].breaks);
    expect(problems(log)).toEqual([]);
    expect(JSON.stringify(log)).toContain(`"ruleId":"${code}"`);
  });

  it("whatever the note and its path are called", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 20 }), (text) => {
        const title = text.replace(/["\r\n]/g, "");
        const note = `${catalogue.stalled.breaks}| phase climb "${title}"; bank 50; accept bank-over-limit to 60 because "${title}"\n`;
        expect(problems(logOf(note, `plans/${text.replace(/[\\/]/g, "")}x.plumb`))).toEqual([]);
      }),
      { numRuns: 100 },
    );
  });
});
