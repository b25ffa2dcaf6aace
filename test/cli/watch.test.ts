import { type ChildProcess, spawn } from "node:child_process";
import { mkdtempSync, rmSync, unlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { eventually } from "../support/eventually.ts";

const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
const card = "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 95 kt\n";
const note = (bank: number) =>
  `| limits own\n| must any bank 30\n\n| fly wheatear-9; under own; weight 8 t; config clean; altitude FL100; speed 180 kt\n\n| phase cruise; bank ${bank}\n`;

let folder = "";
let child: ChildProcess;
let out = "";
let errors = "";

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-watch-"));
  writeFileSync(join(folder, "cards.plumb"), card);
  writeFileSync(join(folder, "plan.plumb"), note(20));
  out = "";
  errors = "";
  child = spawn(process.execPath, [cli, "check", "--watch"], { cwd: folder });
  child.stdout?.on("data", (data) => {
    out += data;
  });
  child.stderr?.on("data", (data) => {
    errors += data;
  });
  await eventually(() => expect(errors).toContain("Nothing found in 2 notes."));
  // The watcher looks through the folder before it hears changes.
  await new Promise((resolve) => setTimeout(resolve, 500));
});

afterEach(() => {
  child.kill("SIGKILL");
  rmSync(folder, { recursive: true, force: true });
});

function ended(): Promise<number | null> {
  return new Promise((resolve) => child.once("exit", (code) => resolve(code)));
}

describe("plumbline check --watch", () => {
  it("checks again when a note changes, and says what changed", async () => {
    writeFileSync(join(folder, "plan.plumb"), note(35));
    await eventually(() => expect(out).toContain("plan.plumb:6:17  error  Bank 35°"));
    expect(errors).toContain("plan.plumb changed");
    writeFileSync(join(folder, "plan.plumb"), note(25));
    await eventually(() => expect(errors.match(/Nothing found/g)).toHaveLength(2));
  });

  it("takes up a new note, a card that changes, and a file that goes", async () => {
    writeFileSync(join(folder, "second.plumb"), "| fly wheatear-8\n");
    await eventually(() => expect(out).toContain("[unknown-aircraft]"));
    unlinkSync(join(folder, "second.plumb"));
    await eventually(() => expect(errors.match(/Nothing found/g)).toHaveLength(2));
    writeFileSync(join(folder, "cards.plumb"), card.replace("95 kt", "195 kt"));
    await eventually(() => expect(out).toContain("[stalled]"));
  });

  it("goes on after a file that cannot be read", async () => {
    writeFileSync(join(folder, "plan.plumb"), Buffer.from([0x7c, 0xff, 0xfe]));
    await eventually(() => expect(errors).toContain("is not UTF-8"));
    writeFileSync(join(folder, "plan.plumb"), note(35));
    await eventually(() => expect(out).toContain("Bank 35°"));
  });

  it("ends when it is interrupted, with what the last run came to", async () => {
    writeFileSync(join(folder, "plan.plumb"), note(35));
    await eventually(() => expect(out).toContain("Bank 35°"));
    const code = ended();
    child.kill("SIGINT");
    expect(await code).toBe(1);
  });
});
