import ignore, { type Ignore } from "ignore";

/**
 * Patterns as `.gitignore` writes them. Capitals count, as Git has it where file names tell them apart;
 * elsewhere a note is rather read than left out unseen.
 */
export function patterns(lines: string | readonly string[]): Ignore {
  return ignore({ ignorecase: false }).add(lines);
}
