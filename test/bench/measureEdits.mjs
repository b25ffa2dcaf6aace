import { edits } from "./edits.mjs";
import { generateNote } from "./generateNote.mjs";
import { initialize } from "./initialize.mjs";
import { median } from "./median.mjs";
import { session, verify } from "./session.mjs";
import { startServer } from "./startServer.mjs";

const kinds = ["bank", "line", "burn", "burst", "askedBurst"];

/**
 * Times edits of a note of so many lines, by turns in the measured server and in the echo server, which
 * answers with what the measured one said. Medians in ms: `{ open, bank, line, burn, burst, askedBurst }`,
 * each `{ ours, echo }`, and `payload`, the bytes of the two answers. `standIn` are answers for an echo
 * server in the measured one's place, which are not looked into.
 */
export async function measureEdits(
  lines,
  { subject, echo, standIn, repetitions, restated = true, only = kinds },
) {
  const text = generateNote(lines, { restated });
  const at = edits(text);
  const look = standIn ? () => {} : verify;
  const servers = [startServer(...subject), startServer(...echo)];
  try {
    for (const server of servers) await initialize(server);
    if (standIn) servers[0].notify("bench/answers", standIn);
    const [ours, theirs] = servers.map((server) => session(server, text));
    const line = at.bank.change.range.start.line;
    const opened = await ours.open(line);
    look(opened, `the note of ${lines} lines`);
    servers[1].notify("bench/answers", { diagnostics: opened.diagnostics, hints: opened.hints });
    const result = { payload: bytes(opened.diagnostics) + bytes(opened.hints) };
    result.open = { ours: opened.ms, echo: (await theirs.open(line)).ms };

    // An answer is for the text as it is now: a bank brought over the limit is told, taken back it is not.
    look(await ours.edit(at.limit.change), "a note with one bank more over the limit", 1);
    look(await ours.edit(at.limit.back), "a note with that bank taken back");

    Object.assign(result, await byTurns(ours, theirs, { kinds: only, at, repetitions, look }));
    return result;
  } finally {
    await Promise.all(servers.map((server) => server.stop()));
  }
}

const bytes = (answer) => Buffer.byteLength(JSON.stringify(answer));

/** What is timed, what takes it back untimed, and how many findings stand in between beyond the note's own. */
function timedEdit(kind, at) {
  if (kind === "burst" || kind === "askedBurst") {
    return { change: (to) => to[kind](at.burst), back: (to) => to.edit(at.limit.back), more: 1 };
  }
  return { change: (to) => to.edit(at[kind].change), back: (to) => to.edit(at[kind].back), more: 0 };
}

/**
 * Times the edits of each kind in one server and the other, turn by turn, so that all of them meet the machine
 * and the compiled code in the same state; half as many turns go first unmeasured, to warm both up.
 */
async function byTurns(ours, theirs, { kinds, at, repetitions, look }) {
  const timings = Object.fromEntries(kinds.map((kind) => [kind, { ours: [], echo: [] }]));
  for (let turn = -Math.ceil(repetitions / 2); turn < repetitions; turn++) {
    for (const kind of kinds) {
      const { change, back, more } = timedEdit(kind, at);
      const mine = await change(ours);
      const echoed = await change(theirs);
      look(mine, "an edited note", more);
      look(await back(ours), "a note with its edit taken back");
      await back(theirs);
      if (turn < 0) continue;
      timings[kind].ours.push(mine.ms);
      timings[kind].echo.push(echoed.ms);
    }
  }
  return Object.fromEntries(
    Object.entries(timings).map(([kind, { ours, echo }]) => [
      kind,
      { ours: median(ours), echo: median(echo) },
    ]),
  );
}
