import assert from "node:assert/strict";
import * as vscode from "vscode";
import { codeOf, eventually, openNote, problems } from "./workbench.ts";

interface Finding {
  readonly code: string;
  readonly severity: string;
  readonly line: number;
  readonly column: number;
  readonly endLine: number;
  readonly endColumn: number;
  readonly message: string;
}

/** What the command line printed; a host in the browser could not start it, so the bundler puts it in. */
declare const CHECKED_DEMO: {
  readonly files: readonly { readonly path: string; readonly findings: Finding[] }[];
};

/** Opens a note of the folder and waits until its problems are, in every respect, what `plumbline check` finds. */
export async function sameAsCommandLine(name: string): Promise<void> {
  const wanted = checked(name);
  const { document } = await openNote(name);
  await eventually(`the problems of ${name}`, () => {
    assert.deepEqual(problems(document.uri).map(asFinding).map(oneLine).sort(), wanted.map(oneLine).sort());
  });
}

function checked(name: string): readonly Finding[] {
  const file = CHECKED_DEMO.files.find(({ path }) => path === name);
  assert.ok(file, `the command line reads ${name}`);
  return file.findings;
}

const severities: Readonly<Record<vscode.DiagnosticSeverity, string>> = {
  [vscode.DiagnosticSeverity.Error]: "error",
  [vscode.DiagnosticSeverity.Warning]: "warning",
  [vscode.DiagnosticSeverity.Information]: "information",
  [vscode.DiagnosticSeverity.Hint]: "hint",
};

function asFinding(problem: vscode.Diagnostic): Finding {
  const { start, end } = problem.range;
  return {
    code: codeOf(problem),
    severity: severities[problem.severity],
    line: start.line + 1,
    column: start.character + 1,
    endLine: end.line + 1,
    endColumn: end.character + 1,
    message: problem.message,
  };
}

const oneLine = ({ line, column, endLine, endColumn, severity, code, message }: Finding) =>
  `${line}:${column}-${endLine}:${endColumn} ${severity} ${code} ${message}`;
