import type { Connection } from "vscode-languageserver";
import type { FileSource } from "./noteFiles.ts";
import {
  type ListFilesAnswer,
  type ListFilesParams,
  listFilesRequest,
  type ReadFileAnswer,
  type ReadFileParams,
  readFileRequest,
} from "./protocol.ts";

/** The files that a client offers, for what is on no disk that the server can see. Places are URIs. */
export function servedFiles(connection: Connection, isOffered: () => boolean): FileSource {
  const list = (params: ListFilesParams) =>
    // A client that fails to list a folder must not keep the others from being read.
    connection.sendRequest<ListFilesAnswer>(listFilesRequest, params).catch(() => null);
  const read = (params: ReadFileParams) => connection.sendRequest<ReadFileAnswer>(readFileRequest, params);
  return {
    tree: {
      entries: (uri) => list({ uri }),
      holds: async (uri, name) => (await list({ uri }))?.some((entry) => entry.name === name) === true,
      read: (uri, mostBytes) =>
        read({ uri, mostBytes }).catch((error) => ({
          kind: "unreadable",
          why: error instanceof Error ? error.message : String(error),
        })),
      child: (folder, name) => `${folder.replace(/\/$/, "")}/${encodeURIComponent(name)}`,
      parent: parentOf,
    },
    placeOf: (uri) => (isOffered() ? uri : null),
    uriOf: (uri) => uri,
  };
}

function parentOf(uri: string): { readonly folder: string; readonly name: string } | null {
  const [, root = "", path = ""] = /^([\w+.-]+:(?:\/\/[^/]*)?)(.*)$/.exec(uri.replace(/\/$/, "")) ?? [];
  const cut = path.lastIndexOf("/");
  if (cut === -1) return null;
  const name = path.slice(cut + 1);
  return { folder: `${root}${path.slice(0, cut) || "/"}`, name: decoded(name) };
}

function decoded(name: string): string {
  try {
    return decodeURIComponent(name);
  } catch {
    return name;
  }
}
