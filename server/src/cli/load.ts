import { realpath } from "node:fs/promises";
import { relative, resolve, sep } from "node:path";
import { pathToFileURL } from "node:url";
import { discover } from "../disk/discover.ts";
import { diskTree } from "../disk/diskTree.ts";
import { excluded } from "../files/excluded.ts";
import { readNote } from "../files/readNote.ts";
import type { Flavour } from "../notation/document.ts";
import { CONFIGURATION_FILE, type Configuration, noConfiguration } from "../plan/configuration.ts";
import { createFolder } from "../plan/createFolder.ts";
import type { Note } from "../plan/note.ts";
import { configurationOf } from "./configurationOf.ts";
import { progress } from "./progress.ts";
import { UsageError } from "./usageError.ts";

/** What standard input is called where nobody says which file it stands in for. */
export const STANDARD_INPUT = "standard-input.plumb";

/** A note that was asked for, with the path it is spoken of by. */
export interface LoadedNote {
  readonly path: string;
  readonly note: Note;
}

export interface LoadOptions {
  /** Where cards and limits are looked for besides. */
  readonly root: string;
  readonly today: string;
  readonly stdinPath: string;
  /** The files that they are looked for in, instead of those under the root. */
  readonly besides?: readonly string[];
  /** Where the result goes; never over a note that it is made from. */
  readonly output?: string;
  /** Shows no progress. */
  readonly quiet?: boolean;
}

/** Reads the notes of the paths once. */
export function load(paths: readonly string[], options: LoadOptions): Promise<readonly LoadedNote[]> {
  return createLoader(options).load(paths);
}

/** Reads notes again and again; only what changed is read into the folder anew. */
export interface Loader {
  load(paths: readonly string[]): Promise<readonly LoadedNote[]>;
  /** What the root's `plumbline.json` said when the notes were last read. */
  readonly configuration: Configuration;
}

export function createLoader(options: LoadOptions): Loader {
  const folder = createFolder({ today: options.today });
  const held = new Map<string, string>();
  let configuration = noConfiguration;
  return {
    get configuration() {
      return configuration;
    },
    async load(paths) {
      const cwd = process.cwd();
      const named = paths.length === 0 ? ["."] : paths;
      if (named.includes(""))
        throw new UsageError(
          "An empty path names no file and no folder: leave it out for the current folder, or write `.`.",
        );
      configuration = await configurationOf(options.root);
      folder.severities = configuration.severity;
      const { wanted, texts } = await readTexts(named, options, configuration, cwd);
      for (const file of held.keys()) {
        if (texts.has(file)) continue;
        folder.remove(uriOf(file));
        held.delete(file);
      }
      for (const file of [...texts.keys()].sort()) {
        const text = texts.get(file) as string;
        if (held.get(file) === text) continue;
        held.set(file, text);
        folder.open(uriOf(file), text, flavourOf(file));
      }
      await keepFromOverwriting(options.output, cwd, (file) => isNote(folder.note(uriOf(file)), file));
      const loaded = wanted
        .filter((file) => isNote(folder.note(uriOf(file)), file))
        .map((file) => ({ path: shortPath(file, cwd), note: folder.note(uriOf(file)) as Note }));
      if (!options.quiet) await tellOtherConfigurations(named, options.root, cwd);
      if (!named.includes("-")) {
        if (loaded.length === 0)
          throw new UsageError(
            `There is no note in ${named.join(", ")}${configuration.exclude.length > 0 ? `, beside what ${CONFIGURATION_FILE} leaves out` : ""}: a note is a .plumb file, or a Markdown file with a \`plumb\` fence.`,
          );
        return loaded;
      }
      const path = resolve(cwd, options.stdinPath);
      const note = folder.open(uriOf(path), await readStdin(), flavourOf(path));
      if (options.stdinPath === STANDARD_INPUT && !options.quiet) tellStandsFor(note);
      return [...loaded, { path: shortPath(path, cwd), note }];
    },
  };
}

/**
 * The texts of the paths' notes, and of the cards and limits under the root. Every file that cannot be
 * read is told before anything is shown: a plan is never checked in part without saying so.
 */
async function readTexts(
  named: readonly string[],
  options: LoadOptions,
  { exclude }: Configuration,
  cwd: string,
): Promise<{ readonly wanted: readonly string[]; readonly texts: ReadonlyMap<string, string> }> {
  const onDisk = named.filter((path) => path !== "-");
  const leavesOut = excluded(exclude);
  const isLeftOut = (file: string) => leavesOut(shortPath(file, resolve(cwd, options.root)));
  const wanted = await discover(onDisk, cwd, isLeftOut);
  const besides = options.besides
    ? { files: options.besides, problems: [] }
    : await discover([options.root], cwd, isLeftOut);
  const problems = [...wanted.problems, ...besides.problems];
  const texts = new Map<string, string>();
  const files = [...new Set([...wanted.files, ...besides.files])];
  const shown = progress(options, "read");
  let done = 0;
  await Promise.all(
    files.map(async (file) => {
      const read = await readNote(diskTree, file);
      if ("text" in read) texts.set(file, read.text);
      else problems.push(read.problem);
      shown.step(++done, files.length, shortPath(file, cwd));
    }),
  );
  shown.end();
  if (problems.length > 0) throw new UsageError(problems.join("\n"));
  return { wanted: wanted.files, texts };
}

/** The result in the place of a note would be the note's end: nobody wants that, a slip of the hand does it. */
async function keepFromOverwriting(
  output: string | undefined,
  cwd: string,
  isRead: (file: string) => boolean,
): Promise<void> {
  if (output === undefined) return;
  const file = resolve(cwd, output);
  const behind = await realpath(file).catch(() => file);
  if (isRead(file) || isRead(behind))
    throw new UsageError(
      `${output} is a note that is read here, so it is not written over: name another file.`,
    );
}

/** A folder that is checked from outside may have a configuration of its own, which somebody may think holds. */
async function tellOtherConfigurations(named: readonly string[], root: string, cwd: string): Promise<void> {
  for (const path of named) {
    const folder = resolve(cwd, path);
    if (folder === resolve(cwd, root) || !(await diskTree.holds(folder, CONFIGURATION_FILE))) continue;
    process.stderr.write(
      `${shortPath(resolve(folder, CONFIGURATION_FILE), cwd)} does not hold here; with --root ${path} it does.\n`,
    );
  }
}

/** A note that is piped from a file of the folder gives the names of that file a second time. */
function tellStandsFor(note: Note): void {
  if (!note.findings().some(({ finding }) => finding.code === "duplicate-name")) return;
  process.stderr.write(
    "Standard input is read beside the notes of the folder: if it is one of them, say which with --stdin-path FILE, which is then read from standard input alone.\n",
  );
}

/** A Markdown file without a plumb fence is nobody's note; one that is named itself has its say. */
function isNote(note: Note | null, file: string): boolean {
  if (!note) return false;
  if (/\.plumb$/i.test(file)) return true;
  if (note.document.findings.length > 0) return true;
  for (let line = 0; line < note.document.lineCount; line++)
    if (note.document.lineKind(line) === "plumb-fence") return true;
  return false;
}

export function uriOf(path: string): string {
  return pathToFileURL(path).href;
}

export function flavourOf(path: string): Flavour {
  return /\.(md|markdown)$/i.test(path) ? "markdown" : "plumb";
}

export function shortPath(file: string, cwd: string): string {
  return relative(cwd, file).split(sep).join("/") || file;
}

async function readStdin(): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(Buffer.concat(chunks));
  } catch {
    throw new UsageError("Standard input is not UTF-8, so it is not read.");
  }
}
