// Makes dist/plumbline.vsix: twice, so that it is known to have the same bytes each time. Ends non-zero with a
// warning of the packager, with other bytes the second time, or with more of them than the budget.
import { spawnSync } from "node:child_process";
import { chmodSync, copyFileSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";

/** What a user downloads. */
const MOST_BYTES = 2_000_000;
const vsix = "dist/plumbline.vsix";
const vsce = resolve("node_modules/@vscode/vsce/vsce");
// The time of an entry is its file's, else, and by this machine's clock: another one in every clone.
const sameEverywhere = { SOURCE_DATE_EPOCH: "1767225600", TZ: "UTC" };

function run(folder, environment, ...args) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [vsce, ...args, "--no-dependencies"], {
    cwd: folder,
    encoding: "utf8",
    env: { ...process.env, ...environment },
  });
  if (status !== 0 || /WARN/.test(stdout + stderr)) {
    process.stderr.write(stdout + stderr);
    process.exit(1);
  }
  return stdout;
}

/** Packs a copy of what ships, since an entry keeps the rights of its file, and a clone's are its user's. */
function pack(path) {
  const folder = mkdtempSync(join(tmpdir(), "plumbline-package-"));
  try {
    for (const name of run(".", {}, "ls").trim().split("\n")) {
      const copy = join(folder, name);
      mkdirSync(dirname(copy), { recursive: true });
      copyFileSync(name, copy);
      chmodSync(copy, 0o644);
    }
    const options = ["--no-rewrite-relative-links", "--allow-missing-repository", "-o", resolve(path)];
    run(folder, sameEverywhere, "package", ...options);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return readFileSync(path);
}

const first = pack(vsix);
// As somebody else, somewhere else.
process.umask(0o077);
process.env.TZ = "Asia/Tokyo";
const again = pack(`${vsix}.again`);
rmSync(`${vsix}.again`);
if (!first.equals(again)) {
  console.error("The package has other bytes each time.");
  process.exit(1);
}
if (MOST_BYTES < first.length) {
  console.error(`The package has ${first.length} bytes, more than its budget of ${MOST_BYTES}.`);
  process.exit(1);
}
console.log(`The package has ${first.length} bytes, the same each time (budget ${MOST_BYTES}).`);
