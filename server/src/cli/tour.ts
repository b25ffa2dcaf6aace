import { inlayHints } from "../features/inlayHints.ts";
import { withHints } from "../features/valuedLines.ts";
import { caution } from "../plan/caution.ts";
import { findingsJson } from "../report/findingsJson.ts";
import { findingsText, summaryText } from "../report/findingsText.ts";
import { printable } from "../report/printable.ts";
import { load } from "./load.ts";
import { emit, painter } from "./output.ts";
import type { Common } from "./run.ts";

/** The notes with their hints beside the lines, as an editor shows them; then the findings, and what to do next. */
export async function tour(folder: string, options: Common): Promise<number> {
  const notes = await load([folder], { ...options, root: folder });
  const paint = painter(options);
  const dim = (text: string) => paint("hint", text);
  let text = "";
  for (const { path, note } of notes) {
    const { document } = note;
    text += `\n${printable(path)}\n${"-".repeat(path.length)}\n`;
    const hints = inlayHints(note, 0, document.lineCount - 1, "full");
    for (let line = 0; line < document.lineCount; line++) {
      const own = hints.filter((one) => one.line === line);
      const shown = withHints(printable(document.lineText(line)), own, dim);
      text += `${String(line + 1).padStart(4)}  ${shown}\n`;
    }
  }
  const files = notes.map(({ path, note }) => ({ path, findings: findingsJson(note) }));
  text += `\nWhat the notes above are told\n-----------------------------\n${findingsText(files, paint)}${summaryText(files)}`;
  text += `\n${next}\n${caution}\n`;
  await emit(text, options);
  return 0;
}

const next = `What to do next
---------------
  See it in the editor    npm run package, then install dist/plumbline.vsix in VS Code and open the folder demo
  Check your own notes    node dist/server/cli.cjs check FOLDER
  Every computed value    node dist/server/cli.cjs points demo
  What a finding means    node dist/server/cli.cjs explain bank-over-limit`;
