import ignore from "ignore";
import { patterns } from "./patterns.ts";

/**
 * Tells whether a path, relative to the folder and with `/`, is left out by patterns as `.gitignore` writes
 * them. What lies above the folder never is.
 */
export function excluded(lines: readonly string[]): (path: string) => boolean {
  if (lines.length === 0) return () => false;
  const matcher = patterns(lines);
  return (path) => ignore.isPathValid(path) && matcher.ignores(path);
}
