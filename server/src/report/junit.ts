import type { Note } from "../plan/note.ts";
import { lineOf } from "../plan/origin.ts";
import type { FindingJson } from "./findingsJson.ts";

/** A file with its points, each a case that passed or failed. */
export interface JunitFile {
  readonly path: string;
  readonly findings: readonly FindingJson[];
  readonly points: readonly JunitPoint[];
}

export interface JunitPoint {
  readonly line: number;
  readonly endLine: number;
  readonly phase: string | null;
  readonly title: string | null;
  /** Why it was not checked: the line and the code that keep it from having figures. */
  readonly withheld: { readonly line: number; readonly code: string } | null;
}

/** The points of a note as cases. */
export function junitPoints(note: Note): readonly JunitPoint[] {
  return note.results().flatMap((result): readonly JunitPoint[] => {
    if (result.kind !== "point") return [];
    const { block, phase, title, withheld } = result.point;
    return [
      {
        line: block.start + 1,
        endLine: block.start + block.lines.length,
        phase,
        title,
        withheld: withheld && { line: lineOf(withheld.origin) + 1, code: withheld.code },
      },
    ];
  });
}

interface Case {
  readonly name: string;
  readonly findings: readonly FindingJson[];
  readonly withheld: JunitPoint["withheld"];
}

/**
 * Findings as JUnit XML: a suite for each file, a case for each point and one for everything else that has
 * findings. A point that has no figures is an error, never a pass.
 *
 * @param fails whether a finding makes its case fail
 */
export function junitXml(
  files: readonly JunitFile[],
  fails: (finding: FindingJson) => boolean,
  caution: string,
): string {
  const suites = files.map((file) => suite(file, fails));
  const sum = (key: "tests" | "failures" | "errors") => suites.reduce((total, one) => total + one[key], 0);
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<!-- ${caution.replaceAll("--", "- -")} -->`,
    `<testsuites name="plumbline" tests="${sum("tests")}" failures="${sum("failures")}" errors="${sum("errors")}">`,
    ...suites.map(({ text }) => text),
    "</testsuites>\n",
  ].join("\n");
}

function suite({ path, findings, points }: JunitFile, fails: (finding: FindingJson) => boolean) {
  const own = points.map(
    (point): Case => ({
      name: `line ${point.line}: ${point.phase ?? "point"}${point.title ? ` "${point.title}"` : ""}`,
      findings: findings.filter(({ line }) => point.line <= line && line <= point.endLine),
      withheld: point.withheld,
    }),
  );
  const rest = findings.filter(({ line }) => !points.some((one) => one.line <= line && line <= one.endLine));
  const cases =
    rest.length > 0 ? [...own, { name: "cards, limits and settings", findings: rest, withheld: null }] : own;
  const written = cases.map((one) => testcase(path, one, fails));
  const count = (what: "failed" | "errored") => written.filter((one) => one[what]).length;
  const [tests, failures, errors] = [cases.length, count("failed"), count("errored")];
  const head = `  <testsuite name="${xml(path)}" tests="${tests}" failures="${failures}" errors="${errors}">`;
  return {
    tests,
    failures,
    errors,
    text: [head, ...written.map(({ text }) => text), "  </testsuite>"].join("\n"),
  };
}

function testcase(
  path: string,
  { name, findings, withheld }: Case,
  fails: (finding: FindingJson) => boolean,
) {
  const failing = findings.filter(fails);
  const others = findings.filter((one) => !fails(one));
  const errored = failing.length === 0 && withheld !== null;
  const inside = [
    ...failing.map(
      (one) =>
        `      <failure type="${xml(one.code)}" message="${xml(one.message)}">${xml(place(path, one))}</failure>`,
    ),
    ...(errored && withheld
      ? [
          `      <error type="${xml(withheld.code)}" message="${xml(`Not checked: line ${withheld.line} has to be mended first (${withheld.code}).`)}"/>`,
        ]
      : []),
    ...(others.length > 0
      ? [
          `      <system-out>${xml(others.map((one) => `${place(path, one)} ${one.severity}: ${one.message} [${one.code}]`).join("\n"))}</system-out>`,
        ]
      : []),
  ];
  const head = `    <testcase classname="${xml(path)}" name="${xml(name)}"`;
  const text = inside.length === 0 ? `${head}/>` : [`${head}>`, ...inside, "    </testcase>"].join("\n");
  return { failed: failing.length > 0, errored, text };
}

function place(path: string, { line, column }: FindingJson): string {
  return `${path}:${line}:${column}`;
}

/** Escaped, without the characters that XML 1.0 cannot hold. */
function xml(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, "")
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll('"', "&quot;");
}
