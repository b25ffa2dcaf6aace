// Makes dist/plumbline.vsix: twice, so that it is known to have the same bytes each time. Ends non-zero with a
// warning of the packager, with other bytes the second time, or with more of them than the budget.
import { spawnSync } from "node:child_process";
import { readFileSync, rmSync } from "node:fs";

/** What a user downloads. */
const MOST_BYTES = 2_000_000;
const vsix = "dist/plumbline.vsix";

function pack(path) {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    [
      "node_modules/@vscode/vsce/vsce",
      "package",
      "--no-dependencies",
      "--no-rewrite-relative-links",
      "--allow-missing-repository",
      "-o",
      path,
    ],
    // The time of an entry is its file's, else: another one in every clone.
    { encoding: "utf8", env: { ...process.env, SOURCE_DATE_EPOCH: "1767225600" } },
  );
  const told = `${stdout}${stderr}`;
  if (status !== 0 || /WARN/.test(told)) {
    process.stderr.write(told);
    process.exit(1);
  }
  return readFileSync(path);
}

const first = pack(vsix);
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
