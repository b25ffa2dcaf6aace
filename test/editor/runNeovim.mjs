// Neovim: its client takes diagnostics that are pushed, knows no hints and few capabilities.
import { spawnSync } from "node:child_process";
import { resolve } from "node:path";
import { driveEditor } from "./driveEditor.mjs";

/** What Debian's version cannot run it can still read. */
function readAll(paths) {
  for (const path of paths) {
    const { stderr } = spawnSync(
      "nvim",
      ["--headless", "--clean", "-c", `lua assert(loadfile("${path}"))`, "-c", "qall!"],
      { encoding: "utf8" },
    );
    if (/E\d+|Error/.test(stderr)) throw new Error(`A set-up in the README is not Lua: ${stderr}`);
  }
}

driveEditor({
  name: "neovim",
  command: "nvim",
  package: "package neovim",
  language: "lua",
  before: readAll,
  args: [
    ...["--headless", "--clean", "-u", "NONE", "--cmd", "set noswapfile"],
    ...["-S", resolve("test/editor/neovim/suite.lua")],
  ],
});
