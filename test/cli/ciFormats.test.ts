import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { XMLParser, XMLValidator } from "fast-xml-parser";
import { afterEach, beforeEach, describe, expect, it } from "vitest";

const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
const setting = `| aircraft wheatear-9; basis vsr; reference 9 t; warning 1.05
| config clean stall 95 kt

| limits own
| must any bank 30
| should any bank 20; must any margin none

| fly wheatear-9; under own; weight 8 t; config clean; altitude FL100; speed 180 kt
`;
const phases = `
| phase cruise "kept, 100 %"

| phase cruise "advised"; bank 25

| phase cruise "broken"; bank 35

| phase cruise "taken"; bank 25; accept bank-over-advice to 28 because "line check" by "R. Fen"
`;

let folder = "";

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-formats-"));
  writeFileSync(join(folder, "a, b: c.plumb"), setting + phases);
});

afterEach(() => rmSync(folder, { recursive: true }));

function check(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [cli, "check", ...args], {
    cwd: folder,
    encoding: "utf8",
  });
  return { status, stdout, stderr };
}

function casesOf(xml: string) {
  expect(XMLValidator.validate(xml)).toBe(true);
  const parser = new XMLParser({
    ignoreAttributes: false,
    attributeNamePrefix: "",
    isArray: (name) => ["testsuite", "testcase", "failure"].includes(name),
  });
  const { testsuites } = parser.parse(xml);
  return testsuites.testsuite[0].testcase as {
    name: string;
    failure?: { type: string; message: string }[];
    "system-out"?: string;
  }[];
}

describe("check --format github", () => {
  it("writes one workflow command a finding and nothing else; what is accepted is a notice with its reason", () => {
    const { status, stdout, stderr } = check("--format", "github");
    expect([status, stderr]).toEqual([1, ""]);
    const lines = stdout.trimEnd().split("\n");
    expect(lines.map((line) => /^::(\w+) file=a%2C b%3A c\.plumb,line=(\d+),/.exec(line)?.slice(1))).toEqual([
      ["warning", "12"],
      ["error", "14"],
      ["notice", "16"],
    ]);
    expect(lines[1]).toMatch(
      /^::error file=.*,line=14,col=26,endLine=14,endColumn=33,title=bank-over-limit::Bank 35° exceeds the 30°/,
    );
    expect(lines[2]).toContain("line check");
  });

  it("writes nothing where nothing is found", () => {
    writeFileSync(join(folder, "a, b: c.plumb"), setting + phases.split("\n\n")[0]);
    expect(check("--format", "github")).toEqual({ status: 0, stdout: "", stderr: "" });
  });
});

describe("check --format junit", () => {
  it("has a case for every point, those that passed too; what is accepted does not fail", () => {
    const { status, stdout } = check("--format", "junit");
    expect(status).toBe(1);
    const cases = casesOf(stdout);
    expect(cases.map(({ name, failure }) => [name, failure?.map(({ type }) => type) ?? []])).toEqual([
      ['line 10: cruise "kept, 100 %"', []],
      ['line 12: cruise "advised"', []],
      ['line 14: cruise "broken"', ["bank-over-limit"]],
      ['line 16: cruise "taken"', []],
    ]);
    expect(cases[1]?.["system-out"]).toContain("[bank-over-advice]");
    expect(cases[3]?.["system-out"]).toContain("line check");
  });

  it("fails warnings with --fail-on warning, as the configuration of the folder may say too", () => {
    const failed = (xml: string) =>
      casesOf(xml)
        .filter(({ failure }) => failure)
        .map(({ name }) => name.slice(0, 7));
    expect(failed(check("--format", "junit", "--fail-on", "warning").stdout)).toEqual(["line 12", "line 14"]);
    writeFileSync(join(folder, "plumbline.json"), '{ "failOn": "warning" }');
    expect(failed(check("--format", "junit").stdout)).toEqual(["line 12", "line 14"]);
    expect(failed(check("--format", "junit", "--fail-on", "error").stdout)).toEqual(["line 14"]);
  });

  it("is written where it is told, as XML whatever the note says", () => {
    writeFileSync(join(folder, "a, b: c.plumb"), `${setting}\n| phase cruise "<&\u0000\u0008]]>"; bank 35\n`);
    expect(check("--format", "junit", "-o", "out.xml")).toMatchObject({ status: 1, stdout: "" });
    const { stdout } = check("--format", "junit");
    expect(casesOf(stdout)[0]?.failure).toBeDefined();
    // XMLValidator lets characters pass that no XML holds.
    expect([...stdout].filter((one) => one < " " && one !== "\n")).toEqual([]);
  });
});
