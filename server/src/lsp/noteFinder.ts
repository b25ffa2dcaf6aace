import { type CancellationToken, LSPErrorCodes, ResponseError } from "vscode-languageserver";
import type { Note } from "../plan/note.ts";
import type { Answering } from "./answers.ts";

/** Finds the note of a request once the folders are read. Null for a text that nobody opened. */
export function noteFinder({ workspace, ready }: Pick<Answering, "workspace" | "ready">) {
  return async (uri: string, token: CancellationToken): Promise<Note | null> => {
    await ready();
    dropCancelled(token);
    return workspace.note(uri);
  };
}

export function dropCancelled(token: CancellationToken): void {
  if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, "Cancelled.");
}
