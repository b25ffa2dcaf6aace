// Emacs with eglot: its client takes diagnostics that are pushed and holds an edit to the version it was made for.
import { spawnSync } from "node:child_process";
import { resolve } from "node:path";
import { driveEditor } from "./driveEditor.mjs";

/** An Emacs before 29 has eglot as a package of its own. */
function needsEglot() {
  const loads = ["--batch", "-f", "package-initialize", "--eval", "(require 'eglot)"];
  if (spawnSync("emacs", loads).status !== 0)
    throw new Error("This Emacs has no eglot: install Debian's package elpa-eglot, then run this again.");
}

driveEditor({
  name: "emacs",
  command: "emacs",
  package: "packages emacs-nox and elpa-eglot",
  language: "elisp",
  before: needsEglot,
  args: ["--batch", "-f", "package-initialize", "-l", resolve("test/editor/emacs/suite.el")],
});
