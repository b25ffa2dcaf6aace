import type { BarLine } from "./tree.ts";

/** The line that a tree was made from: its tokens, joined. */
export function print(line: BarLine): string {
  return line.tokens.map((token) => line.text.slice(token.start, token.end)).join("");
}
