import { createFolder } from "../plan/createFolder.ts";
import { fileName } from "../plan/fileName.ts";
import type { Folder } from "../plan/folder.ts";
import type { Note } from "../plan/note.ts";
import { compare } from "../report/compare.ts";
import { comparisonText } from "../report/comparisonText.ts";
import type { CompareAnswer, CompareParams } from "./protocol.ts";
import { uriKey } from "./uriKey.ts";
import { flavourOf } from "./workspace.ts";

/** Compares a note with an older text of it, which sees the folder's cards and limits as they were then. */
export function compareWithOlder(
  note: Note,
  folder: Folder,
  { oldText, oldName, others }: CompareParams,
): CompareAnswer {
  const then = createFolder({ today: folder.today });
  const older = new Map(others.map(({ uri, text }) => [uriKey(uri), { uri, text }]));
  older.delete(uriKey(note.uri));
  for (const one of folder.notes) {
    if (one === note || older.has(uriKey(one.uri))) continue;
    then.open(one.uri, one.document.text(), one.flavour);
  }
  for (const { uri, text } of older.values()) if (text !== null) then.open(uri, text, flavourOf(uri));
  const old = { note: then.open(note.uri, oldText, note.flavour), path: oldName };
  const comparison = compare(old, { note, path: fileName(note.uri) });
  return { same: comparison.same, markdown: comparisonText(comparison, "markdown") };
}
