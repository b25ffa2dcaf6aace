import { spawnSync } from "node:child_process";
import { lstatSync, mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { catalogue } from "../../server/src/plan/findings.ts";

const root = fileURLToPath(new URL("../..", import.meta.url));
const bin = JSON.parse(readFileSync(join(root, "package.json"), "utf8")).bin.plumbline as string;

function plumbline(args: readonly string[], options: { input?: string | Buffer; cwd?: string } = {}) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [join(root, bin), ...args], {
    cwd: options.cwd ?? root,
    input: options.input ?? "",
    encoding: "utf8",
    env: { ...process.env, NO_COLOR: "1" },
  });
  return { status, stdout, stderr };
}

let folder = "";
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-cli-"));
});
afterAll(() => rmSync(folder, { recursive: true }));

const card = "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 95 kt\n";
const point = "| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 180 kt\n\n| phase cruise\n";

describe("plumbline check", () => {
  it("finds in the demo what was put there, and nothing else", () => {
    const { status, stdout, stderr } = plumbline(["check", "demo"]);
    expect(stdout).toBe(readFileSync(join(root, "test/examples/demo.check.txt"), "utf8"));
    expect(status).toBe(1);
    expect(stderr).toContain("not approved data");
  });

  it("is the default command, and takes a file, a folder and a glob", () => {
    const whole = plumbline(["demo", "--quiet"]).stdout;
    expect(plumbline(["check", "demo/*", "--quiet"]).stdout).toBe(whole);
    expect(plumbline(["check", "demo/winter-shuttle.plumb", "--quiet"]).stdout).toBe(
      whole
        .split("\n")
        .filter((line) => line.startsWith("demo/winter-shuttle.plumb"))
        .join("\n")
        .concat("\n"),
    );
  });

  it.each([
    ["error", point + card.replace("stall 95 kt", ""), 1],
    ["error", `${card}\n${point}`, 0],
    ["warning", `${card}\n${point.trimEnd()}; claim v2min 100 kt\n`, 1],
    ["never", "| wieght 5", 0],
  ])("with --fail-on %s ends with the right code", (failOn, input, status) => {
    expect(plumbline(["check", "-", "--fail-on", failOn], { input, cwd: folder }).status).toBe(status);
  });

  it("prints JSON with the caution, positions from 1 and a summary", () => {
    const { stdout } = plumbline(["check", "-", "--format", "json", "--stdin-path", "x/note.plumb"], {
      input: "\n| weight 61.4",
      cwd: folder,
    });
    const printed = JSON.parse(stdout);
    expect(printed).toMatchObject({ schema: 1, summary: { error: 1, warning: 0, information: 0, hint: 0 } });
    expect(printed.caution).toContain("Not for use in flight");
    expect(printed.files).toEqual([
      {
        path: "x/note.plumb",
        findings: [
          expect.objectContaining({
            code: "missing-unit",
            severity: "error",
            line: 2,
            column: 10,
            endLine: 2,
            endColumn: 14,
            accepted: null,
          }),
        ],
      },
    ]);
  });

  it("prints SARIF 2.1.0 in which every result has its rule and its place", () => {
    const log = JSON.parse(plumbline(["check", "demo", "--format", "sarif"]).stdout);
    expect(log.version).toBe("2.1.0");
    const [run] = log.runs;
    expect(run.columnKind).toBe("utf16CodeUnits");
    expect(run.results.length).toBeGreaterThan(5);
    for (const result of run.results) {
      expect(run.tool.driver.rules[result.ruleIndex].id).toBe(result.ruleId);
      expect(["error", "warning", "note", "none"]).toContain(result.level);
      const { artifactLocation, region } = result.locations[0].physicalLocation;
      expect(artifactLocation.uri).toMatch(/^demo\/[\w.-]+$/);
      expect(region.startColumn).toBeGreaterThan(0);
      expect(region.endColumn).toBeGreaterThanOrEqual(region.startColumn);
    }
  });

  it("prints what is accepted as a suppression with its reason, and counts it", () => {
    const log = JSON.parse(plumbline(["check", "demo/night-mail-2.plumb", "--format", "sarif"]).stdout);
    const taken = log.runs[0].results.filter((one: { suppressions?: unknown }) => one.suppressions);
    expect(taken).toMatchObject([
      {
        ruleId: "bank-over-advice",
        level: "note",
        suppressions: [
          {
            kind: "inSource",
            status: "accepted",
            justification: "inside the mast, still within the must row; by J. Lund; to 30",
          },
        ],
      },
    ]);
    expect(plumbline(["check", "demo/night-mail-2.plumb"]).stderr).toContain(", 1 accepted in 1 note");
  });

  it("lists with --passed what was checked and held, in JSON and in SARIF", () => {
    const args = ["check", "demo/winter-shuttle.plumb", "--passed", "--format"];
    const { files } = JSON.parse(plumbline([...args, "json"]).stdout) as {
      files: { passed: Record<string, unknown>[]; findings: { code: string; line: number }[] }[];
    };
    const [file] = files;
    expect(file?.passed).toContainEqual({
      line: 12,
      endLine: 13,
      phase: "takeoff",
      title: "Runway 25, left at 400 ft",
      at: null,
      rule: "must takeoff, departure, missed ratio 1.13, vs 1.2",
      kind: "row",
      code: "ratio-short",
      figure: expect.closeTo(1.21, 1),
      bound: 1.13,
      unit: null,
    });
    // The noise turn breaks its bank rows; what it breaks it has not passed.
    const noise = file?.passed.filter(({ line }) => line === 21).map(({ code }) => code) ?? [];
    expect(noise).toContain("warning-in-turn");
    expect(noise).not.toContain("bank-over-limit");
    const log = JSON.parse(plumbline([...args, "sarif"]).stdout);
    const passes = log.runs[0].results.filter((one: { kind?: string }) => one.kind === "pass");
    expect(passes).toHaveLength(file?.passed.length ?? 0);
    expect(plumbline(["check", "demo", "--passed"])).toMatchObject({
      status: 2,
      stderr: expect.stringContaining("--passed needs --format json or sarif"),
    });
  });

  it("says how many values are sought, and the points table what bounds them", () => {
    const input = `${card.replace("9 t", "9 t; warning 1.05")}\n${point}\n| phase climb; rules vfr; bank ?\n`;
    const args = ["-", "--stdin-path", "sought/note.plumb"];
    expect(plumbline(["check", ...args], { input, cwd: folder }).stderr).toContain(
      "1 value was sought (`?`): `plumbline points` shows what was found and what bounds it.",
    );
    const { stdout } = plumbline(["points", ...args], { input, cwd: folder });
    expect(stdout).toMatch(/stall at {2}bounded by\n/);
    expect(stdout).toMatch(/climb \(bank 30 found\).* must any bank 30\n/);
    // Where nothing is sought the column is not there.
    expect(plumbline(["points", ...args], { input: `${card}\n${point}`, cwd: folder }).stdout).not.toContain(
      "bounded by",
    );
  });

  it("says with a note of the folder that is piped in how to say which it is", () => {
    const piped = mkdtempSync(join(tmpdir(), "plumbline-piped-"));
    writeFileSync(join(piped, "plan.plumb"), `${card}\n${point}`);
    const input = `${card}\n${point}`;
    const twice = plumbline(["check", "-"], { input, cwd: piped });
    expect(twice.stdout).toContain("another card too, in plan.plumb, so none of them is used");
    expect(twice.stderr).toContain("say which with --stdin-path FILE");
    const once = plumbline(["check", "-", "--stdin-path", "plan.plumb"], { input, cwd: piped });
    expect(once.stdout).not.toContain("duplicate-name");
    expect(once.stderr).not.toContain("--stdin-path");
    rmSync(piped, { recursive: true });
  });

  it("writes where it is told, and reads cards under --root", () => {
    writeFileSync(join(folder, "cards.plumb"), card);
    const out = join(folder, "out.txt");
    const { status, stdout } = plumbline(["check", "-", "--root", folder, "-o", out], { input: point });
    expect([status, stdout]).toEqual([0, ""]);
    expect(readFileSync(out, "utf8")).toContain("built-in-limits");
  });
});

