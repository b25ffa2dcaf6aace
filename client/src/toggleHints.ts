import { window, workspace } from "vscode";
import type { CommandContext } from "./commands.ts";
import { updateWhereStated } from "./updateWhereStated.ts";

const LEVEL = "hints.level";
const LAST_LEVEL = "hints.lastLevel";

/** Turns the hints off, or on again at the level they last had in this workspace. */
export async function toggleHints({ extension }: CommandContext): Promise<void> {
  const level = workspace.getConfiguration("plumbline").get<string>(LEVEL, "full");
  const next = level === "off" ? extension.workspaceState.get<string>(LAST_LEVEL, "full") : "off";
  if (level !== "off") await extension.workspaceState.update(LAST_LEVEL, level);
  await updateWhereStated(LEVEL, next);
  window.setStatusBarMessage(
    next === "off" ? "Plumbline: hints are off." : `Plumbline: hints are on (${next}).`,
    4000,
  );
}
