// Runs the extension in the real editor: the workbench of code-server with its Node extension host, in
// headless Chromium. Screenshots go to out/pictures; `--readme` copies those that the README shows.
// `--web` runs it in the browser's own extension host instead: from a copy that has no other entry.
// `--vsix` installs dist/plumbline.vsix as a user does, and runs a part of the suite against that.
import { execFileSync, spawn } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { chromium } from "playwright-core";
import { bundleSuite, bundleWebSuite } from "./bundleSuite.mjs";
import { editorEntry, installEditor } from "./installEditor.mjs";
import { servePage } from "./page.mjs";

const LONGEST = 8 * 60_000;
const web = process.argv.includes("--web");
const vsix = process.argv.includes("--vsix");
const kind = web ? "web" : vsix ? "installed" : "";
const pictures = resolve(kind ? `out/${kind}Pictures` : "out/pictures");
const counts = resolve(kind ? `out/editor/${kind}Counts.json` : "out/editor/counts.json");
const inReadme = [
  ...["screenshot-light", "screenshot-dark", "screenshot-contrast", "hover"],
  ...["exercise", "preview-light"],
];

function freePort() {
  return new Promise((done) => {
    const server = createServer();
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address();
      server.close(() => done(port));
    });
  });
}

async function answers(port, server) {
  for (let i = 0; i < 200; i++) {
    if (server.exitCode !== null) throw new Error(`The editor's server ended with ${server.exitCode}.`);
    const ok = await fetch(`http://127.0.0.1:${port}/healthz`).then(
      (response) => response.ok,
      () => false,
    );
    if (ok) return;
    await new Promise((done) => setTimeout(done, 300));
  }
  throw new Error("The editor's server did not start.");
}

/** Ends the server by its own id and waits for it, so that nothing writes into the folders any more. */
async function end(server) {
  if (server.exitCode !== null || server.signalCode !== null) return;
  const ended = new Promise((done) => server.once("exit", done));
  server.kill();
  const stubborn = setTimeout(() => server.kill("SIGKILL"), 10_000);
  await ended;
  clearTimeout(stubborn);
}

/** Without what an editor leaves to the programs of its terminal: the server would open the folder there. */
function ownEnvironment() {
  return Object.fromEntries(Object.entries(process.env).filter(([name]) => !name.startsWith("VSCODE_")));
}

/** A copy of the demo and fresh settings, so that a run changes nothing and finds nothing of the last one. */
function freshFolders() {
  const root = mkdtempSync(join(tmpdir(), "plumbline-editor-"));
  cpSync("demo", join(root, "demo"), { recursive: true });
  for (const name of ["user/User", "extensions"]) mkdirSync(join(root, name), { recursive: true });
  const settings = {
    "workbench.colorTheme": "Default Light Modern",
    "window.autoDetectColorScheme": false,
    "workbench.startupEditor": "none",
    "workbench.secondarySideBar.defaultVisibility": "hidden",
    "chat.commandCenter.enabled": false,
    "editor.minimap.enabled": false,
    // Else the pictures count the servers that happen to run on this machine.
    "remote.autoForwardPorts": false,
    "files.watcherExclude": {},
  };
  writeFileSync(join(root, "user/User/settings.json"), JSON.stringify(settings));
  return root;
}

/** The extension as a browser finds it, without the entry that a Node host would take. */
function webExtension(root) {
  const manifest = JSON.parse(readFileSync("package.json", "utf8"));
  const folder = join(root, "extension");
  for (const name of ["dist", "syntaxes", "demo"]) cpSync(name, join(folder, name), { recursive: true });
  const { main: _, ...browserOnly } = manifest;
  writeFileSync(join(folder, "package.json"), JSON.stringify({ ...browserOnly, extensionKind: ["web"] }));
  return folder;
}

