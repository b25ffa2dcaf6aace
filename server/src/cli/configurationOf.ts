import { join, relative, resolve } from "node:path";
import { diskTree } from "../disk/diskTree.ts";
import { readNote } from "../files/readNote.ts";
import {
  CONFIGURATION_FILE,
  type Configuration,
  noConfiguration,
  readConfiguration,
} from "../plan/configuration.ts";
import { UsageError } from "./usageError.ts";

/** What the `plumbline.json` in the root says; with a mistake in it nothing is checked, for it may hide a finding. */
export async function configurationOf(root: string): Promise<Configuration> {
  const file = join(resolve(root), CONFIGURATION_FILE);
  if (!(await diskTree.holds(resolve(root), CONFIGURATION_FILE))) return noConfiguration;
  const shown = relative(process.cwd(), file) || file;
  const read = await readNote(diskTree, file);
  if ("problem" in read) throw new UsageError(read.problem);
  const { configuration, problems } = readConfiguration(read.text);
  if (problems.length === 0) return configuration;
  const lines = problems.map(({ message, start }) => {
    const before = read.text.slice(0, start).split("\n");
    return `${shown}:${before.length}:${(before[before.length - 1] ?? "").length + 1}  ${message}`;
  });
  throw new UsageError(lines.join("\n"));
}
