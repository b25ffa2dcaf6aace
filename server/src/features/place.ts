import { fileName } from "../plan/fileName.ts";
import { lineOf, type Origin } from "../plan/origin.ts";
import { plainMarkdown } from "../report/plainMarkdown.ts";

/** Where something is written, for a reader of the note `uri`, as Markdown: "line 4", "cards.plumb, line 4". */
export function place(origin: Origin, uri: string): string {
  const line = `line ${lineOf(origin) + 1}`;
  return origin.uri === uri ? line : `${plainMarkdown(fileName(origin.uri))}, ${line}`;
}
