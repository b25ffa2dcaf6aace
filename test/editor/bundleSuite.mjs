// Bundles a suite for the host that runs it, with what `plumbline check` finds in the demo, which the editor must show.
import { execFileSync } from "node:child_process";
import { resolve } from "node:path";
import { build } from "esbuild";

const checked = () =>
  execFileSync(
    process.execPath,
    [resolve("dist/server/cli.cjs"), "check", ".", "--format", "json", "--fail-on", "never"],
    {
      cwd: "demo",
      encoding: "utf8",
    },
  );

/** For Node's extension host: the whole suite, or the part that an installed extension is held to. */
export function bundleSuite(outfile, folder = "suite") {
  return build({ ...shared(`test/editor/${folder}/index.ts`, outfile), platform: "node", target: "node20" });
}

/** For the browser's extension host, which has no Node: the few names that the tests use are put in their place. */
export function bundleWebSuite(outfile, bridge) {
  const options = shared("test/editor/web/index.ts", outfile);
  return build({
    ...options,
    platform: "browser",
    alias: { "node:assert/strict": resolve("test/editor/web/assert.ts") },
    define: { ...options.define, "process.env.PLUMBLINE_BRIDGE": JSON.stringify(String(bridge)) },
  });
}

function shared(entry, outfile) {
  return {
    entryPoints: [entry],
    outfile,
    bundle: true,
    format: "cjs",
    external: ["vscode"],
    define: { CHECKED_DEMO: checked() },
    logLevel: "warning",
  };
}
