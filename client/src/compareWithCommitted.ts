import { type TextDocument, type Uri, window, workspace } from "vscode";
import type { CompareAnswer, CompareParams, compareRequest } from "../../server/src/lsp/protocol.ts";
import type { CommandContext } from "./commands.ts";
import { type GitChange, type GitRepository, repositoryOf } from "./gitExtension.ts";

const request: typeof compareRequest = "plumbline/compare";

/** Shows beside the note what changed in it, and in the cards and limits it uses, since the last commit. */
export async function compareWithCommitted({ client, comparisons }: CommandContext): Promise<void> {
  const note = noteInFront();
  const repository = await repositoryOf(note.uri);
  const name = workspace.asRelativePath(note.uri, false);
  if (!repository) {
    throw new Error(`${name} lies in no Git repository, so there is no commit to compare it with.`);
  }
  const { commit } = repository.state.HEAD ?? {};
  if (!commit) throw new Error("The repository has no commit yet: commit the note first.");
  const changes = await repository.diffWithHEAD();
  const then = committedAs(note.uri, changes);
  const oldText = await committed(repository, then);
  if (oldText === null) throw new Error(`${name} is not in the last commit: commit it first.`);
  const params: CompareParams = {
    textDocument: { uri: client.code2ProtocolConverter.asUri(note.uri) },
    oldText,
    oldName: `${baseName(note.uri)} at ${commit.slice(0, 7)}`,
    others: await othersAsCommitted([note.uri, then], repository, changes),
  };
  const answer = await client.sendRequest<CompareAnswer>(request, params);
  if (!answer)
    throw new Error(`The server does not know ${name}: see whether its language is plumb or Markdown.`);
  await comparisons.show(note.uri, answer.markdown);
}

function noteInFront(): TextDocument {
  const note = window.activeTextEditor?.document;
  if (!note || !["plumb", "markdown"].includes(note.languageId)) {
    throw new Error("Open the note that is to be compared, and put the cursor in it.");
  }
  if (note.uri.scheme !== "file") {
    throw new Error(
      "Save the note as a file in a Git repository first: what is untitled was never committed.",
    );
  }
  return note;
}

/** Where a file stood in the last commit: somewhere else where it was renamed since. */
function committedAs(uri: Uri, changes: readonly GitChange[]): Uri {
  return changes.find((change) => isSame(change.uri, uri))?.originalUri ?? uri;
}

/** The text of a file in the last commit; null where it is not in it. */
function committed(repository: GitRepository, uri: Uri): Promise<string | null> {
  return repository.show("HEAD", uri.fsPath).catch(() => null);
}

/** The other notes of the folder that are not as they were committed: the cards and limits may be in them. */
async function othersAsCommitted(
  [note, noteThen]: readonly [Uri, Uri],
  repository: GitRepository,
  changes: readonly GitChange[],
): Promise<CompareParams["others"]> {
  const folder = workspace.getWorkspaceFolder(note)?.uri.toString();
  const { workingTreeChanges, untrackedChanges = [] } = repository.state;
  const listed = [...changes, ...workingTreeChanges, ...untrackedChanges];
  const unsaved = workspace.textDocuments.filter((one) => one.isDirty).map((one) => one.uri);
  const uris = [...listed.flatMap((change) => [change.uri, change.originalUri]), ...unsaved];
  const others = new Map(uris.map((uri) => [uri.toString(), uri]));
  for (const own of [note, noteThen]) others.delete(own.toString());
  const inFolder = [...others.values()].filter(
    (uri) =>
      uri.scheme === "file" &&
      isNoteFile(uri) &&
      folder !== undefined &&
      uri.toString().startsWith(`${folder}/`),
  );
  return Promise.all(
    inFolder.map(async (uri) => ({ uri: uri.toString(), text: await committed(repository, uri) })),
  );
}

function isNoteFile(uri: Uri): boolean {
  return /\.(plumb|md|markdown)$/i.test(uri.path);
}

function isSame(a: Uri, b: Uri): boolean {
  return a.toString() === b.toString();
}

function baseName(uri: Uri): string {
  return uri.path.slice(uri.path.lastIndexOf("/") + 1);
}
