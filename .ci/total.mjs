// Prints `N passed, M failed` over the tests and the suite in the editor, where both left their counts.
// After a failure the line is printed only if a counted test is what failed.
import { readFileSync } from "node:fs";

function counts(path, read) {
  try {
    return read(JSON.parse(readFileSync(path, "utf8")));
  } catch {
    return undefined;
  }
}

const ended = Number(process.argv[2]);
const unit = counts("out/unit.json", (one) => ({ passed: one.numPassedTests, failed: one.numFailedTests }));
const editor = counts("out/editor/counts.json", (one) => one);
const failed = (unit?.failed ?? 0) + (editor?.failed ?? 0);
if (ended === 0 ? unit && editor : failed > 0) {
  console.log(`${(unit?.passed ?? 0) + (editor?.passed ?? 0)} passed, ${failed} failed`);
}
