import type { Document } from "../notation/document.ts";
import type { Fold } from "./folding.ts";

/** The closed plumb fences of a note, their own two lines included, in the order of the lines. */
export function plumbFences(document: Document): readonly Fold[] {
  const fences: Fold[] = [];
  let open = -1;
  for (let line = 0; line < document.lineCount; line++) {
    if (document.lineKind(line) !== "plumb-fence") continue;
    if (open < 0) open = line;
    else {
      fences.push({ firstLine: open, lastLine: line });
      open = -1;
    }
  }
  return fences;
}