describe("plumbline points", () => {
  it("prints the demo's table as it is kept", () => {
    expect(plumbline(["points", "demo"]).stdout).toBe(
      readFileSync(join(root, "test/examples/demo.points.txt"), "utf8"),
    );
  });

  it("prints JSON with every field of the format", () => {
    const { files } = JSON.parse(
      plumbline(["points", "demo/winter-shuttle.plumb", "--format", "json"]).stdout,
    );
    const turn = files[0].points.find((one: { title: string }) => one.title === "Noise turn");
    const fields =
      `line endLine phase title aside aircraft limits rules config mass_kg altitude_ft pressure_altitude_ft isa_deviation_c cg_percent
      lift_loss_percent bank_deg bank_side path_deg load engine_out speed vs1g_kt stall_kt stall_high_kt warning_kt warning_high_kt ratio margin
      margin_low margin_high ratio_low ratio_high stall_load stall_bank_deg warning_bank_deg overshoot_deg buffet_load buffet_bank_deg
      low_buffet_mach high_buffet_mach buffet_altitude_ft gust_load gust_load_down margin_after_shear ratio_after_shear va_kt v2min_kt vfto_kt
      vref_kt power_on_stall_kt radius_nm rate_deg_s rate_one_bank_deg bank_limit_deg bank_advice_deg seconds_to_warning seconds_to_stall
      approach_category solved sweep claims expected accepted not_evaluated assumed inherited withheld`.split(
        /\s+/,
      );
    for (const field of fields) expect(turn, field).toHaveProperty(field);
    expect(Object.keys(turn.speed)).toEqual(["cas_kt", "eas_kt", "tas_kt", "mach", "ias_kt"]);
    expect(turn.claims[0]).toMatchObject({ name: "stall", claimed: 132, holds: false });
    expect(turn.inherited).toMatchObject({ aircraft: 6, limits: 6 });
  });

  it("gives null for what cannot be known, and says what it waits for", () => {
    const { files } = JSON.parse(
      plumbline(["points", "-", "--format", "json"], {
        input: `${card}\n${point.replace("8 t", "8")}`.replaceAll("wheatear-9", "twite-4"),
        cwd: folder,
      }).stdout,
    );
    const [first] = files[0].points;
    expect(first).toMatchObject({
      mass_kg: null,
      stall_kt: null,
      speed: null,
      withheld: { line: 4, code: "missing-unit" },
    });
  });

  it("prints CSV with one row a point or value of a sweep, and the caution last", () => {
    const { files } = JSON.parse(plumbline(["points", "demo", "--format", "json"]).stdout) as {
      files: { points: { sweep: unknown[] | null }[] }[];
    };
    const points = files.flatMap((file) => file.points);
    const rows = points.reduce((sum, { sweep }) => sum + (sweep?.length ?? 1), 0);
    expect(rows).toBeGreaterThan(points.length);
    const lines = plumbline(["points", "demo", "--format", "csv"]).stdout.trimEnd().split("\r\n");
    expect(lines[0]).toMatch(/^path,line,.*speed\.cas_kt.*,caution$/);
    expect(lines).toHaveLength(1 + rows);
    for (const line of lines.slice(1)) expect(line).toContain("planning aid");
  });

  it("prints a Markdown table", () => {
    expect(plumbline(["points", "demo/winter-shuttle.plumb", "--format", "markdown"]).stdout).toMatch(
      /^## demo\/winter-shuttle\.plumb\n\n\| line \| phase \|/,
    );
  });
});

