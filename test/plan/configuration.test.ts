import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { findingCodes } from "../../server/src/notation/codes.ts";
import { readConfiguration } from "../../server/src/plan/configuration.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { catalogue } from "../../server/src/plan/findings.ts";
import type { Severities } from "../../server/src/plan/severities.ts";

const text = `| aircraft testbed-1; basis vsr; reference 55 t; warning 1.03
| config clean stall 138 kt

| limits own
| must any bank 30
| should any bank 20
| should any overshoot 60

| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 220 kt

| phase cruise; bank 35; accept overshoot-short to 20 because "a test"

| phase climb; bank 25; accept overshoot-short to 20 because "a test"
`;

function told(severities: Severities): Record<string, string> {
  const folder = createFolder({ today: "2026-12-01" });
  folder.severities = severities;
  const note = folder.open("file:///note.plumb", text, "plumb");
  return Object.fromEntries(note.findings().map(({ finding }) => [finding.code, finding.severity]));
}

describe("severities", () => {
  it("are the catalogue's where nobody says otherwise", () => {
    expect(told({})).toEqual({
      "bank-over-limit": "error",
      "bank-over-advice": "warning",
      "overshoot-short": "information",
    });
  });

  it("are raised, and a warning is lowered", () => {
    expect(told({ "bank-over-advice": "error" })["bank-over-advice"]).toBe("error");
    expect(told({ "bank-over-advice": "information" })["bank-over-advice"]).toBe("information");
  });

  it("of an error are never lowered, nor is raised what the note accepts", () => {
    expect(told({ "bank-over-limit": "warning" })["bank-over-limit"]).toBe("error");
    expect(told({ "bank-over-limit": "information" })["bank-over-limit"]).toBe("error");
    expect(told({ "overshoot-short": "error" })["overshoot-short"]).toBe("information");
  });
});

describe("plumbline.json", () => {
  it("is read with comments and trailing commas", () => {
    const { configuration, problems } = readConfiguration(
      '{\n  // ours\n  "severity": { "bank-over-advice": "error", },\n  "exclude": ["drafts/"], "failOn": "warning"\n}\n',
    );
    expect(problems).toEqual([]);
    expect(configuration).toEqual({
      severity: { "bank-over-advice": "error" },
      exclude: ["drafts/"],
      failOn: "warning",
    });
  });

  it.each([
    ['{ "severty": {} }', '"severty"', '"severty" is no key of this file; did you mean "severity"?'],
    [
      '{ "severity": { "bank-over-advise": "error" } }',
      '"bank-over-advise"',
      'did you mean "bank-over-advice"?',
    ],
    [
      '{ "severity": { "stalled": "hint" } }',
      '"hint"',
      'The level of stalled is "error", "warning" or "information".',
    ],
    [
      '{ "severity": { "bank-over-limit": "warning" } }',
      '"warning"',
      'bank-over-limit is an error, and an error is never lowered: write "error", or take it out.',
    ],
    [
      '{ "severity": { "stalled": "error", "stalled" : "error" } }',
      '"stalled"',
      '"stalled" is given twice: take one out.',
    ],
    ['{ "exclude": ["drafts/", 5] }', "5", "A pattern is a text"],
    ['{ "exclude": ["./drafts/"] }', '"./drafts/"', 'write "/drafts/"'],
    ['{ "exclude": ["../drafts/"] }', '"../drafts/"', "in this folder"],
    ['{ "exclude": ["old\\\\drafts"] }', '"old\\\\drafts"', "separated by /"],
    ['{ "exclude": ["#drafts"] }', '"#drafts"', "is a remark"],
    ['{ "severity": [] }', "[]", "severity is an object"],
    ['{ "exclude": "drafts" }', '"drafts"', "exclude is a list of patterns"],
    ['{ "failOn": "hint" }', '"hint"', 'failOn is "error", "warning" or "never".'],
    ["[]", "[]", "The file holds one object"],
    ['{ "failOn": "error" "exclude": [] }', '"exclude"', "This is not JSON here (comma expected)."],
  ])("%s: the mistake is told at its place, and nothing of the file holds", (file, where, says) => {
    const { configuration, problems } = readConfiguration(file);
    expect(configuration).toEqual({ severity: {}, exclude: [], failOn: null });
    const [problem] = problems;
    expect(file.slice(problem?.start, problem?.end)).toBe(where);
    expect(problem?.message).toContain(says);
  });

  it("has a schema with the keys and codes that are read, as the setting has them", () => {
    const read = (path: string) =>
      JSON.parse(readFileSync(new URL(`../../${path}`, import.meta.url), "utf8"));
    const { properties } = read("syntaxes/plumbline.schema.json");
    expect(Object.keys(properties).sort()).toEqual(["$schema", "exclude", "failOn", "severity"]);
    expect(properties.severity.propertyNames.enum).toEqual([...findingCodes]);
    const setting = read("package.json").contributes.configuration.properties["plumbline.severity"];
    expect(setting.propertyNames.enum).toEqual([...findingCodes]);
    const errors = findingCodes.filter((code) => catalogue[code].severity === "error");
    const never = { [`^(${errors.join("|")})$`]: { const: "error" } };
    expect([properties.severity.patternProperties, setting.patternProperties]).toEqual([never, never]);
  });
});
