import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, writeFileSync } from "node:fs";
import { homedir } from "node:os";
import { join } from "node:path";

/**
 * Two general-purpose servers to compare with, kept in the cache folder, outside the project. Gives
 * `{ peers, why }`: `peers` is empty where they are not there and cannot be fetched, and `why` says so.
 */
export function installPeers({ mayInstall }) {
  const cache = process.env.PLUMBLINE_CACHE ?? join(homedir(), ".cache", "plumbline");
  const folder = join(cache, "bench-peers");
  const peers = known.map(({ script, ...peer }) => ({ ...peer, path: join(folder, "node_modules", script) }));
  const missing = () => peers.some(({ path }) => !existsSync(path));
  if (!missing()) return { peers, why: null };
  if (!mayInstall) return { peers: [], why: "not installed yet, and a quick run fetches nothing" };

  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, "package.json"), '{ "private": true }\n');
  const npm = process.platform === "win32" ? "npm.cmd" : "npm";
  const args = [
    "install",
    "--no-audit",
    "--no-fund",
    "--ignore-scripts",
    "--fetch-retries=0",
    ...known.map(({ install }) => install),
  ];
  const { status, stderr, error } = spawnSync(npm, args, {
    cwd: folder,
    encoding: "utf8",
    shell: npm.endsWith(".cmd"),
  });
  if (status === 0 && !missing()) return { peers, why: null };
  const told = (error?.message ?? stderr ?? "").trim().split("\n").slice(0, 2).join(" ");
  return { peers: [], why: `could not be installed: ${told || `npm ended with ${status}`}` };
}

// The last versions that run on Node 20.
const known = [
  {
    name: "vscode-json-language-server",
    format: "json",
    install: "vscode-langservers-extracted@4.10.0",
    script: "vscode-langservers-extracted/bin/vscode-json-language-server",
  },
  {
    name: "yaml-language-server",
    format: "yaml",
    install: "yaml-language-server@1.22.0",
    script: "yaml-language-server/bin/yaml-language-server",
  },
];
