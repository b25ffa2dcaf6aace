import { findings, generateNote } from "./generateNote.mjs";
import { median, timed } from "./median.mjs";
import { scan } from "./scan.mjs";

/**
 * Median ms, warm and in this process: one `scan` of a note's text, `parse`, `evaluate` (what `check` takes
 * beyond `parse`) and `check`.
 */
export function measureInProcess(lines, { parse, check }, repetitions) {
  const text = generateNote(lines);
  const timings = { scan: [], parse: [], check: [] };
  for (let turn = -Math.ceil(repetitions / 2); turn < repetitions; turn++) {
    let found = 0;
    const scanned = timed(() => scan(text));
    const parsed = timed(() => parse(text));
    const checked = timed(() => {
      found = check(text);
    });
    if (found !== findings) throw new Error(`Wrong answer: ${found} findings where ${findings} are due.`);
    if (turn < 0) continue;
    timings.scan.push(scanned);
    timings.parse.push(parsed);
    timings.check.push(checked);
  }
  const [scanMs, parseMs, checkMs] = [timings.scan, timings.parse, timings.check].map(median);
  return { scan: scanMs, parse: parseMs, evaluate: Math.max(0, checkMs - parseMs), check: checkMs };
}
