import { existsSync, readFileSync } from "node:fs";
import { edits } from "./edits.mjs";
import { generateNote } from "./generateNote.mjs";
import { initialize } from "./initialize.mjs";
import { session } from "./session.mjs";
import { startServer } from "./startServer.mjs";

/** The most memory in MB a fresh server took to open a note and take 40 edits of it; null where it cannot be read. */
export async function measureMemory(lines, command, standIn) {
  const text = generateNote(lines);
  const at = edits(text);
  const server = startServer(...command);
  try {
    await initialize(server);
    if (standIn) server.notify("bench/answers", standIn);
    const note = session(server, text);
    await note.open(at.bank.change.range.start.line);
    for (let turn = 0; turn < 10; turn++) {
      for (const { change, back } of [at.bank, at.line]) {
        await note.edit(change);
        await note.edit(back);
      }
    }
    return peak(server.pid);
  } finally {
    await server.stop();
  }
}

/** Linux keeps a process's greatest resident size as `VmHWM`, in units of 1024 bytes. */
function peak(pid) {
  const file = `/proc/${pid}/status`;
  if (!existsSync(file)) return null;
  const kibibytes = /^VmHWM:\s*(\d+) kB$/m.exec(readFileSync(file, "utf8"))?.[1];
  return kibibytes === undefined ? null : (Number(kibibytes) * 1024) / 1e6;
}
