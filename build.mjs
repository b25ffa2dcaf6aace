// Bundles the extension, the server and the command line, and writes the pages that ship beside them.
//   node build.mjs           what ships and what the tests run
//   node build.mjs --debug   readable, with source maps, for a debugger
import { readdirSync } from "node:fs";
import { mkdir, readFile, rm, writeFile } from "node:fs/promises";
import { join, relative } from "node:path";
import { build } from "esbuild";

import { writeNotices } from "./notices.mjs";

const debug = process.argv.includes("--debug");
const { version } = JSON.parse(await readFile("package.json", "utf8"));
// A dependency asks where it stands by `import.meta.url`, which a bundle in CommonJS does not have.
const whereItStands = '"use strict";const bundleUrl=require("node:url").pathToFileURL(__filename).href;';
const demo = readdirSync("demo", { recursive: true, withFileTypes: true })
  .filter((entry) => entry.isFile())
  .map((entry) => relative("demo", join(entry.parentPath, entry.name)).replaceAll("\\", "/"));
const shared = {
  bundle: true,
  platform: "node",
  target: "node20",
  format: "cjs",
  minify: !debug,
  sourcemap: debug && "linked",
  define: {
    PLUMBLINE_VERSION: JSON.stringify(version),
    DEMO_FILES: JSON.stringify(demo),
    "import.meta.url": "bundleUrl",
  },
  banner: { js: whereItStands },
  // Its main file finds its parts in a way that no bundler follows.
  alias: { "jsonc-parser": "jsonc-parser/lib/esm/main.js" },
  legalComments: "none",
  logLevel: "warning",
  metafile: true,
};

/** A file of its own for each finding, and the built-in limits as a note: links in the editor open them. */
async function writePages() {
  const { outputFiles } = await build({
    ...shared,
    format: "esm",
    define: {},
    banner: {},
    sourcemap: false,
    entryPoints: ["server/src/report/pages.ts"],
    write: false,
  });
  const { pages } = await import(
    `data:text/javascript;base64,${Buffer.from(outputFiles[0].contents).toString("base64")}`
  );
  // Pages of findings that are no more must not ship.
  await rm("dist/pages", { recursive: true, force: true });
  await mkdir("dist/pages", { recursive: true });
  await Promise.all(pages().map(({ name, text }) => writeFile(`dist/pages/${name}`, text)));
}

/** For a browser: the host of its extensions wraps the client, and the server is a worker's whole script. */
const web = {
  ...shared,
  platform: "browser",
  target: "es2022",
  define: { DEMO_FILES: JSON.stringify(demo) },
  banner: {},
};

if (!debug) {
  const bundles = ["client/extension.cjs", "server/main.node.cjs", "server/cli.cjs"];
  bundles.push("client/extension.web.js", "server/main.web.js");
  const maps = bundles.map((name) => `dist/${name}.map`);
  await Promise.all(maps.map((map) => rm(map, { force: true })));
}
const built = await Promise.all([
  build({
    ...shared,
    entryPoints: ["client/src/extension.ts"],
    outfile: "dist/client/extension.cjs",
    external: ["vscode"],
  }),
  build({ ...shared, entryPoints: ["server/src/main.node.ts"], outfile: "dist/server/main.node.cjs" }),
  build({
    ...shared,
    entryPoints: ["server/src/cli/main.ts"],
    outfile: "dist/server/cli.cjs",
    banner: { js: `#!/usr/bin/env node\n${whereItStands}` },
  }),
  build({
    ...web,
    entryPoints: ["client/src/extension.web.ts"],
    outfile: "dist/client/extension.web.js",
    external: ["vscode"],
  }),
  build({
    ...web,
    entryPoints: ["server/src/main.web.ts"],
    outfile: "dist/server/main.web.js",
    format: "iife",
  }),
  writePages(),
]);
await writeNotices(built.flatMap((one) => (one?.metafile ? [one.metafile] : [])));
