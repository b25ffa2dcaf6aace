import { caution } from "../plan/caution.ts";
import { commonPracticeText } from "../plan/commonPractice.ts";
import { catalogue, type FindingCode } from "../plan/findings.ts";

/** A file that ships beside the server, so that a link in the editor opens it offline. */
export interface Page {
  readonly name: string;
  readonly text: string;
}

/** A page for each finding, and the built-in limits as a note. */
export function pages(): readonly Page[] {
  const codes = Object.keys(catalogue) as FindingCode[];
  return [
    ...codes.map((code) => ({ name: `${code}.md`, text: pageOf(code) })),
    { name: "common-practice.plumb", text: commonPracticeText },
  ];
}

/** The page of a finding, as the command line prints it; null where there is no such code. */
export function explain(code: string): string | null {
  return Object.hasOwn(catalogue, code) ? pageOf(code as FindingCode) : null;
}

function pageOf(code: FindingCode): string {
  const { title, severity, explanation, breaks, keeps } = catalogue[code];
  return `# ${code}: ${title}

Usually ${severity === "error" || severity === "information" ? "an" : "a"} ${severity}${severity === "information" ? " (no fault)" : ""}.

${explanation}

## This gives it

${fenced(breaks)}
## This does not

${fenced(keeps)}
${caution}
`;
}

/** A note in a fence of its own. One that holds a fence gets longer marks. */
function fenced(note: string): string {
  const marks = note.includes("```") ? "~~~~" : "```";
  return `${marks}plumb\n${note.trimEnd()}\n${marks}\n`;
}
