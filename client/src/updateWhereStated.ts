import { ConfigurationTarget, workspace } from "vscode";

/** Changes a setting of ours where it stands: in the workspace if it is stated there, else for the user. */
export async function updateWhereStated(name: string, value: unknown): Promise<void> {
  const settings = workspace.getConfiguration("plumbline");
  const inWorkspace = settings.inspect(name)?.workspaceValue !== undefined;
  await settings.update(
    name,
    value,
    inWorkspace ? ConfigurationTarget.Workspace : ConfigurationTarget.Global,
  );
}
