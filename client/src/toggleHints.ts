import { ConfigurationTarget, window, workspace } from "vscode";
import type { CommandContext } from "./commands.ts";

const LAST_LEVEL = "hints.lastLevel";

/**
 * Turns the hints off, or on again at the level they last had in this workspace. The setting is
 * changed where it stands: in the workspace if it is stated there, else for the user.
 */
export async function toggleHints({ extension }: CommandContext): Promise<void> {
  const settings = workspace.getConfiguration("plumbline");
  const level = settings.get<string>("hints.level", "full");
  const next = level === "off" ? extension.workspaceState.get<string>(LAST_LEVEL, "full") : "off";
  if (level !== "off") await extension.workspaceState.update(LAST_LEVEL, level);
  const inWorkspace = settings.inspect("hints.level")?.workspaceValue !== undefined;
  await settings.update(
    "hints.level",
    next,
    inWorkspace ? ConfigurationTarget.Workspace : ConfigurationTarget.Global,
  );
  window.setStatusBarMessage(
    next === "off" ? "Plumbline: hints are off." : `Plumbline: hints are on (${next}).`,
    4000,
  );
}
