import { extensions, Uri } from "vscode";

/** A file that differs between the working tree and a commit, as the Git extension tells it. */
export interface GitChange {
  readonly uri: Uri;
  readonly originalUri: Uri;
}

/** What is used of a repository of the editor's Git extension (its API, version 1). */
export interface GitRepository {
  readonly rootUri: Uri;
  readonly state: {
    readonly HEAD?: { readonly commit?: string };
    readonly workingTreeChanges: readonly GitChange[];
    readonly untrackedChanges?: readonly GitChange[];
  };
  /** The text of a file in a commit; rejected where it is not in it. */
  show(ref: string, path: string): Promise<string>;
  diffWithHEAD(): Promise<readonly GitChange[]>;
}

interface GitApi {
  readonly state: "uninitialized" | "initialized";
  readonly onDidChangeState: (listener: () => void) => { dispose(): void };
  getRepository(uri: Uri): GitRepository | null;
  openRepository?(root: Uri): Promise<GitRepository | null>;
}

interface GitExtension {
  readonly enabled: boolean;
  getAPI(version: 1): GitApi;
}

/** The repository that holds a file; null where none does. Throws where Git cannot be asked. */
export async function repositoryOf(file: Uri): Promise<GitRepository | null> {
  const git = await gitApi();
  // A repository that lies above the folder of the window, or was made just now, may not be open yet.
  return git.getRepository(file) ?? (await git.openRepository?.(Uri.joinPath(file, ".."))) ?? null;
}

async function gitApi(): Promise<GitApi> {
  const extension = extensions.getExtension<GitExtension>("vscode.git");
  if (!extension) {
    throw new Error(
      "The editor's Git extension is not there or is disabled: enable it to compare with a commit.",
    );
  }
  const exported = await extension.activate();
  if (!exported.enabled) {
    throw new Error("Git is turned off in this editor: set git.enabled, and see that git is installed.");
  }
  const git = exported.getAPI(1);
  if (git.state === "uninitialized") await initialized(git);
  return git;
}

function initialized(git: GitApi): Promise<void> {
  return new Promise((done) => {
    const listening = git.onDidChangeState(() => {
      if (git.state !== "initialized") return;
      listening.dispose();
      done();
    });
  });
}
