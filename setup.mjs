// Installs the locked dependencies when they are missing or older than the lock file, so that
// `npm start` and `npm test` each work as the first command in a fresh clone.
import { spawnSync } from "node:child_process";
import { existsSync, statSync } from "node:fs";

const stamp = "node_modules/.package-lock.json";
const fresh = existsSync(stamp) && statSync(stamp).mtimeMs >= statSync("package-lock.json").mtimeMs;
if (!fresh) {
  console.error("Installing the locked dependencies …");
  const npm = process.platform === "win32" ? "npm.cmd" : "npm";
  const { status } = spawnSync(npm, ["ci"], {
    stdio: ["ignore", "ignore", "inherit"],
    shell: npm.endsWith(".cmd"),
  });
  if (status !== 0) process.exit(status ?? 1);
}
