/**
 * The edits that are timed, in the middle of a note: each a change and the change that takes it back, as
 * `textDocument/didChange` has them. `limit` is no timed one: it breaks the bank limit, one finding more.
 */
export function edits(text) {
  const lines = text.split("\n");
  const middle = Math.floor(lines.length / 2);
  const find = (from, pattern) => lines.findIndex((line, at) => from <= at && pattern.test(line));
  const bankLine = find(middle, /^\| bank 12 (left|right)$/);
  // The first burn after a weight, which reaches all points up to the next weight.
  const burnLine = find(Math.max(middle, find(middle, /; weight /)), /; burn \d+ kg$/);
  const bankAt = "| bank ".length;
  const burnAt = lines[burnLine].lastIndexOf(" kg") - 1;
  const burnDigit = lines[burnLine][burnAt];
  return {
    bank: digit(bankLine, bankAt + 1, "2", "4"),
    line: {
      change: replacement(bankLine, 0, bankLine, 0, "|\n"),
      back: replacement(bankLine, 0, bankLine + 1, 0, ""),
    },
    burn: digit(burnLine, burnAt, burnDigit, burnDigit === "9" ? "8" : String(Number(burnDigit) + 1)),
    limit: digit(bankLine, bankAt, "1", "3"),
    // Ten keystrokes of which only the last leaves a bank over the limit: an answer for an older text shows.
    burst: [..."2121212123"].map((to) => replacement(bankLine, bankAt, bankLine, bankAt + 1, to)),
  };
}

function digit(line, character, from, to) {
  return {
    change: replacement(line, character, line, character + 1, to),
    back: replacement(line, character, line, character + 1, from),
  };
}

function replacement(startLine, startCharacter, endLine, endCharacter, text) {
  const start = { line: startLine, character: startCharacter };
  const end = { line: endLine, character: endCharacter };
  return { range: { start, end }, text };
}
