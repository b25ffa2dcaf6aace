import { caution } from "../plan/caution.ts";
import { findingsJson } from "../report/findingsJson.ts";
import { findingsText, soughtText, summarize, summaryText } from "../report/findingsText.ts";
import { githubCommands } from "../report/github.ts";
import { junitPoints, junitXml } from "../report/junit.ts";
import { passedJson } from "../report/passed.ts";
import { printable } from "../report/printable.ts";
import { type CheckedFile, sarifLog } from "../report/sarif.ts";
import { createLoader, type LoadedNote, type Loader } from "./load.ts";
import { emit, painter } from "./output.ts";
import { progress } from "./progress.ts";
import type { Common } from "./run.ts";
import { UsageError } from "./usageError.ts";
import { VERSION } from "./version.ts";
import { type Change, watching } from "./watch.ts";

export type FailOn = "error" | "warning" | "never";

export interface CheckOptions extends Common {
  readonly format: "text" | "json" | "sarif" | "github" | "junit";
  /** As it was given; else what the configuration says, and an error where it says nothing. */
  readonly failOn?: FailOn;
  readonly passed: boolean;
  readonly watch: boolean;
  /** The day the notes are read on, asked again at each run. */
  day(): string;
}

/** `plumbline check`: every finding of the notes, once or again and again. */
export async function check(paths: readonly string[], options: CheckOptions): Promise<number> {
  refuseWhatDoesNotGoTogether(paths, options);
  let today = options.day();
  let loader = createLoader({ ...options, today });
  const once = async () => checkOnce(await loader.load(paths), failOnOf(options, loader), options);
  if (!options.watch) return once();
  return watching(paths, options, async (changes) => {
    await emit(headline(changes), options);
    if (options.day() !== today) {
      // Past midnight other dates hold, so everything is read anew.
      today = options.day();
      loader = createLoader({ ...options, today });
    }
    try {
      return await once();
    } catch (error) {
      // What cannot be read now may be readable again after the next change.
      if (!(error instanceof UsageError)) throw error;
      process.stderr.write(`plumbline: ${error.message}\n`);
      return 2;
    }
  });
}

function refuseWhatDoesNotGoTogether(paths: readonly string[], options: CheckOptions): void {
  if (options.passed && options.format !== "json" && options.format !== "sarif") {
    throw new UsageError("--passed needs --format json or sarif: the other forms list findings alone.");
  }
  if (!options.watch) return;
  if (options.format !== "text" || options.output !== undefined)
    throw new UsageError("--watch writes text to standard output: leave out --format and -o.");
  if (paths.includes("-"))
    throw new UsageError("--watch needs files or folders: standard input is read once.");
}

/** So many changes are named in one line. */
const NAMED = 3;

/** Sets a run apart from the one before, in the output itself, so that a log that is kept has it too. */
function headline(changes: readonly Change[]): string {
  const time = new Date().toTimeString().slice(0, 8);
  const named = changes.slice(0, NAMED).map(({ path, how }) => `${path} ${how}`);
  const more = changes.length > NAMED ? ` and ${changes.length - NAMED} more` : "";
  return printable(
    `\n${time}  ${changes.length === 0 ? "watching; Ctrl+C ends it" : named.join(", ") + more}\n`,
  );
}

function failOnOf({ failOn }: CheckOptions, { configuration }: Loader): FailOn {
  return failOn ?? configuration.failOn ?? "error";
}

async function checkOnce(
  notes: readonly LoadedNote[],
  failOn: FailOn,
  options: CheckOptions,
): Promise<number> {
  const shown = progress(options, "checked");
  const files = notes.map(({ path, note }, i): CheckedFile => {
    shown.step(i, notes.length, path);
    return {
      path,
      findings: findingsJson(note),
      ...(options.passed ? { passed: passedJson(note) } : {}),
    };
  });
  shown.end();
  await emit(written(files, notes, failOn, options), options);
  if (options.format === "text" && !options.quiet)
    process.stderr.write(`${summaryText(files)}${soughtText(soughtIn(notes))}${caution}\n`);
  return exitCode(files, failOn);
}

/** How many points ask for a value and have one. */
function soughtIn(notes: readonly LoadedNote[]): number {
  const results = notes.flatMap(({ note }) => note.results());
  return results.filter((one) => {
    if (one.kind !== "point") return false;
    const { solved, sweep } = one.point;
    return sweep ? sweep.rows.some(({ point }) => point.solved?.best) : solved?.best;
  }).length;
}

function written(
  files: readonly CheckedFile[],
  notes: readonly LoadedNote[],
  failOn: FailOn,
  options: CheckOptions,
): string {
  switch (options.format) {
    case "json":
      return `${JSON.stringify({ schema: 1, caution, files, summary: summarize(files) }, null, 2)}\n`;
    case "sarif":
      return `${JSON.stringify(sarifLog(files, VERSION, caution), null, 2)}\n`;
    case "github":
      return githubCommands(files);
    case "junit":
      return junitXml(
        files.map((file, i) => ({ ...file, points: junitPoints((notes[i] as LoadedNote).note) })),
        ({ severity }) => severity === "error" || (severity === "warning" && failOn === "warning"),
        caution,
      );
    case "text":
      return findingsText(files, painter(options));
  }
}

/** 1 where the files have a finding at or above `failOn`, else 0. */
export function exitCode(files: readonly CheckedFile[], failOn: FailOn): number {
  const { error, warning } = summarize(files);
  switch (failOn) {
    case "never":
      return 0;
    case "warning":
      return error + warning > 0 ? 1 : 0;
    case "error":
      return error > 0 ? 1 : 0;
  }
}
