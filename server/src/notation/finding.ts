import type { Span } from "./span.ts";

/** A replacement on a line counted from the first line of the block (of the document, where a finding has no block). */
export interface Edit extends Span {
  readonly line: number;
  readonly newText: string;
  /** True where the replacement also takes the end of the line that `line` names. */
  readonly wholeLine?: boolean;
}

/** A way out that the editor offers. It never writes a figure that the author did not give. */
export interface Fix {
  readonly title: string;
  readonly edits: readonly Edit[];
  readonly preferred?: boolean;
}

/** The findings that the text alone can give. */
export type TextCode =
  | "unknown-keyword"
  | "unexpected-text"
  | "missing-argument"
  | "bad-quantity"
  | "separator"
  | "ambiguous-number"
  | "missing-unit"
  | "wrong-unit"
  | "duplicate-clause"
  | "misplaced-clause"
  | "unclosed-remark"
  | "unclosed-title"
  | "remark-not-read"
  | "unknown-phase"
  | "unknown-result"
  | "unknown-code"
  | "bad-table"
  | "two-unknowns"
  | "two-sweeps"
  | "point-needs-phase"
  | "missing-bar"
  | "no-bar-lines"
  | "unclosed-fence";

export interface TextFinding {
  readonly code: TextCode;
  /** Counted from the first line of the block, or of the document where the finding has no block. */
  readonly line: number;
  readonly span: Span;
  /** One plain sentence with the way out. */
  readonly message: string;
  readonly fixes: readonly Fix[];
}
