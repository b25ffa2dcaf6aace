import { realpath, rename, stat, writeFile } from "node:fs/promises";
import { resolve } from "node:path";
import type { Document } from "../notation/document.ts";
import { layout } from "../notation/layout.ts";
import { printable } from "../report/printable.ts";
import { load } from "./load.ts";
import { emit } from "./output.ts";
import type { Common } from "./run.ts";
import { UsageError } from "./usageError.ts";

export interface FormatOptions extends Common {
  readonly check: boolean;
}

/** `plumbline format`: lays out the bar lines of the files in place, or only tells which would change. */
export async function format(paths: readonly string[], options: FormatOptions): Promise<number> {
  if (options.output !== undefined && (options.check || paths.length !== 1 || paths[0] !== "-")) {
    throw new UsageError(
      "-o is for what is laid out from standard input alone: files are laid out in place.",
    );
  }
  // A note that comes from standard input may well go back to its own place.
  const { output: _, ...reading } = options;
  const notes = await load(paths, reading);
  let changed = 0;
  for (const { path, note } of notes) {
    const edits = layout(note.document);
    const fromInput = paths.includes("-") && resolve(path) === resolve(options.stdinPath);
    if (fromInput && !options.check) {
      await emit(applied(note.document, edits), options);
      continue;
    }
    if (edits.length === 0) continue;
    changed++;
    if (options.check) await emit(edits.map((edit) => wouldBe(path, edit)).join(""), {});
    else await replaceFile(path, applied(note.document, edits));
  }
  if (!options.quiet && !paths.includes("-")) {
    const files = `${changed} of ${notes.length} ${notes.length === 1 ? "file" : "files"}`;
    process.stderr.write(options.check ? `${files} would change.\n` : `${files} changed.\n`);
  }
  return options.check && changed > 0 ? 1 : 0;
}

/** A line that would change, with its place and what it would be. */
function wouldBe(
  path: string,
  { line, newText }: { readonly line: number; readonly newText: string },
): string {
  return printable(`${path}:${line + 1}  ${newText}\n`);
}

function applied(document: Document, edits: ReturnType<typeof layout>): string {
  for (const { line, newText } of edits) {
    document.edit({ line, character: 0 }, { line, character: document.lineText(line).length }, newText);
  }
  return document.text();
}

/**
 * Written beside the file and moved over it, so that a stop in between loses nothing. What a link points
 * to is replaced, never the link: it would become a second note that nobody knows of.
 */
async function replaceFile(path: string, text: string): Promise<void> {
  const file = await realpath(path);
  const { mode } = await stat(file);
  const beside = `${file}.plumbline-${process.pid}`;
  await writeFile(beside, text, { mode });
  await rename(beside, file);
}
