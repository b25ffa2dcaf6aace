import { openDocument } from "../../server/src/notation/openDocument.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";

/** Text to tree and blocks, and how many blocks there are. */
export function parse(text: string): number {
  return openDocument(text, "plumb").blocks.length;
}

/** Text to figures and findings, and how many findings there are: what `check` does to one note. */
export function check(text: string): number {
  const note = createFolder({ today: "2026-03-01" }).open("file:///bench/note.plumb", text, "plumb");
  return note.findings().length;
}
