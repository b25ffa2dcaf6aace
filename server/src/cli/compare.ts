import { stat } from "node:fs/promises";
import { dirname, resolve, sep } from "node:path";
import { discover } from "../disk/discover.ts";
import { diskTree } from "../disk/diskTree.ts";
import { notesIn } from "../files/walk.ts";
import { compare as compareRevisions, type Revision } from "../report/compare.ts";
import { comparisonJson } from "../report/comparisonJson.ts";
import { comparisonText } from "../report/comparisonText.ts";
import { findingsJson } from "../report/findingsJson.ts";
import { printable } from "../report/printable.ts";
import { exitCode, type FailOn } from "./check.ts";
import { load } from "./load.ts";
import { emit } from "./output.ts";
import type { Common } from "./run.ts";
import { UsageError } from "./usageError.ts";

export interface CompareOptions extends Common {
  readonly format: "table" | "json" | "markdown";
  readonly failOn: FailOn;
  readonly oldRoot?: string;
  readonly newRoot?: string;
}

/** Where a revision lies, and where its cards and limits are looked for. */
interface Place {
  /** As it was named. */
  readonly named: string;
  readonly file: string;
  readonly root: string;
  /** True where the root was given for this revision alone. */
  readonly own: boolean;
}

/** `plumbline compare`: what changed between two revisions of a note. */
export async function compare(before: string, now: string, options: CompareOptions): Promise<number> {
  if (before === "-" && now === "-") {
    throw new UsageError("Only one of the two revisions can come from standard input.");
  }
  const oldPlace = await placeOf(before, options.oldRoot, options);
  const newPlace = await placeOf(now, options.newRoot, options);
  const old = await revision(oldPlace, newPlace, options);
  const newer = await revision(newPlace, oldPlace, options);
  const comparison = compareRevisions(old, newer);
  const text =
    options.format === "json"
      ? `${JSON.stringify(comparisonJson(comparison), null, 2)}\n`
      : printable(comparisonText(comparison, options.format));
  await emit(text, options);
  return exitCode([{ path: newer.path, findings: findingsJson(newer.note) }], options.failOn);
}

async function placeOf(
  named: string,
  root: string | undefined,
  { root: common, stdinPath }: CompareOptions,
): Promise<Place> {
  const file = resolve(named === "-" ? stdinPath : named);
  const found = named === "-" ? null : await stat(file).catch(() => null);
  if (found?.isDirectory()) {
    throw new UsageError(`${named} is a folder: compare takes two notes, so name the file in it.`);
  }
  return { named, file, root: resolve(root ?? common), own: root !== undefined };
}

/** Reads one revision so that nothing of the other reaches it: both may define the same names. */
async function revision(place: Place, other: Place, options: CompareOptions): Promise<Revision> {
  const under = await discover([place.root], process.cwd());
  if (under.problems.length > 0) throw new UsageError(under.problems.join("\n"));
  const besides = new Set([...(await notesIn(diskTree, dirname(place.file))), ...under.files]);
  const [loaded] = await load([place.named], {
    ...options,
    besides: [...besides].filter((file) => !belongsTo(other, place, file)),
  });
  if (!loaded) throw new UsageError(`There is no note in ${place.named}.`);
  return loaded;
}

/** True for the other revision itself, and for what lies in folders that are the other's alone. */
function belongsTo(other: Place, place: Place, file: string): boolean {
  if (file === place.file) return false;
  const folders = [dirname(other.file), ...(other.own ? [other.root] : [])];
  return (
    file === other.file ||
    folders.some(
      (folder) => isIn(file, folder) && !isIn(place.file, folder) && !(place.own && isIn(place.root, folder)),
    )
  );
}

function isIn(path: string, folder: string): boolean {
  return path === folder || path.startsWith(folder.endsWith(sep) ? folder : folder + sep);
}
