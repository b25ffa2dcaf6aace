import { existsSync } from "node:fs";
import { Command, CommanderError, InvalidArgumentError, Option } from "commander";
import { nearestWord } from "../notation/spelling.ts";
import { check } from "./check.ts";
import { compare } from "./compare.ts";
import { explain } from "./explain.ts";
import { format } from "./formatNotes.ts";
import { STANDARD_INPUT } from "./load.ts";
import { points } from "./points.ts";
import { tour } from "./tour.ts";
import { UsageError } from "./usageError.ts";
import { VERSION } from "./version.ts";

/** Options that every command over notes has. */
export interface Common {
  readonly root: string;
  readonly stdinPath: string;
  readonly output?: string;
  readonly color: "auto" | "always" | "never";
  readonly quiet?: boolean;
  readonly today: string;
}

/**
 * Runs one command line. Gives the exit code: 0 where nothing at or above `--fail-on` was found, 1
 * where something was, 2 for usage, unreadable input or a crash.
 */
export async function run(argv: readonly string[]): Promise<number> {
  let code = 0;
  const program = new Command("plumbline")
    .description(
      "Checks the stall margins and bank limits of flight notes. A planning aid, not approved data.",
    )
    .version(VERSION)
    .exitOverride()
    .configureOutput({ outputError: (text, write) => write(text.replace(/^error: /, "plumbline: ")) })
    .showHelpAfterError("(plumbline --help lists the commands)");
  const settle = async (result: Promise<number>) => {
    code = await result;
  };

  overNotes(
    program
      .command("check", { isDefault: true })
      .argument("[path...]", "files, folders or globs; - for standard input"),
  )
    .description("show findings (the default command)")
    .addOption(
      new Option("--format <format>", "how they are written")
        .choices(["text", "json", "sarif", "github", "junit"])
        .default("text"),
    )
    .addOption(
      new Option(
        "--fail-on <severity>",
        "what makes the exit code 1 (default: failOn of plumbline.json, else error)",
      ).choices(["error", "warning", "never"]),
    )
    .option("--watch", "check again whenever a note, a card or limits change", false)
    .option("--passed", "list what was checked and held too (json, sarif)", false)
    .action((paths: string[], options, command: Command) => {
      if (!argv.includes("check")) refuseMisspelt(paths, program);
      const given = command.getOptionValueSource("today") === "cli";
      return settle(check(paths, { ...options, day: given ? () => options.today : localDay }));
    });
  overNotes(program.command("points").argument("[path...]", "files, folders or globs; - for standard input"))
    .description("show every point with its computed values")
    .addOption(
      new Option("--format <format>", "how they are written")
        .choices(["table", "json", "csv", "markdown"])
        .default("table"),
    )
    .action((paths: string[], options) => settle(points(paths, options)));
  overNotes(
    program
      .command("compare")
      .argument("<old>", "the revision before: a file, or - for standard input")
      .argument("<new>", "the revision now: a file, or - for standard input"),
  )
    .description("show what changed between two revisions of a note")
    .addHelpText(
      "after",
      `
Differences alone do not change the exit code: it is 0, or 1 where --fail-on finds something in NEW.
The cards and limits of each revision are looked for in the folder that it lies in and under its root.
Neither revision sees the other's note, nor what lies in the other's folders.`,
    )
    .option("--old-root <dir>", "where the cards and limits of OLD are looked for, instead of --root")
    .option("--new-root <dir>", "where the cards and limits of NEW are looked for, instead of --root")
    .addOption(
      new Option("--format <format>", "how it is written")
        .choices(["table", "json", "markdown"])
        .default("table"),
    )
    .addOption(
      new Option("--fail-on <severity>", "the findings of NEW that make the exit code 1")
        .choices(["error", "warning", "never"])
        .default("never"),
    )
    .action((before: string, now: string, options, command: Command) => {
      // Standard input is by far most often an older text of the very note that it is compared with.
      const named = command.getOptionValueSource("stdinPath") === "cli";
      const stdinPath = named ? options.stdinPath : before === "-" ? now : before;
      return settle(compare(before, now, { ...options, stdinPath }));
    });
  overNotes(program.command("format").argument("[path...]", "files, folders or globs; - for standard input"))
    .description("lay out bar lines: blanks only, never a word or a figure")
    .option("--check", "only tell which files would change", false)
    .action((paths: string[], options) => settle(format(paths, options)));
  program
    .command("explain")
    .argument("[code]", "the code of a finding; without it all of them are listed")
    .description("what a finding means, with an example that breaks the rule and one that keeps it")
    .action((finding: string | undefined) => settle(explain(finding)));
  program
    .command("serve")
    .option("--stdio", "speak over standard input and output", true)
    .description("the language server, for any editor")
    .action(() => settle(serve()));
  overNotes(program.command("tour", { hidden: true }).argument("[folder]", "a folder of notes", "demo"))
    .description("show notes with their hints beside the lines")
    .action((folder: string, options) => settle(tour(folder, options)));
  try {
    await program.parseAsync(argv);
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error;
    // Help and version were asked for; everything else commander threw was told by it.
    return error.exitCode === 0 ? 0 : 2;
  }
  return code;
}

/** A command that is misspelt is taken for the path of the default command. */
function refuseMisspelt([path]: readonly string[], program: Command): void {
  if (path === undefined || existsSync(path)) return;
  const nearest = nearestWord(
    path,
    program.commands.map((one) => one.name()).filter((name) => name !== "tour"),
  );
  if (nearest === null || /[./\\*]/.test(path)) return;
  throw new UsageError(
    `There is no command and no file or folder ${path}; did you mean the command ${nearest}?`,
  );
}

function overNotes(command: Command): Command {
  return command
    .option("--root <dir>", "where cards and limits are looked for besides", ".")
    .option(
      "--stdin-path <name>",
      "the file that standard input stands in for; that file itself is then not read",
      STANDARD_INPUT,
    )
    .option("-o, --output <file>", "write there instead of to standard output")
    .addOption(
      new Option("--color <when>", "colours on the terminal")
        .choices(["auto", "always", "never"])
        .default("auto"),
    )
    .option("--quiet", "no summary and no caution on standard error")
    .addOption(
      new Option("--today <date>", "the day the notes are read on")
        .argParser(day)
        .default(localDay(), "today"),
    );
}

function day(text: string): string {
  const time = /^\d{4}-\d{2}-\d{2}$/.test(text) ? Date.parse(`${text}T00:00:00Z`) : Number.NaN;
  // A 30th of February is read as a day of March.
  if (Number.isNaN(time) || new Date(time).toISOString().slice(0, 10) !== text)
    throw new InvalidArgumentError("It is a day such as 2026-03-01.");
  return text;
}

function localDay(): string {
  const now = new Date();
  const two = (value: number) => String(value).padStart(2, "0");
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

async function serve(): Promise<number> {
  // The server is a bundle of its own, so that no other command pays for loading it.
  process.argv.push("--stdio");
  const path = "./main.node.cjs";
  await import(path);
  return new Promise<number>((resolve) => process.once("exit", () => resolve(0)));
}
