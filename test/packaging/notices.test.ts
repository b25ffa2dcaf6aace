import { spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { build } from "esbuild";
import { describe, expect, it } from "vitest";

const root = fileURLToPath(new URL("../../", import.meta.url));

/** Names of the packages of which something is left in the bundles. */
async function packagesIn(platform: "node" | "browser", entryPoints: string[]): Promise<string[]> {
  const { metafile } = await build({
    absWorkingDir: root,
    entryPoints,
    outdir: "out/notices",
    bundle: true,
    platform,
    external: ["vscode"],
    alias: { "jsonc-parser": "jsonc-parser/lib/esm/main.js" },
    define: { "import.meta.url": '""' },
    write: false,
    metafile: true,
  });
  return Object.values(metafile.outputs)
    .flatMap(({ inputs }) => Object.entries(inputs))
    .filter(([, { bytesInOutput }]) => bytesInOutput > 0)
    .flatMap(([path]) => /^.*node_modules\/((?:@[^/]+\/)?[^/]+)/.exec(path)?.[1] ?? []);
}

describe("the licences of what is bundled", () => {
  const notices = readFileSync(join(root, "dist/THIRD-PARTY-NOTICES.txt"), "utf8");

  it("stand in the package with their texts", () => {
    for (const name of [
      "commander",
      "chokidar",
      "ignore",
      "jsonc-parser",
      "vscode-languageclient",
      "vscode-languageserver",
    ]) {
      const [, after = ""] = notices.split(`\n${name} `);
      expect(after, name).toMatch(/^\d+\.\d+\.\d+ \((MIT|ISC)\)\n\n[\s\S]{0,200}(Permission|Copyright)/);
    }
    // What a package holds of another that is no package of ours.
    expect(notices).toContain("\nvscode-languageserver-types - MIT\n");
  });

  it("are those of every package whose code a bundle holds", async () => {
    const held = new Set([
      ...(await packagesIn("node", [
        "client/src/extension.ts",
        "server/src/main.node.ts",
        "server/src/cli/main.ts",
      ])),
      ...(await packagesIn("browser", ["client/src/extension.web.ts", "server/src/main.web.ts"])),
    ]);
    expect(held.size).toBeGreaterThan(10);
    expect([...held].filter((name) => !notices.includes(`\n${name} `))).toEqual([]);
  });

  it.each([
    ["GPL-3.0-only", "LICENSE", /invented is under GPL-3\.0-only, which a bundle may not carry/],
    ["MIT", "README.md", /invented has no text of its licence/],
  ])("stop the build where a package is under %s and comes with its %s", (license, file, why) => {
    const folder = mkdtempSync(join(tmpdir(), "plumbline-notices-"));
    try {
      const invented = join(folder, "node_modules/invented");
      mkdirSync(invented, { recursive: true });
      writeFileSync(
        join(invented, "package.json"),
        JSON.stringify({ name: "invented", version: "1.0.0", license }),
      );
      writeFileSync(join(invented, file), "Copyright of somebody.");
      const module = pathToFileURL(join(root, "notices.mjs")).href;
      const inputs = { [join(invented, "index.js")]: {} };
      const script = `import { writeNotices } from ${JSON.stringify(module)}; await writeNotices([${JSON.stringify({ inputs })}]);`;
      const options = { cwd: folder, encoding: "utf8" } as const;
      const { status, stderr } = spawnSync(process.execPath, ["--input-type=module", "-e", script], options);
      expect(stderr).toMatch(why);
      expect(status).toBe(1);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});
