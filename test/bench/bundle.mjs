import { fileURLToPath } from "node:url";
import { build } from "esbuild";

/** Bundles a file of this folder in the way the server itself is bundled, and gives the path of the outcome. */
export async function bundle(name) {
  const outfile = fileURLToPath(
    new URL(`../../dist/bench/${name.replace(/\.\w+$/, ".cjs")}`, import.meta.url),
  );
  await build({
    entryPoints: [fileURLToPath(new URL(name, import.meta.url))],
    outfile,
    bundle: true,
    platform: "node",
    target: "node20",
    format: "cjs",
    minify: true,
    legalComments: "none",
    logLevel: "error",
  });
  return outfile;
}
