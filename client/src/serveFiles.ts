import { FileType, Uri, workspace } from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import type {
  ListFilesAnswer,
  ListFilesParams,
  listFilesRequest,
  ReadFileAnswer,
  ReadFileParams,
  readFileRequest,
} from "../../server/src/lsp/protocol.ts";

const listRequest: typeof listFilesRequest = "plumbline/listFiles";
const readRequest: typeof readFileRequest = "plumbline/readFile";

/** What {@link serveFiles} answers, for the initialization options. */
export const servedRequests: readonly string[] = [listRequest, readRequest];

/** Lists and reads files for a server that cannot see them. Which of them are notes, the server decides. */
export function serveFiles(client: BaseLanguageClient): void {
  client.onRequest<ListFilesAnswer, void>(listRequest, ({ uri }: ListFilesParams) => list(Uri.parse(uri)));
  client.onRequest<ReadFileAnswer, void>(readRequest, ({ uri, mostBytes }: ReadFileParams) =>
    read(Uri.parse(uri), mostBytes),
  );
}

async function list(folder: Uri): Promise<ListFilesAnswer> {
  try {
    return (await workspace.fs.readDirectory(folder)).map(([name, type]) => ({
      name,
      kind: type === FileType.Directory ? "folder" : type === FileType.File ? "file" : "other",
    }));
  } catch {
    return null;
  }
}

async function read(file: Uri, mostBytes: number): Promise<ReadFileAnswer> {
  try {
    if (mostBytes < (await workspace.fs.stat(file)).size) return { kind: "too-large" };
    return decode(await workspace.fs.readFile(file));
  } catch (error) {
    return { kind: "unreadable", why: error instanceof Error ? error.message : String(error) };
  }
}

function decode(bytes: Uint8Array): ReadFileAnswer {
  try {
    return { kind: "text", text: new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes) };
  } catch {
    return { kind: "not-utf-8", text: new TextDecoder("utf-8", { ignoreBOM: true }).decode(bytes) };
  }
}
