import { basename } from "node:path";
import { watch } from "chokidar";
import { isNoteFile } from "../files/isNoteFile.ts";
import { CONFIGURATION_FILE } from "../plan/configuration.ts";
import type { LoadOptions } from "./load.ts";
import { shortPath } from "./load.ts";

/** Changes that come together are one. */
const TOGETHER_MS = 120;

/**
 * Runs the work once, then again whenever a note, a card, limits or a `.gitignore` or the configuration under the paths
 * changes, until it is interrupted. Gives what the last run gave.
 *
 * @param work told which files changed; none the first time
 */
export async function watching(
  paths: readonly string[],
  options: Pick<LoadOptions, "root">,
  work: (changed: readonly string[]) => Promise<number>,
): Promise<number> {
  let code = await work([]);
  const watcher = watch([...(paths.length === 0 ? ["."] : paths), options.root], {
    ignoreInitial: true,
    ignored: (path, stats) =>
      /[\\/](\.git|node_modules)([\\/]|$)/.test(path) || (stats?.isFile() === true && !counts(path)),
  });
  const changed = new Set<string>();
  let timer: NodeJS.Timeout | null = null;
  /** One run after the other: a change that comes during one is taken up after it. */
  let running: Promise<void> = Promise.resolve();
  const again = () => {
    timer = null;
    const files = [...changed].sort();
    changed.clear();
    running = running.then(async () => {
      code = await work(files);
    });
  };
  watcher.on("all", (event, path) => {
    if (event === "addDir" || !(counts(path) || event === "unlinkDir")) return;
    changed.add(shortPath(path, process.cwd()));
    timer ??= setTimeout(again, TOGETHER_MS);
  });
  await new Promise<void>((resolve) => {
    for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => resolve());
  });
  if (timer) clearTimeout(timer);
  await watcher.close();
  await running;
  return code;
}

function counts(path: string): boolean {
  return isNoteFile(path) || [".gitignore", CONFIGURATION_FILE].includes(basename(path));
}
