// Runs the same suite in a desktop build of the editor: VSCODE_EXECUTABLE names it. Nothing is downloaded.
import { cpSync, mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { runTests } from "@vscode/test-electron";
import { bundleSuite } from "./bundleSuite.mjs";

const executable = process.env.VSCODE_EXECUTABLE;
if (!executable) {
  console.error(
    "No build of the editor is named: set VSCODE_EXECUTABLE to one. The browser-hosted suite needs none: npm run test:editor.",
  );
  process.exit(1);
}
await bundleSuite("out/editor/suite.cjs");
const folder = join(mkdtempSync(join(tmpdir(), "plumbline-desktop-")), "demo");
cpSync("demo", folder, { recursive: true });
process.exitCode = await runTests({
  vscodeExecutablePath: executable,
  extensionDevelopmentPath: resolve("."),
  extensionTestsPath: resolve("out/editor/suite.cjs"),
  extensionTestsEnv: { PLUMBLINE_REPOSITORY: resolve(".") },
  launchArgs: [folder, "--disable-extensions", "--disable-workspace-trust"],
});
