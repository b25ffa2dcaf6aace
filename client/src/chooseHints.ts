import { window, workspace } from "vscode";
import type { CommandContext } from "./commands.ts";
import { updateWhereStated } from "./updateWhereStated.ts";

const KINDS = "hints.kinds";

/** Lets the user tick the kinds of hints that are shown. A caller may pass the kinds. */
export async function chooseHints({ extension }: CommandContext, named?: unknown): Promise<void> {
  const shown = workspace.getConfiguration("plumbline").get<readonly string[]>(KINDS, []);
  const picked = Array.isArray(named)
    ? named.map(String)
    : await pick(kindsOf(extension.extension.packageJSON), shown);
  if (picked) await updateWhereStated(KINDS, picked);
}

interface Kind {
  readonly label: string;
  readonly description: string;
}

/** The manifest describes the kinds already, for the settings. */
function kindsOf(manifest: {
  contributes: {
    configuration: { properties: Record<string, { items: { enum: string[]; enumDescriptions: string[] } }> };
  };
}): readonly Kind[] {
  const items = manifest.contributes.configuration.properties[`plumbline.${KINDS}`]?.items;
  return (items?.enum ?? []).map((label, i) => ({ label, description: items?.enumDescriptions[i] ?? "" }));
}

async function pick(
  kinds: readonly Kind[],
  shown: readonly string[],
): Promise<readonly string[] | undefined> {
  const items = kinds.map((kind) => ({ ...kind, picked: shown.includes(kind.label) }));
  const picked = await window.showQuickPick(items, {
    title: "Which Hints Are Shown",
    placeHolder: "Tick what is to stand beside the lines; Enter takes it.",
    canPickMany: true,
  });
  return picked?.map(({ label }) => label);
}
