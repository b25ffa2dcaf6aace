import type { Connection } from "vscode-languageserver";
import { copiedText } from "../features/copiedText.ts";
import { readLine } from "../features/readLine.ts";
import { fences } from "../report/fences.ts";
import type { Answering } from "./answers.ts";
import type { guardWith } from "./guard.ts";
import {
  type CopyWithValuesParams,
  copyWithValuesRequest,
  type FencesAnswer,
  fencesRequest,
  type NoteParams,
  type ReadLineParams,
  readLineRequest,
} from "./protocol.ts";

/** Answers what is asked for beside the protocol, ready to be shown: nothing is left for a client to compute. */
export function answerShownRequests(
  connection: Connection,
  { answering }: ReturnType<typeof guardWith>,
  { workspace, ready }: Pick<Answering, "workspace" | "ready">,
): void {
  connection.onRequest(
    fencesRequest,
    answering("fences", async ({ textDocument: { uri } }: NoteParams): Promise<FencesAnswer> => {
      await ready();
      const open = workspace.openNote(uri);
      return open ? { ...fences(open.note), version: open.version } : null;
    }),
  );

  connection.onRequest(
    readLineRequest,
    answering("the values of a line", async ({ textDocument: { uri }, line }: ReadLineParams) => {
      await ready();
      const note = workspace.note(uri);
      return note && readLine(note, line);
    }),
  );

  connection.onRequest(
    copyWithValuesRequest,
    answering("lines to copy", async ({ textDocument: { uri }, from, to, form }: CopyWithValuesParams) => {
      await ready();
      const note = workspace.note(uri);
      return note && copiedText(note, from, to, form);
    }),
  );
}
