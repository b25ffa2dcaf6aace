import {
  type Connection,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  WatchKind,
} from "vscode-languageserver";
import type { Client } from "./client.ts";
import type { guardWith } from "./guard.ts";

/** Registers what the client said it can register later, and nothing else. */
export async function registerWhatIsOffered(
  connection: Connection,
  client: Client,
  guard: ReturnType<typeof guardWith>,
): Promise<void> {
  if (client.watches) {
    await guard.asking("watching files", () =>
      connection.client.register(DidChangeWatchedFilesNotification.type, {
        watchers: [
          { globPattern: "**/*.{plumb,md,markdown}", kind: WatchKind.Change },
          { globPattern: "**/{.gitignore,plumbline.json}", kind: WatchKind.Change },
          // Of a folder that is moved or deleted, clients tell the folder alone, whatever its notes are called.
          { globPattern: "**/*", kind: WatchKind.Create | WatchKind.Delete },
        ],
      }),
    );
  }
  if (client.registersConfiguration) {
    await guard.asking("configuration", () =>
      connection.client.register(DidChangeConfigurationNotification.type, { section: "plumbline" }),
    );
  }
}
