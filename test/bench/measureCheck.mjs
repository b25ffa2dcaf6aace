import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { findings, generateNote } from "./generateNote.mjs";
import { median } from "./median.mjs";

/**
 * Lines a second of `plumbline check`, each time a fresh process, its start-up left out: what a long note takes
 * beyond what a note of 100 lines does. `{ linesPerSecond, long, short }`, the last two the medians in ms.
 */
export function measureCheck(lines, commandLine, repetitions) {
  const shortest = 100;
  const timings = { long: [], short: [] };
  const folders = { long: folderWith(lines), short: folderWith(shortest) };
  try {
    for (let turn = 0; turn < repetitions; turn++) {
      for (const which of ["long", "short"]) timings[which].push(check(commandLine, folders[which]));
    }
  } finally {
    for (const folder of Object.values(folders)) rmSync(folder, { recursive: true });
  }
  const [long, short] = [median(timings.long), median(timings.short)];
  return { linesPerSecond: ((lines - shortest) / Math.max(0.001, long - short)) * 1000, long, short };
}

function folderWith(lines) {
  const folder = mkdtempSync(join(tmpdir(), "plumbline-bench-"));
  writeFileSync(join(folder, "note.plumb"), generateNote(lines));
  return folder;
}

function check(commandLine, cwd) {
  const args = [commandLine, "check", "note.plumb", "--format", "json", "--fail-on", "never"];
  const start = performance.now();
  const { status, stdout, stderr } = spawnSync(process.execPath, args, {
    cwd,
    encoding: "utf8",
    maxBuffer: 1e9,
  });
  const ms = performance.now() - start;
  if (status !== 0) throw new Error(`plumbline check ended with ${status}. ${stderr}`);
  const found = JSON.parse(stdout).files.reduce((sum, file) => sum + file.findings.length, 0);
  if (found !== findings)
    throw new Error(`Wrong answer: check tells ${found} findings where ${findings} are due.`);
  return ms;
}
