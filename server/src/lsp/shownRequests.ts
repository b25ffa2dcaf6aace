import type { Connection } from "vscode-languageserver";
import { fences } from "../report/fences.ts";
import type { Answering } from "./answers.ts";
import type { guardWith } from "./guard.ts";
import { type FencesAnswer, fencesRequest, type NoteParams } from "./protocol.ts";

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
}
