import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, renameSync, rmSync, unlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { eventually } from "../support/eventually.ts";

const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
const card = "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 95 kt\n";
const note = (bank: number) =>
  `| limits own\n| must any bank 30; must any margin none\n\n| fly wheatear-9; under own; weight 8 t; config clean; altitude FL100; speed 180 kt\n\n| phase cruise; bank ${bank}\n`;

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
    expect(out).toMatch(/\n\n\d\d:\d\d:\d\d {2}plan\.plumb changed\nplan\.plumb:6:17 /);
    writeFileSync(join(folder, "plan.plumb"), note(25));
    await eventually(() => expect(errors.match(/Nothing found/g)).toHaveLength(2));
  });

  it("takes up a new note, a card that changes, and a file that goes", async () => {
    writeFileSync(join(folder, "second.plumb"), "| fly wheatear-8\n");
    await eventually(() => expect(out).toContain("[unknown-aircraft]"));
    expect(out).toContain("  second.plumb is new\n");
    unlinkSync(join(folder, "second.plumb"));
    await eventually(() => expect(out).toContain("  second.plumb is gone\n"));
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

  it("takes up what other programs save by renaming, folders that come and go, .gitignore and plumbline.json", async () => {
    writeFileSync(join(folder, "plan.plumb.tmp"), note(35));
    renameSync(join(folder, "plan.plumb.tmp"), join(folder, "plan.plumb"));
    await eventually(() => expect(out).toContain("  plan.plumb changed\nplan.plumb:6:17  error  Bank 35°"));
    mkdirSync(join(folder, "inner"));
    writeFileSync(join(folder, "inner", "third.plumb"), "| fly wheatear-8\n");
    await eventually(() => expect(out).toContain("inner/third.plumb:1:7  error"));
    writeFileSync(join(folder, "plumbline.json"), '{ "exclude": ["inner/"] }');
    await eventually(() => expect(errors.match(/1 error in 2 notes/g)).toHaveLength(2));
    writeFileSync(join(folder, "plumbline.json"), '{ "exlude": [] }');
    await eventually(() => expect(errors).toContain('did you mean "exclude"?'));
    unlinkSync(join(folder, "plumbline.json"));
    await eventually(() => expect(errors).toContain("2 errors in 3 notes"));
    rmSync(join(folder, "inner"), { recursive: true });
    await eventually(() => expect(errors.match(/1 error in 2 notes/g)).toHaveLength(3));
    writeFileSync(join(folder, ".gitignore"), "plan.plumb\n");
    await eventually(() => expect(errors).toContain("Nothing found in 1 note."));
  });

  it("ends when it is interrupted, with what the last run came to", async () => {
    writeFileSync(join(folder, "plan.plumb"), note(35));
    await eventually(() => expect(out).toContain("Bank 35°"));
    const code = ended();
    child.kill("SIGINT");
    expect(await code).toBe(1);
  });

  it.each([
    ["what the last run found is mended", note(25), 0],
    ["what the last run read is no text", Buffer.from([0x7c, 0xff]), 2],
  ])("ends with the code of the last run: %s", async (_, last, status) => {
    writeFileSync(join(folder, "plan.plumb"), note(35));
    await eventually(() => expect(out).toContain("Bank 35°"));
    writeFileSync(join(folder, "plan.plumb"), last);
    await eventually(() => expect(errors).toMatch(status === 0 ? /(Nothing found.*){2}/s : /not UTF-8/));
    const code = ended();
    child.kill("SIGTERM");
    expect(await code).toBe(status);
  });

  it("ends quietly when nobody reads it any more", async () => {
    const code = ended();
    child.stdout?.destroy();
    writeFileSync(join(folder, "plan.plumb"), note(35));
    expect(await code).toBe(0);
    expect(errors).not.toContain("EPIPE");
  });

  it.each([
    [["--format", "json"], "leave out --format and -o"],
    [["-o", "out.txt"], "leave out --format and -o"],
    [["-"], "standard input is read once"],
  ])("with %j is refused in one line", (args, says) => {
    const { status, stderr } = spawnSync(process.execPath, [cli, "check", "--watch", ...args], {
      cwd: folder,
      encoding: "utf8",
    });
    expect([status, stderr]).toEqual([2, expect.stringMatching(/^plumbline: .+\n$/)]);
    expect(stderr).toContain(says);
  });
});
