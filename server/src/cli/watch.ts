import { basename } from "node:path";
import { type FSWatcher, watch } from "chokidar";
import { isNoteFile } from "../files/isNoteFile.ts";
import { CONFIGURATION_FILE } from "../plan/configuration.ts";
import type { LoadOptions } from "./load.ts";
import { shortPath } from "./load.ts";
import { UsageError } from "./usageError.ts";

/** Changes that come together are one. */
const TOGETHER_MS = 120;

/** What happened to a file, by the path it is spoken of by. */
export interface Change {
  readonly path: string;
  readonly how: "is new" | "changed" | "is gone";
}

/**
 * Runs the work once, then again whenever a note, a card, limits, a `.gitignore` or the configuration under
 * the paths changes, until it is interrupted. Gives what the last run gave.
 *
 * @param work told what changed; nothing the first time
 */
export async function watching(
  paths: readonly string[],
  options: Pick<LoadOptions, "root">,
  work: (changes: readonly Change[]) => Promise<number>,
): Promise<number> {
  let code = 0;
  let timer: NodeJS.Timeout | null = null;
  /** One run after the other: a change that comes during one is taken up after it. */
  let running: Promise<void> = Promise.resolve();
  const changes = new Map<string, Change["how"]>();
  const watcher = watch([...(paths.length === 0 ? ["."] : paths), options.root], {
    ignoreInitial: true,
    ignorePermissionErrors: true,
    ignored: (path, stats) =>
      /[\\/](\.git|node_modules)([\\/]|$)/.test(path) || (stats?.isFile() === true && !counts(path)),
  });
  try {
    await new Promise<void>((resolve, reject) => {
      const run = () => {
        timer = null;
        const taken = [...changes].map(([path, how]): Change => ({ path, how }));
        changes.clear();
        running = running.then(async () => {
          code = await work(taken);
        });
        running.catch(reject);
      };
      onChange(watcher, (path, how) => {
        // Many programs save by putting a new file in the place of the old one.
        changes.set(path, how === "is new" && changes.get(path) === "is gone" ? "changed" : how);
        timer ??= setTimeout(run, TOGETHER_MS);
      });
      watcher.on("error", (error) => reject(cannotWatch(error)));
      // Only now: what changes while the folders are looked through would else be missed.
      watcher.once("ready", run);
      for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => resolve());
    });
    await running;
    return code;
  } finally {
    if (timer) clearTimeout(timer);
    await watcher.close();
  }
}

function onChange(watcher: FSWatcher, tell: (path: string, how: Change["how"]) => void): void {
  watcher.on("all", (event, path) => {
    if (event === "addDir" || !(counts(path) || event === "unlinkDir")) return;
    tell(
      shortPath(path, process.cwd()),
      event === "add" ? "is new" : event.startsWith("unlink") ? "is gone" : "changed",
    );
  });
}

function counts(path: string): boolean {
  return isNoteFile(path) || [".gitignore", CONFIGURATION_FILE].includes(basename(path));
}

function cannotWatch(error: unknown): UsageError {
  const { code, message } = error as NodeJS.ErrnoException;
  return new UsageError(`The folder cannot be watched (${code ?? message}): check it without --watch.`);
}
