import type { Connection } from "vscode-languageserver";
import type { Client } from "./client.ts";
import type { guardWith } from "./guard.ts";

/** Does the work, and shows meanwhile that notes are read where the client can show it. */
export async function readingProgress(
  connection: Connection,
  client: Client,
  { asking }: ReturnType<typeof guardWith>,
  work: () => Promise<void>,
): Promise<void> {
  if (!client.showsProgress) return work();
  // Begun whenever the client is ready for it: the work waits for nobody.
  let done = false;
  let end = () => {
    done = true;
  };
  void asking("progress", async () => {
    const progress = await connection.window.createWorkDoneProgress();
    if (done) return;
    progress.begin("Plumbline: reading the notes of the folder");
    end = () => progress.done();
  });
  try {
    await work();
  } finally {
    end();
  }
}
