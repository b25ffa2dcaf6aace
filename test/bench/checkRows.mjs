import { measureCheck } from "./measureCheck.mjs";
import { atLeast, single } from "./rows.mjs";

/** `plumbline check` in fresh processes, on the longest note. */
export function checkRows({ lengths, commandLine, smoke, standIn }) {
  if (standIn) return [];
  const lines = lengths.at(-1);
  const { linesPerSecond, long, short } = measureCheck(lines, commandLine, smoke ? 2 : 9);
  const aims = smoke ? [] : [atLeast(linesPerSecond, 300_000, "300,000 lines/s")];
  return [
    { measure: `plumbline check, a fresh process each time, ${lines.toLocaleString("en-US")} lines` },
    single("the whole run", long),
    single("the same with 100 lines: the start-up", short),
    single("lines a second, start-up left out", linesPerSecond, { unit: "lines/s", aims }),
  ];
}