describe("plumbline compare", () => {
  it("says of the demo's two issues what it is kept as", () => {
    const args = ["compare", "demo/night-mail-1.plumb", "demo/night-mail-2.plumb", "--today", "2026-12-01"];
    expect(plumbline(args).stdout).toBe(readFileSync(join(root, "test/examples/demo.compare.txt"), "utf8"));
  });

  const older = `${card}\n${point}`;
  const newer = older.replace("stall 95 kt", "stall 96 kt").replace("phase cruise", "phase cruise; bank 40");
  let revisions = "";
  let months = "";
  beforeAll(() => {
    revisions = mkdtempSync(join(tmpdir(), "plumbline-revisions-"));
    months = mkdtempSync(join(tmpdir(), "plumbline-months-"));
    writeFileSync(join(revisions, "older.plumb"), older);
    writeFileSync(join(revisions, "newer.plumb"), newer);
    mkdirSync(join(months, "march"));
    writeFileSync(join(months, "march", "cards.plumb"), card.replace("stall 95 kt", "stall 90 kt"));
    writeFileSync(join(months, "march", "note.plumb"), point);
    mkdirSync(join(months, "april"));
    writeFileSync(join(months, "april", "cards.plumb"), card);
    writeFileSync(join(months, "april", "note.plumb"), point);
  });
  afterAll(() => {
    for (const one of [revisions, months]) rmSync(one, { recursive: true });
  });
  const compared = (...args: string[]) => plumbline(["compare", ...args], { cwd: revisions });

  it("prints what changed with the caution, in every format, and ends with 0", () => {
    for (const format of ["table", "markdown", "json"]) {
      const { status, stdout } = compared("older.plumb", "newer.plumb", "--format", format);
      expect(status).toBe(0);
      expect(stdout).toContain("not approved data");
      expect(stdout).toContain("bank-over-limit");
      // The two revisions define the same card, and neither is told that it is there twice.
      expect(stdout).not.toContain("duplicate-name");
    }
    const json = JSON.parse(compared("older.plumb", "newer.plumb", "--format", "json").stdout);
    expect(json).toMatchObject({
      schema: 1,
      same: false,
      old: { path: "older.plumb" },
      new: { path: "newer.plumb" },
    });
    expect(json.definitions).toMatchObject([{ kind: "card", name: "wheatear-9", change: "changed" }]);
    expect(json.points).toMatchObject([{ change: "changed", inputs: [{ keyword: "bank", old: null }] }]);
  });

  it("writes where it is told, and has an exit code for the new note's findings", () => {
    const out = join(revisions, "out.md");
    const { stdout } = compared("older.plumb", "newer.plumb", "--format", "markdown", "-o", out);
    expect(stdout).toBe("");
    expect(readFileSync(out, "utf8")).toMatch(/^# older\.plumb compared with newer\.plumb\n/);
    expect(compared("older.plumb", "newer.plumb", "--fail-on", "error").status).toBe(1);
    expect(compared("newer.plumb", "older.plumb", "--fail-on", "error").status).toBe(0);
  });

  it("takes one revision from standard input, as an older text of the other", () => {
    const args = ["compare", "-", "newer.plumb", "--format", "json"];
    const { stdout } = plumbline(args, { cwd: revisions, input: newer.replace("bank 40", "bank 20") });
    const json = JSON.parse(stdout);
    expect(json.old.path).toBe("newer.plumb");
    expect(json.points[0].inputs[0].old.text).toBe("bank 20");
  });

  it("gives each revision the cards of its own folder, and of its own root", () => {
    const json = (...args: string[]) =>
      JSON.parse(plumbline(["compare", ...args, "--format", "json"], { cwd: months }).stdout);
    const stall = (compared: ReturnType<typeof json>, side: "old" | "new") =>
      compared.definitions[0].clauses[0][side].text;
    const own = json("march/note.plumb", "april/note.plumb");
    expect([stall(own, "old"), stall(own, "new")]).toEqual([
      "config clean stall 90 kt",
      "config clean stall 95 kt",
    ]);
    expect(own.points).toMatchObject([{ inputs: [], because: ["the card wheatear-9"] }]);
    writeFileSync(join(months, "note.plumb"), point);
    const roots = json("note.plumb", "april/note.plumb", "--old-root", "march");
    expect([stall(roots, "old"), stall(roots, "new")]).toEqual([stall(own, "old"), stall(own, "new")]);
    const back = json("april/note.plumb", "note.plumb", "--new-root", "march");
    expect([stall(back, "old"), stall(back, "new")]).toEqual([stall(own, "new"), stall(own, "old")]);
    // Both months lie under the one root that the note in the middle has, and so does either card.
    const twice = json("note.plumb", "note.plumb");
    expect(twice.new).toMatchObject({ withoutFigures: 1, withheldBy: ["duplicate-name"] });
  });

  it.each([
    [["older.plumb"], "missing required argument 'new'"],
    [["older.plumb", "nothing.plumb"], "There is no file or folder nothing.plumb."],
    [["older.plumb", "."], ". is a folder: compare takes two notes, so name the file in it."],
    [["-", "-"], "Only one of the two revisions can come from standard input."],
    [["older.plumb", "newer.plumb", "--old-root", "nowhere"], "There is no file or folder"],
  ])("refuses %j with one clear line and 2", (args, message) => {
    const { status, stdout, stderr } = compared(...args);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toContain(message);
  });
});

describe("plumbline format", () => {
  it("lays out files in place, tells with --check, and touches no error", () => {
    const file = join(folder, "loose.plumb");
    writeFileSync(file, "|weight 5t ;\r\n\r\n| weight  5\r\n");
    expect(plumbline(["format", file, "--check"])).toMatchObject({
      status: 1,
      stdout: expect.stringMatching(/:1 {2}\| weight 5 t\n$/),
    });
    expect(readFileSync(file, "utf8")).toBe("|weight 5t ;\r\n\r\n| weight  5\r\n");
    expect(plumbline(["format", file]).status).toBe(0);
    expect(readFileSync(file, "utf8")).toBe("| weight 5 t\r\n\r\n| weight  5\r\n");
    expect(plumbline(["format", file, "--check"]).status).toBe(0);
  });

  it("lays out what a link points to, and leaves the link one", () => {
    const file = join(folder, "linked.plumb");
    const link = join(folder, "link.plumb");
    writeFileSync(file, "|isa+3\n");
    symlinkSync(file, link);
    expect(plumbline(["format", link]).status).toBe(0);
    expect(readFileSync(file, "utf8")).toBe("| isa +3\n");
    expect(lstatSync(link).isSymbolicLink()).toBe(true);
    rmSync(link);
  });

  it("reads standard input and writes standard output", () => {
    expect(plumbline(["format", "-"], { input: "|isa+3;", cwd: folder }).stdout).toBe("| isa +3");
  });
});

describe("plumbline explain", () => {
  it("prints the page of a finding, and the nearest of one that is none", () => {
    expect(plumbline(["explain", "stalled"]).stdout).toMatch(/^# stalled: stalled\n/);
    const { status, stderr } = plumbline(["explain", "bank-over-limits"]);
    expect([status, stderr]).toEqual([
      2,
      "plumbline: There is no finding bank-over-limits; did you mean bank-over-limit?\n",
    ]);
  });
});

describe("plumbline explain without a code", () => {
  it("lists every code with its title", () => {
    const { status, stdout } = plumbline(["explain"]);
    expect(status).toBe(0);
    const lines = stdout.trimEnd().split("\n");
    expect(lines.map((line) => line.split(/\s+/)[0])).toEqual(Object.keys(catalogue));
    expect(lines).toContainEqual(expect.stringMatching(/^bank-over-limit +more bank than the limits allow$/));
  });
});

describe("bad input ends with code 2 and one clear line", () => {
  it.each([
    [["check", "no-such-file.plumb"], /^plumbline: There is no file or folder no-such-file\.plumb\.\n$/],
    [["check", "--format", "yaml"], /Allowed choices are text, json, sarif/],
    [["chek"], /^plumbline: There is no command and no .* chek; did you mean the command check\?\n$/],
    [["check", "chek"], /^plumbline: There is no file or folder chek\.\n$/],
    [["explain", "nowhere-near"], /^plumbline: There is no finding nowhere-near: `plumbline explain` lists/],
    [["check", ""], /^plumbline: An empty path names no file and no folder/],
    [["--nonsense"], /unknown option '--nonsense'/],
    [["check", "demo", "--today", "2026-02-30"], /It is a day such as 2026-03-01/],
    [["check", "demo", "--today", "2026-13-01"], /It is a day such as 2026-03-01/],
    [["check", "demo", "-o", "/no/such/folder/x"], /cannot be written/],
    [["format", "demo", "-o", "x"], /-o is for what is laid out from standard input alone/],
  ])("%j", (args, message) => {
    const { status, stderr } = plumbline(args as string[]);
    expect(stderr).toMatch(message as RegExp);
    expect(status).toBe(2);
  });

  it("a folder without notes, a file that is not UTF-8, and standard input that is not", () => {
    const empty = mkdtempSync(join(tmpdir(), "plumbline-empty-"));
    expect(plumbline(["check", "."], { cwd: empty })).toMatchObject({
      status: 2,
      stderr: expect.stringContaining("There is no note in ."),
    });
    writeFileSync(join(empty, "bytes.plumb"), Buffer.from([0x7c, 0xff, 0xfe]));
    expect(plumbline(["check", "."], { cwd: empty })).toMatchObject({
      status: 2,
      stderr: expect.stringContaining("is not UTF-8"),
    });
    expect(plumbline(["check", "-"], { cwd: folder, input: Buffer.from([0x7c, 0xff]) })).toMatchObject({
      status: 2,
      stderr: expect.stringContaining("not UTF-8"),
    });
    rmSync(empty, { recursive: true });
  });

  it("never writes a result over a note that it read, by whatever name", () => {
    const place = mkdtempSync(join(tmpdir(), "plumbline-over-"));
    const note = join(place, "note.plumb");
    writeFileSync(note, `${card}\n${point}`);
    symlinkSync(note, join(place, "out.txt"));
    for (const args of [
      ["check", "note.plumb", "-o", "note.plumb"],
      ["points", "-", "-o", "./note.plumb"],
      ["compare", "-", "note.plumb", "-o", "out.txt"],
    ]) {
      const { status, stderr } = plumbline(args, { cwd: place, input: point });
      expect(stderr).toContain("is a note that is read here, so it is not written over: name another file.");
      expect(status).toBe(2);
      expect(readFileSync(note, "utf8")).toBe(`${card}\n${point}`);
    }
    rmSync(place, { recursive: true });
  });

  it("no control character of a note or a file's name reaches the terminal", () => {
    const odd = mkdtempSync(join(tmpdir(), "plumbline-odd-"));
    const name = "a\u001b[31mb.plumb";
    writeFileSync(join(odd, name), `${card}\n${point}\n| phase climb "x\u001b[2Jy"; bank 40\n\n|isa +3\n`);
    const runs = [["check"], ["points"], ["points", "--format", "markdown"], ["check", "--format", "github"]];
    for (const args of [...runs, ["format", "--check"], ["compare", name, name], ["check", `${name}x`]]) {
      const { stdout, stderr } = plumbline(args, { cwd: odd });
      expect(stdout + stderr).toContain("\ufffd");
      expect(stdout + stderr).not.toContain("\u001b");
    }
    rmSync(odd, { recursive: true });
  });

  it("a million characters on one line are a finding, not a crash", () => {
    const { status } = plumbline(["check", "-", "--quiet"], {
      input: `| ${"bank 25; ".repeat(1000)}${"x".repeat(1_000_000)}`,
      cwd: folder,
    });
    expect(status).toBe(1);
  });
});

describe("discovery", () => {
  it("leaves out what .gitignore leaves out, nested too, and reads what is named", () => {
    const place = mkdtempSync(join(tmpdir(), "plumbline-git-"));
    const put = (name: string, text: string) => writeFileSync(join(place, name), text);
    spawnSync("mkdir", ["-p", join(place, "sub"), join(place, "node_modules"), join(place, ".git")]);
    put(".gitignore", "secret.plumb\n");
    put("sub/.gitignore", "*.plumb\n!kept.plumb\n");
    for (const name of ["a.plumb", "secret.plumb", "sub/b.plumb", "sub/kept.plumb", "node_modules/c.plumb"])
      put(name, "| weight 5 t\n");
    const paths = (args: string[]) =>
      JSON.parse(plumbline(["check", ...args, "--format", "json"], { cwd: place }).stdout).files.map(
        (one: { path: string }) => one.path,
      );
    expect(paths(["."])).toEqual(["a.plumb", "sub/kept.plumb"]);
    expect(paths(["secret.plumb"])).toEqual(["secret.plumb"]);
    rmSync(place, { recursive: true });
  });

  it("reads more notes than a program may hold open at once", () => {
    const place = mkdtempSync(join(tmpdir(), "plumbline-many-"));
    for (let i = 0; i < 600; i++) writeFileSync(join(place, `${i}.plumb`), "| weight 5 t\n");
    const { status, stderr } = spawnSync(
      "sh",
      ["-c", `ulimit -n 128; "${process.execPath}" "${join(root, bin)}"`],
      {
        cwd: place,
        encoding: "utf8",
      },
    );
    expect(stderr).toContain("Nothing found in 600 notes.");
    expect(status).toBe(0);
    rmSync(place, { recursive: true });
  });
});

describe("npm start's tour", () => {
  it("shows each note with its hints beside the lines, the findings, and what to do next", () => {
    const { status, stdout } = plumbline(["tour", "demo"]);
    expect(status).toBe(0);
    expect(stdout).toMatch(/\| phase departure "Noise turn" ≈ margin 1\.\d\d, ratio 1\.\d\d/);
    expect(stdout).toContain("What to do next");
    expect(stdout).toContain("Not for use in flight");
  });
});
