import { type Connection, LSPErrorCodes, ResponseError } from "vscode-languageserver";
import { highlights, references } from "../features/references.ts";
import { prepareRename, type Refusal, rename } from "../features/rename.ts";
import { workspaceSymbols } from "../features/workspaceSymbols.ts";
import type { Note } from "../plan/note.ts";
import type { Answering } from "./answers.ts";
import { highlightOf, placeOf, rangeOf, renamingOf, workspaceSymbolOf } from "./convert.ts";
import type { guardWith } from "./guard.ts";
import { dropCancelled, noteFinder } from "./noteFinder.ts";

/** Answers what is asked about the names of cards, limits, configurations and contaminants. */
export function answerNameRequests(
  connection: Connection,
  { answering }: ReturnType<typeof guardWith>,
  { workspace, pageUri, client, ready }: Answering,
): void {
  const noteOf = noteFinder({ workspace, ready });
  /** The notes that see the same names: those of the folder, open or not. */
  const around = (note: Note) => workspace.folderOf(note.uri)?.notes ?? [note];

  connection.onReferences(
    answering("references", async ({ textDocument: { uri }, position, context }, token) => {
      const note = await noteOf(uri, token);
      if (!note) return [];
      const { line, character } = position;
      const uses = references(note, around(note), line, character, context.includeDeclaration);
      return uses.flatMap((use) => placeOf(use, pageUri) ?? []);
    }),
  );

  connection.onDocumentHighlight(
    answering("document highlight", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      return note ? highlights(note, position.line, position.character).map(highlightOf) : [];
    }),
  );

  connection.onWorkspaceSymbol(
    answering("workspace symbol", async ({ query }, token) => {
      await ready();
      dropCancelled(token);
      return workspaceSymbols(workspace.notes, query).map(workspaceSymbolOf);
    }),
  );

  connection.onPrepareRename(
    answering("prepare rename", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      if (!note) return null;
      const { line, span, name } = allowed(prepareRename(note, position.line, position.character));
      return { range: rangeOf(line, span), placeholder: name };
    }),
  );

  connection.onRenameRequest(
    answering("rename", async ({ textDocument: { uri }, position, newName }, token) => {
      const note = await noteOf(uri, token);
      if (!note) return null;
      const renaming = allowed(rename(note, around(note), position.line, position.character, newName));
      const versionOf = (of: string) => workspace.openNote(of)?.version ?? null;
      return renamingOf(renaming, client().versionsEdits ? versionOf : null);
    }),
  );
}

/** A refusal becomes the answer of the request, whose message editors show. */
function allowed<T extends object>(answer: T | Refusal): T {
  if ("refusal" in answer) throw new ResponseError(LSPErrorCodes.RequestFailed, answer.refusal);
  return answer;
}
