import type { Severity } from "../plan/finding.ts";
import { printable } from "./printable.ts";
import type { CheckedFile } from "./sarif.ts";

const levels: Readonly<Record<Severity, "error" | "warning" | "notice">> = {
  error: "error",
  warning: "warning",
  information: "notice",
  hint: "notice",
};

/** Findings as workflow commands, which a GitHub workflow shows beside the lines they are about. */
export function githubCommands(files: readonly CheckedFile[]): string {
  return files
    .flatMap(({ path, findings }) =>
      findings.map(({ severity, code, message, line, column, endLine, endColumn }) => {
        const properties = { file: path, line, col: column, endLine, endColumn, title: code };
        const written = Object.entries(properties).map(
          ([name, value]) => `${name}=${property(String(value))}`,
        );
        return `::${levels[severity as Severity]} ${written.join(",")}::${data(message)}\n`;
      }),
    )
    .join("");
}

function data(text: string): string {
  return printable(text).replaceAll("%", "%25").replaceAll("\r", "%0D").replaceAll("\n", "%0A");
}

function property(text: string): string {
  return data(text).replaceAll(":", "%3A").replaceAll(",", "%2C");
}