/** Installs the package, and gives an extension that is nothing but the place of the suite. */
function installedExtension(root) {
  const folders = ["--user-data-dir", join(root, "user"), "--extensions-dir", join(root, "extensions")];
  const options = { env: ownEnvironment(), stdio: ["ignore", "pipe", "inherit"] };
  execFileSync(
    process.execPath,
    [editorEntry, ...folders, "--install-extension", resolve("dist/plumbline.vsix")],
    options,
  );
  const folder = join(root, "suite");
  mkdirSync(folder);
  const manifest = { name: "suite", publisher: "tests", version: "0.0.0", engines: { vscode: "*" } };
  writeFileSync(join(folder, "package.json"), JSON.stringify(manifest));
  return folder;
}

installEditor();
// What an earlier run left must not pass for this one's.
for (const old of [pictures, counts]) rmSync(old, { recursive: true, force: true });
for (const folder of [pictures, dirname(counts)]) mkdirSync(folder, { recursive: true });
const root = freshFolders();
const port = await freePort();
const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
  args: [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
  ],
});
const page = await browser.newPage({ viewport: { width: 1360, height: 860 } });
const bridge = await servePage(page, pictures);
const extension = web ? webExtension(root) : vsix ? installedExtension(root) : resolve(".");
// The host of an extension runs the suite that lies in its folder.
const suite = web
  ? join(extension, "out/suite.js")
  : vsix
    ? join(extension, "suite.cjs")
    : resolve("out/editor/suite.cjs");
await (web ? bundleWebSuite(suite, bridge.port) : bundleSuite(suite, vsix ? "installed" : "suite"));
const server = spawn(
  process.execPath,
  [
    editorEntry,
    ...["--auth", "none", "--bind-addr", `127.0.0.1:${port}`],
    ...["--user-data-dir", join(root, "user"), "--extensions-dir", join(root, "extensions")],
    ...["--disable-telemetry", "--disable-update-check", "--disable-workspace-trust", join(root, "demo")],
  ],
  {
    stdio: "ignore",
    env: { ...ownEnvironment(), PLUMBLINE_BRIDGE: String(bridge.port), PLUMBLINE_REPOSITORY: resolve(".") },
  },
);

for (const signal of ["SIGINT", "SIGTERM"]) {
  process.once(signal, () => {
    server.kill();
    process.exit(1);
  });
}

let code = 1;
try {
  await answers(port, server);
  const ended = new Promise((done) => {
    page.exposeFunction("codeAutomationExit", (value) => done(value));
  });
  // The workbench logs here too; only the suite's own lines are of use.
  await page.exposeFunction("codeAutomationLog", (_type, args) => {
    const text = args.join(" ");
    if (/^( {2}ok| {2}FAIL|editor:)/.test(text)) console.log(text);
    const [, passed, failed] = /^editor: (\d+) passed, (\d+) failed/.exec(text) ?? [];
    if (failed !== undefined) writeFileSync(counts, JSON.stringify({ passed: +passed, failed: +failed }));
  });
  const base = `vscode-remote://127.0.0.1:${port}`;
  const payload = JSON.stringify([
    ["extensionDevelopmentPath", base + extension],
    ["extensionTestsPath", base + suite],
    ["skipWelcome", "true"],
  ]);
  await page.goto(
    `http://127.0.0.1:${port}/?folder=${encodeURIComponent(join(root, "demo"))}&payload=${encodeURIComponent(payload)}`,
  );
  const overdue = new Promise((done) => setTimeout(() => done("overdue"), LONGEST).unref());
  const outcome = await Promise.race([ended, overdue]);
  if (outcome === "overdue") {
    console.error("The suite did not end in time.");
    await page.screenshot({ path: join(pictures, "overdue.png") });
  } else code = Number(outcome);
} finally {
  bridge.close();
  await browser.close();
  await end(server);
  rmSync(root, { recursive: true, force: true, maxRetries: 5, retryDelay: 200 });
}
if (code === 0 && process.argv.includes("--readme")) {
  for (const name of inReadme) cpSync(join(pictures, `${name}.png`), `client/media/${name}.png`);
}
process.exit(code);
