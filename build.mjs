// Bundles the extension and the server, and writes the files that ship beside them.
import { build } from "esbuild";

const production = process.argv.includes("--production");
const shared = {
  bundle: true,
  platform: "node",
  target: "node20",
  format: "cjs",
  minify: true,
  keepNames: false,
  sourcemap: production ? false : "linked",
  legalComments: "none",
  logLevel: "warning",
};

await build({ ...shared, entryPoints: ["client/src/extension.ts"], outfile: "dist/client/extension.cjs", external: ["vscode"] });
await build({ ...shared, entryPoints: ["server/src/main.node.ts"], outfile: "dist/server/main.node.cjs" });
await build({
  ...shared,
  entryPoints: ["server/src/cli/main.ts"],
  outfile: "dist/server/cli.cjs",
  banner: { js: "#!/usr/bin/env node" },
  external: ["./main.node.cjs"],
});
