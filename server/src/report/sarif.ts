import type { Location, Log, Region, ReportingDescriptor, Result } from "sarif";
import type { Severity } from "../plan/finding.ts";
import { catalogue, type FindingCode } from "../plan/findings.ts";
import type { FindingJson } from "./findingsJson.ts";
import type { PassedJson } from "./passed.ts";

/** What `check` found in one file. */
export interface CheckedFile {
  readonly path: string;
  readonly findings: readonly FindingJson[];
  /** What was checked and held, where that is asked for. */
  readonly passed?: readonly PassedJson[];
}

const levels: Readonly<Record<Severity, "error" | "warning" | "note" | "none">> = {
  error: "error",
  warning: "warning",
  information: "note",
  hint: "none",
};

/** Findings as SARIF 2.1.0 (OASIS), positions in UTF-16 code units. */
export function sarifLog(files: readonly CheckedFile[], version: string, caution: string): Log {
  const found = files.flatMap((file) => file.findings.map((one) => one.code as FindingCode));
  const held = files.flatMap((file) => (file.passed ?? []).map(passedCode));
  const codes = [...new Set([...found, ...held])].sort();
  return {
    $schema: "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json",
    version: "2.1.0",
    runs: [
      {
        tool: {
          driver: {
            name: "plumbline",
            semanticVersion: version,
            fullDescription: { text: caution },
            rules: codes.map(descriptor),
          },
        },
        columnKind: "utf16CodeUnits",
        results: files.flatMap((file) => [
          ...file.findings.map((one) => resultOf(file.path, one, codes)),
          ...(file.passed ?? []).map((one) => passResult(file.path, one, codes)),
        ]),
      },
    ],
  };
}

function descriptor(code: FindingCode): ReportingDescriptor {
  const { title, explanation, severity } = catalogue[code];
  return {
    id: code,
    shortDescription: { text: title },
    fullDescription: { text: explanation },
    defaultConfiguration: { level: levels[severity] },
  };
}

function resultOf(path: string, finding: FindingJson, codes: readonly FindingCode[]): Result {
  return {
    ruleId: finding.code,
    ruleIndex: codes.indexOf(finding.code as FindingCode),
    level: levels[finding.severity as Severity],
    message: { text: finding.message },
    ...suppressed(finding),
    locations: [
      location(path, {
        startLine: finding.line,
        startColumn: finding.column,
        endLine: finding.endLine,
        endColumn: finding.endColumn,
      }),
    ],
  };
}

/** What a note accepts is suppressed in its source, with the reason that the note gives. */
function suppressed({ accepted }: FindingJson): Pick<Result, "suppressions"> {
  if (!accepted) return {};
  const { because, by, to, until } = accepted;
  const justification = [
    because,
    by ? `by ${by}` : "",
    to ? `to ${to}` : "",
    until ? `until ${until}` : "",
  ].filter(Boolean);
  return {
    suppressions: [{ kind: "inSource", status: "accepted", justification: justification.join("; ") }],
  };
}

/** The finding that a row or check would have given. */
function passedCode({ code }: PassedJson): FindingCode {
  return code;
}

function passResult(path: string, passed: PassedJson, codes: readonly FindingCode[]): Result {
  const { phase, title, rule, at, line, endLine } = passed;
  const point = `${phase ?? "point"}${title ? ` "${title}"` : ""}${at === null ? "" : ` at ${at}`}`;
  return {
    ruleId: passedCode(passed),
    ruleIndex: codes.indexOf(passedCode(passed)),
    kind: "pass",
    level: "none",
    message: { text: `${point} keeps ${rule}.` },
    locations: [location(path, { startLine: line, endLine })],
  };
}

function location(path: string, region: Region): Location {
  return {
    physicalLocation: {
      artifactLocation: { uri: path.split("/").map(encodeURIComponent).join("/") },
      region,
    },
  };
}
