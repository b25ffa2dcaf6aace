// Prints `N passed, M failed` over the tests and the suites in the editor, where all left their counts.
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
const web = counts("out/editor/webCounts.json", (one) => one);
const neovim = counts("out/editor/neovim.json", (one) => one);
const emacs = counts("out/editor/emacs.json", (one) => one);
const installed = counts("out/editor/installedCounts.json", (one) => one);
const all = [unit, editor, web, neovim, emacs, installed];
const sum = (name) => all.reduce((total, one) => total + (one?.[name] ?? 0), 0);
const failed = sum("failed");
if (ended === 0 ? all.every(Boolean) : failed > 0) {
  console.log(`${sum("passed")} passed, ${failed} failed`);
}
