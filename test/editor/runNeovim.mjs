// Drives Debian's Neovim headless against the built server: an editor whose client pushes diagnostics, knows
// no hints and few capabilities. Ends non-zero with what failed.
import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";

const LONGEST = 120_000;
const found = spawnSync("nvim", ["--version"], { encoding: "utf8" });
if (found.error) {
  console.error("There is no nvim here: install Debian's package neovim, then run this again.");
  process.exit(1);
}
console.log(found.stdout.split("\n")[0]);

const root = mkdtempSync(join(tmpdir(), "plumbline-neovim-"));
try {
  cpSync("demo", join(root, "demo"), { recursive: true });
  // As `npm link` does it: the set-up of the README finds the command on the path.
  mkdirSync(join(root, "bin"));
  writeFileSync(
    join(root, "bin/plumbline"),
    `#!/bin/sh\nexec "${process.execPath}" "${resolve("dist/server/cli.cjs")}" "$@"\n`,
    { mode: 0o755 },
  );
  const setUps = [...readFileSync("README.md", "utf8").matchAll(/```lua\n([\s\S]*?)```/g)].map(
    ([, text]) => text,
  );
  writeFileSync(join(root, "setup.lua"), setUps[0]);
  // What this version cannot run it can still read.
  for (const [i, text] of setUps.entries()) {
    writeFileSync(join(root, `read-${i}.lua`), text);
    const read = spawnSync(
      "nvim",
      ["--headless", "--clean", "-c", `lua assert(loadfile("${root}/read-${i}.lua"))`, "-c", "qall!"],
      { encoding: "utf8" },
    );
    if (/E\d+|Error/.test(read.stderr)) throw new Error(`A set-up in the README is not Lua: ${read.stderr}`);
  }
  const { status, stdout, stderr } = spawnSync(
    "nvim",
    [
      "--headless",
      "--clean",
      "-u",
      "NONE",
      "--cmd",
      "set noswapfile",
      "-S",
      resolve("test/editor/neovim/suite.lua"),
    ],
    {
      cwd: join(root, "demo"),
      encoding: "utf8",
      timeout: LONGEST,
      env: {
        ...process.env,
        HOME: root,
        PATH: `${join(root, "bin")}:${process.env.PATH}`,
        PLUMBLINE_SETUP: join(root, "setup.lua"),
      },
    },
  );
  const told = `${stdout}${stderr}`;
  process.stdout.write(told.endsWith("\n") ? told : `${told}\n`);
  const counts = /neovim: (\d+) passed, (\d+) failed/.exec(told);
  if (!counts) console.error("Neovim ended before its suite did.");
  const failed = counts ? Number(counts[2]) : 1;
  mkdirSync("out/editor", { recursive: true });
  writeFileSync("out/editor/neovim.json", JSON.stringify({ passed: counts ? Number(counts[1]) : 0, failed }));
  process.exitCode = status === 0 && failed === 0 ? 0 : 1;
} finally {
  rmSync(root, { recursive: true, force: true });
}
