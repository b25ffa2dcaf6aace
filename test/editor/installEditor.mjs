// Installs the browser-hosted editor from the npm registry into a cache folder of its own, once.
// It is built beside and renamed into place, so that an interrupted install leaves no half an editor.
import { execFileSync } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, renameSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { homedir } from "node:os";
import { join } from "node:path";

const VERSION = "4.100.3";
const cache = process.env.PLUMBLINE_CACHE ?? join(homedir(), ".cache", "plumbline");
const home = join(cache, `code-server-${VERSION}`);

/** The script that starts the editor's server. */
export const editorEntry = join(home, "node_modules/code-server/out/node/entry.js");

export function installEditor() {
  if (existsSync(editorEntry)) return;
  mkdirSync(cache, { recursive: true });
  const building = mkdtempSync(`${home}.`);
  // An install that is interrupted takes its part with it where it can.
  process.once("exit", () => rmSync(building, { recursive: true, force: true }));
  const npm = (folder, ...args) =>
    execFileSync("npm", [...args, "--no-audit", "--no-fund", "--loglevel=error"], {
      cwd: folder,
      stdio: ["ignore", "ignore", "inherit"],
    });
  console.log(`Installing the editor for the tests (code-server ${VERSION}) …`);
  writeFileSync(join(building, "package.json"), '{ "private": true }\n');
  npm(building, "install", `code-server@${VERSION}`, "--ignore-scripts");
  npm(building, "rebuild", "argon2", "--ignore-scripts=false");
  const workbench = join(building, "node_modules/code-server/lib/vscode");
  npm(workbench, "install", "--omit=dev", "--ignore-scripts");
  npm(workbench, "rebuild", "@vscode/spdlog", "native-watchdog", "@parcel/watcher", "--ignore-scripts=false");
  symlinkSync("node_modules", join(workbench, "node_modules.asar"));
  npm(join(workbench, "extensions"), "install", "--omit=dev", "--ignore-scripts");
  // Another run may have been quicker; its editor is as good and in use.
  if (existsSync(editorEntry)) return;
  rmSync(home, { recursive: true, force: true });
  renameSync(building, home);
}
