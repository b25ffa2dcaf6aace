import type { Block } from "./block.ts";
import type { TextFinding } from "./finding.ts";

export type Flavour = "plumb" | "markdown";

/** Which blocks an edit replaced: `removed` of them from index `from` on, by `added` new ones. */
export interface BlockChange {
  readonly from: number;
  readonly removed: number;
  readonly added: number;
}

export interface Position {
  readonly line: number;
  readonly character: number;
}

/**
 * The text of a note as lines and blocks, changed in place. An edit costs the lines it touches and
 * the blocks next to it; other lines and blocks stay the same objects.
 */
export interface Document {
  readonly flavour: Flavour;
  readonly lineCount: number;
  /** How the first line ends, for lines that are added; "\n" where no line has ended yet. */
  readonly lineEnd: string;
  /** Without the line's end. */
  lineText(line: number): string;
  /** What the line is, for folding and completion; "plumb-fence" are the fence's own two lines. */
  lineKind(line: number): "bar" | "prose" | "fence" | "plumb-fence" | "table" | "front-matter";
  readonly blocks: readonly Block[];
  /** The block that holds the line, if it is a bar line. */
  blockAt(line: number): Block | null;
  /** `missing-bar`, `no-bar-lines`, `unclosed-fence`: their lines count from the document's start. */
  readonly findings: readonly TextFinding[];
  /** Replaces the text between two positions (UTF-16); positions beyond the text are brought to its edge. */
  edit(start: Position, end: Position, newText: string): BlockChange;
  /** The whole text, with its line ends as they are. */
  text(): string;
}
