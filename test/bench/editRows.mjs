import { measureEdits } from "./measureEdits.mjs";
import { atMost, compared } from "./rows.mjs";

/** Edits over stdio, at every length. */
export async function editRows(bench) {
  const rows = [];
  const reached = new Map();
  for (const lines of bench.lengths) {
    const repetitions = bench.smoke ? 10 : lines < 50_000 ? 200 : 100;
    const timings = await measureEdits(lines, { ...bench, repetitions });
    const far = await measureEdits(lines, {
      ...bench,
      repetitions: Math.ceil(repetitions / 10),
      restated: false,
      only: ["burn"],
    });
    reached.set(lines, timings);
    rows.push({ measure: `${named(lines)} lines over stdio, answers of ${timings.payload} bytes` });
    rows.push(compared("opened, first diagnostics and hints (once)", timings.open.ours, timings.open.echo));
    rows.push(
      edit("a digit of a bank, diagnostics and 60 lines of hints", timings.bank, reached, lines, "bank"),
    );
    rows.push(edit("a line inserted, the same", timings.line, reached, lines, "line"));
    rows.push(compared("a burn that reaches nine points", timings.burn.ours, timings.burn.echo));
    rows.push(compared("a burn that reaches all points below", far.burn.ours, far.burn.echo));
    rows.push(burst("ten keystrokes, asked at the end", timings.burst, timings.bank));
    // What the library takes for so many messages shows in the echo server's figure, then the aim's own comparison.
    const each = "ten keystrokes, each asked, the overtaken cancelled";
    rows.push(compared(each, timings.askedBurst.ours, timings.askedBurst.echo));
    rows.push(burst("the same", timings.askedBurst, timings.bank));
  }
  return rows;
}

const named = (lines) => lines.toLocaleString("en-US");

/** The aims stand at two lengths: in ms and against the echo server at one, against that one at the longest. */
function edit(measure, { ours, echo }, reached, lines, kind) {
  const aims = [];
  if (lines === 10_000) {
    aims.push(atMost(ours, 3, "3 ms"), atMost(ours / echo, 2.5, "2.5 times echo"));
  }
  const before = reached.get(10_000)?.[kind].ours;
  if (lines === 50_000 && before) aims.push(atMost(ours / before, 1.5, "1.5 times 10,000 lines"));
  return compared(measure, ours, echo, { aims });
}

/** Against one edit of the same server. The answer for the last text is checked where it is measured. */
function burst(measure, { ours }, one) {
  const aims = [atMost(ours / one.ours, 2, "twice one edit")];
  return compared(measure, ours, one.ours, { against: "one edit", aims });
}
