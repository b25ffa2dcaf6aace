import { caution } from "../plan/caution.ts";
import { findingsJson } from "../report/findingsJson.ts";
import { findingsText, summarize, summaryText } from "../report/findingsText.ts";
import { passedJson } from "../report/passed.ts";
import { type CheckedFile, sarifLog } from "../report/sarif.ts";
import { load } from "./load.ts";
import { emit, painter } from "./output.ts";
import type { Common } from "./run.ts";
import { UsageError } from "./usageError.ts";
import { VERSION } from "./version.ts";

export interface CheckOptions extends Common {
  readonly format: "text" | "json" | "sarif";
  readonly failOn: "error" | "warning" | "never";
  readonly passed: boolean;
}

/** `plumbline check`: every finding of the notes. */
export async function check(paths: readonly string[], options: CheckOptions): Promise<number> {
  if (options.passed && options.format === "text") {
    throw new UsageError("--passed needs --format json or sarif: the text form lists findings alone.");
  }
  const notes = await load(paths, options);
  const files = notes.map(
    ({ path, note }): CheckedFile => ({
      path,
      findings: findingsJson(note),
      ...(options.passed ? { passed: passedJson(note) } : {}),
    }),
  );
  await emit(written(files, options), options);
  if (options.format === "text" && !options.quiet) process.stderr.write(`${summaryText(files)}${caution}\n`);
  return exitCode(files, options.failOn);
}

function written(files: readonly CheckedFile[], options: CheckOptions): string {
  switch (options.format) {
    case "json":
      return `${JSON.stringify({ schema: 1, caution, files, summary: summarize(files) }, null, 2)}\n`;
    case "sarif":
      return `${JSON.stringify(sarifLog(files, VERSION, caution), null, 2)}\n`;
    case "text":
      return findingsText(files, painter(options));
  }
}

/** 1 where the files have a finding at or above `failOn`, else 0. */
export function exitCode(files: readonly CheckedFile[], failOn: CheckOptions["failOn"]): number {
  const { error, warning } = summarize(files);
  switch (failOn) {
    case "never":
      return 0;
    case "warning":
      return error + warning > 0 ? 1 : 0;
    case "error":
      return error > 0 ? 1 : 0;
  }
}
