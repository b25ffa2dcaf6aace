import { commonPracticeText } from "../plan/commonPractice.ts";
import { catalogue } from "../plan/findings.ts";

/** Pages that ship beside the server. */
export function pages(): readonly { name: string; text: string }[] {
  const codes = Object.keys(catalogue);
  return [
    ...codes.map((code) => ({ name: `${code}.md`, text: explain(code) ?? "" })),
    { name: "common-practice.plumb", text: commonPracticeText },
  ];
}

/** The text of one finding's page; null where there is no such code. */
export function explain(code: string): string | null {
  return code in catalogue ? code : null;
}
