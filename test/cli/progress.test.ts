import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
const erased = "\r\u001b[K";

let folder = "";

/** Long work: it takes seconds, and what is asked for shows after half a second. */
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-progress-"));
  writeFileSync(
    join(folder, "card.plumb"),
    "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 95 kt\n",
  );
  const points = Array.from({ length: 1500 }, (_, i) => `| phase cruise; bank ${i % 20}\n`).join("\n");
  for (let i = 0; i < 30; i++) {
    writeFileSync(
      join(folder, `plan-${i}.plumb`),
      `| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 180 kt\n\n${points}`,
    );
  }
});

afterAll(() => rmSync(folder, { recursive: true }));

/** What a terminal is sent, standard error alone. */
function onTerminal(command: string): string {
  return spawnSync("script", ["-qec", `${process.execPath} ${cli} check ${command} >out.json`, "/dev/null"], {
    cwd: folder,
    encoding: "utf8",
  }).stdout;
}

describe("the progress of long work", () => {
  it("stands on a terminal's standard error, and is taken away at the end", () => {
    const sent = onTerminal("--format json");
    expect(sent).toMatch(/\d+ of 31 notes checked: /);
    expect(sent.startsWith(erased)).toBe(true);
    expect(sent.endsWith(erased)).toBe(true);
  });

  it("is not there with --quiet, nor where no terminal is", () => {
    expect(onTerminal("--format json --quiet")).toBe("");
    const { stderr } = spawnSync(process.execPath, [cli, "check", "--format", "json"], {
      cwd: folder,
      encoding: "utf8",
      maxBuffer: 1 << 28,
    });
    expect(stderr).toBe("");
  });
});
