// Drives an editor of the terminal headless against the built server, with the set-up that the README gives.
import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";

const LONGEST = 120_000;

/**
 * Runs a suite inside an editor, over a copy of the demo. The first set-up in the language is the one that
 * is run. What fails is told, and makes the exit code 1.
 * @param {{ name: string, command: string, package: string, language: string,
 *   args: string[], before?: (setUps: string[]) => void }} editor `before` is given the files of all set-ups
 */
export function driveEditor(editor) {
  const found = spawnSync(editor.command, ["--version"], { encoding: "utf8" });
  if (found.error) {
    console.error(
      `There is no ${editor.command} here: install Debian's ${editor.package}, then run this again.`,
    );
    process.exit(1);
  }
  console.log(found.stdout.split("\n")[0]);
  const kept = `out/editor/${editor.name}.json`;
  mkdirSync("out/editor", { recursive: true });
  // What an earlier run left must not pass for this one's.
  rmSync(kept, { force: true });
  const root = mkdtempSync(join(tmpdir(), `plumbline-${editor.name}-`));
  try {
    cpSync("demo", join(root, "demo"), { recursive: true });
    commandOnThePath(root);
    const paths = setUps(root, editor.language);
    editor.before?.(paths);
    const { status, stdout, stderr } = spawnSync(editor.command, editor.args, {
      cwd: join(root, "demo"),
      encoding: "utf8",
      timeout: LONGEST,
      env: {
        ...process.env,
        HOME: root,
        // Else the letters of a note are bytes to an editor that is started without a language.
        LC_ALL: "C.UTF-8",
        PATH: `${join(root, "bin")}:${process.env.PATH}`,
        PLUMBLINE_SETUP: paths[0],
      },
    });
    const told = `${stdout}${stderr}`;
    const counts = new RegExp(`${editor.name}: (\\d+) passed, (\\d+) failed`).exec(told);
    if (!counts) console.error(`${editor.command} ended before its suite did.`);
    const failed = counts ? Number(counts[2]) : 1;
    writeFileSync(kept, JSON.stringify({ passed: counts ? Number(counts[1]) : 0, failed }));
    process.exitCode = status === 0 && failed === 0 ? 0 : 1;
    // What an editor chats of beside its suite is of use only where something failed.
    console.log((process.exitCode === 0 ? told.replace(/^(?! {2}ok|\w+: \d).*\n?/gm, "") : told).trimEnd());
  } finally {
    rmSync(root, { recursive: true, force: true });
  }
}

/** As `npm link` does it: the set-ups of the README find the command on the path. */
function commandOnThePath(root) {
  mkdirSync(join(root, "bin"));
  const script = `#!/bin/sh\nexec "${process.execPath}" "${resolve("dist/server/cli.cjs")}" "$@"\n`;
  writeFileSync(join(root, "bin/plumbline"), script, { mode: 0o755 });
}

function setUps(root, language) {
  const fences = readFileSync("README.md", "utf8").matchAll(
    new RegExp(`\`\`\`${language}\\n([\\s\\S]*?)\`\`\``, "g"),
  );
  return [...fences].map(([, text], i) => {
    const path = join(root, `set-up-${i}`);
    writeFileSync(path, text);
    return path;
  });
}
