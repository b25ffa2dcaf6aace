import type { Severity } from "../plan/finding.ts";
import { printable } from "./printable.ts";
import type { CheckedFile } from "./sarif.ts";

/** How many findings there are of each severity. */
export type Summary = Readonly<Record<Severity, number>>;

export function summarize(files: readonly CheckedFile[]): Summary {
  const summary = { error: 0, warning: 0, information: 0, hint: 0 };
  for (const { findings } of files) for (const { severity } of findings) summary[severity as Severity]++;
  return summary;
}

/** What a severity looks like on a terminal. */
export type Paint = (severity: Severity, text: string) => string;

/** Findings for a reader: the place, the severity in words, the sentence, the code. */
export function findingsText(files: readonly CheckedFile[], paint: Paint): string {
  let text = "";
  for (const { path, findings } of files) {
    for (const one of findings) {
      const severity = one.severity as Severity;
      text += `${printable(path)}:${one.line}:${one.column}  ${paint(severity, severity)}  ${printable(one.message)}  [${one.code}]\n`;
    }
  }
  return text;
}

/** "3 errors, 1 warning in 4 notes." */
export function summaryText(files: readonly CheckedFile[]): string {
  const summary = summarize(files);
  const parts = (["error", "warning", "information", "hint"] as const)
    .filter((severity) => summary[severity] > 0)
    .map((severity) =>
      counted(summary[severity], severity === "information" ? "piece of information" : severity),
    );
  const taken = files.flatMap(({ findings }) => findings).filter((one) => one.accepted !== null).length;
  if (taken > 0) parts.push(`${taken} accepted`);
  const where = counted(files.length, "note");
  return parts.length === 0 ? `Nothing found in ${where}.\n` : `${parts.join(", ")} in ${where}.\n`;
}

/** Where values are sought, that `check` held them and where they stand. */
export function soughtText(sought: number): string {
  if (sought === 0) return "";
  return sought === 1
    ? "1 value was sought (`?`): `plumbline points` shows what was found and what bounds it.\n"
    : `${sought} values were sought (\`?\`): \`plumbline points\` shows what was found and what bounds them.\n`;
}

function counted(count: number, noun: string): string {
  if (count === 1) return `1 ${noun}`;
  return `${count} ${noun.startsWith("piece") ? noun.replace("piece", "pieces") : `${noun}s`}`;
}
