import ignore from "ignore";

/**
 * Tells whether a path, relative to the folder and with `/`, is left out by patterns as `.gitignore` writes
 * them. What lies above the folder never is.
 */
export function excluded(patterns: readonly string[]): (path: string) => boolean {
  if (patterns.length === 0) return () => false;
  const matcher = ignore().add([...patterns]);
  return (path) => ignore.isPathValid(path) && matcher.ignores(path);
}
