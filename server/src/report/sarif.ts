import type { Log, ReportingDescriptor, Result } from "sarif";
import type { Severity } from "../plan/finding.ts";
import { catalogue, type FindingCode } from "../plan/findings.ts";
import type { FindingJson } from "./findingsJson.ts";

/** What `check` found in one file. */
export interface CheckedFile {
  readonly path: string;
  readonly findings: readonly FindingJson[];
}

const levels: Readonly<Record<Severity, "error" | "warning" | "note" | "none">> = {
  error: "error",
  warning: "warning",
  information: "note",
  hint: "none",
};

/** Findings as SARIF 2.1.0 (OASIS), positions in UTF-16 code units. */
export function sarifLog(files: readonly CheckedFile[], version: string, caution: string): Log {
  const codes = [
    ...new Set(files.flatMap((file) => file.findings.map((one) => one.code))),
  ].sort() as FindingCode[];
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
        results: files.flatMap((file) => file.findings.map((one) => resultOf(file.path, one, codes))),
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
    locations: [
      {
        physicalLocation: {
          artifactLocation: { uri: path.split("/").map(encodeURIComponent).join("/") },
          region: {
            startLine: finding.line,
            startColumn: finding.column,
            endLine: finding.endLine,
            endColumn: finding.endColumn,
          },
        },
      },
    ],
  };
}
