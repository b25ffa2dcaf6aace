import fc from "fast-check";
import { XMLParser, XMLValidator } from "fast-xml-parser";
import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { findingsJson } from "../../server/src/report/findingsJson.ts";
import { githubCommands } from "../../server/src/report/github.ts";
import { junitPoints, junitXml } from "../../server/src/report/junit.ts";

const card = `| aircraft testbed-1; basis vsr; reference 55 t; warning 1.03
| config clean stall 138 kt

| limits own
| must any bank 30
| should any bank 20; must any margin none

| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 220 kt
`;

function file(points: string, path = "plans/a, b: c%.plumb") {
  const note = createFolder({ today: "2026-12-01" }).open(
    "file:///note.plumb",
    `${card}\n${points}\n`,
    "plumb",
  );
  return { path, findings: findingsJson(note), points: junitPoints(note) };
}

const errors = ({ severity }: { severity: string }) => severity === "error";

function parsed(text: string) {
  expect(XMLValidator.validate(text)).toBe(true);
  const parser = new XMLParser({
    ignoreAttributes: false,
    attributeNamePrefix: "",
    isArray: (name) => ["testsuite", "testcase", "failure"].includes(name),
  });
  return parser.parse(text).testsuites;
}

describe("workflow commands", () => {
  it("name the place, the code and the sentence, with what would end them written otherwise", () => {
    expect(
      githubCommands([file("| phase cruise; bank 35; contamination 0 %\n\n| phase climb; bank 25")]),
    ).toBe(
      "::error file=plans/a%2C b%3A c%25.plumb,line=10,col=17,endLine=10,endColumn=24,title=bank-over-limit::Bank 35° exceeds the 30° that own allows in cruise and the 20° that it advises: bank 20° or less; at 220 kt the warning would come at 67°.\n" +
        "::warning file=plans/a%2C b%3A c%25.plumb,line=12,col=16,endLine=12,endColumn=23,title=bank-over-advice::Bank 25° exceeds the 20° that own advises in climb: bank 20° or less; at 220 kt the warning would come at 67°.\n",
    );
  });

  it("are one line each, whatever the note says", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 30 }), (text) => {
        const commands = githubCommands([file(`| phase cruise "${text}"; bank 35; config ${text}`)]);
        for (const line of commands.trimEnd().split("\n"))
          expect(line).toMatch(/^::(error|warning|notice) file=/);
        expect(commands).not.toContain("\r");
      }),
      { numRuns: 200 },
    );
  });
});

describe("JUnit XML", () => {
  it("has a case for each point: one that passed, one that failed, one that was not checked", () => {
    const xml = junitXml(
      [
        file(
          '| phase cruise "kept"\n\n| phase cruise "broken"; bank 35\n\n| phase climb "waits"; aside; config flaps\n\n| phase climb "too"; weight 50',
        ),
      ],
      errors,
      "caution",
    );
    const { testsuite: suites, ...sums } = parsed(xml);
    expect(sums).toMatchObject({ tests: "4", failures: "3", errors: "0" });
    const cases = suites[0].testcase as { name: string; failure?: { type: string }[] }[];
    expect(cases.map(({ name, failure }) => [name, failure?.map(({ type }) => type)])).toEqual([
      ['line 10: cruise "kept"', undefined],
      ['line 12: cruise "broken"', ["bank-over-limit"]],
      ['line 14: climb "waits"', ["unknown-config"]],
      ['line 16: climb "too"', ["missing-unit"]],
    ]);
  });

  it("has no pass for a point that waits for another line", () => {
    const xml = junitXml([file('| weight 50\n\n| phase cruise "waits"')], errors, "caution");
    const { testsuite: suites, ...sums } = parsed(xml);
    expect(sums).toMatchObject({ tests: "2", failures: "1", errors: "1" });
    expect(suites[0].testcase[0].error.message).toBe(
      "Not checked: line 10 has to be mended first (missing-unit).",
    );
  });

  it("fails a warning only where that is asked for, and tells it otherwise", () => {
    const files = [file("| phase cruise; bank 25")];
    expect(parsed(junitXml(files, errors, "c"))).toMatchObject({ failures: "0" });
    expect(junitXml(files, errors, "c")).toContain("[bank-over-advice]");
    expect(parsed(junitXml(files, () => true, "c"))).toMatchObject({ failures: "1" });
  });

  it("is well-formed whatever the note says", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 30 }), (text) => {
        const one = file(`| phase cruise "${text}"; bank 35; config ${text}`, text);
        expect(XMLValidator.validate(junitXml([one], errors, text))).toBe(true);
      }),
      { numRuns: 300 },
    );
  });
});
