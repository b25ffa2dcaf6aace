import type { BaseLanguageClient } from "vscode-languageclient";

/** A text that the server makes of a note. Throws a sentence where there is none. */
export async function askServer(
  client: BaseLanguageClient,
  request: string,
  params: object,
): Promise<string> {
  let answer: string | null;
  try {
    answer = await client.sendRequest<string | null>(request, params);
  } catch {
    throw new Error("The server does not answer. The command Plumbline: Restart the Server starts it anew.");
  }
  if (answer === null)
    throw new Error("Plumbline reads no notes from this place. Save the note in a folder that is open.");
  return answer;
}
