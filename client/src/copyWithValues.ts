import { env, type QuickPickItem, type Selection, window } from "vscode";
import type { CopyWithValuesParams, copyWithValuesRequest } from "../../server/src/lsp/protocol.ts";
import { askServer } from "./askServer.ts";
import type { CommandContext } from "./commands.ts";
import { noteInEditor } from "./noteInEditor.ts";

const request: typeof copyWithValuesRequest = "plumbline/copyWithValues";

type Form = CopyWithValuesParams["form"];

const forms: readonly (QuickPickItem & { readonly form: Form })[] = [
  { form: "text", label: "Plain Text", description: "the lines with their values between the words" },
  { form: "markdown", label: "Markdown", description: "a table of lines and values" },
  { form: "html", label: "HTML", description: "the same table, as source" },
];

/** Copies the selected lines, or the cursor's, with values, findings and caution. A caller may name the form. */
export async function copyWithValues({ client }: CommandContext, named?: unknown): Promise<void> {
  const { document, selection } = noteInEditor();
  const form = forms.find((one) => one.form === named)?.form ?? (await pickForm());
  if (form === undefined) return;
  const { from, to } = linesOf(selection);
  const params: CopyWithValuesParams = { textDocument: { uri: document.uri.toString() }, from, to, form };
  await env.clipboard.writeText(await askServer(client, request, params));
  const count = to - from + 1;
  window.setStatusBarMessage(
    `Plumbline: ${count === 1 ? "the line is" : `${count} lines are`} copied with ${count === 1 ? "its" : "their"} values.`,
    4000,
  );
}

async function pickForm(): Promise<Form | undefined> {
  const picked = await window.showQuickPick(forms, {
    title: "Copy with Values as",
    matchOnDescription: true,
  });
  return picked?.form;
}

/** A selection that ends before the first character of a line takes nothing of that line. */
function linesOf({ start, end }: Selection): { readonly from: number; readonly to: number } {
  return { from: start.line, to: start.line < end.line && end.character === 0 ? end.line - 1 : end.line };
}
