import type { Span } from "./span.ts";

/**
 * What a stretch of a bar line is. Every character of the line belongs to exactly one token,
 * so that the tokens, joined, are the line.
 */
export type TokenKind =
  | "indent"
  | "bar"
  | "separator"
  | "comma"
  | "blank"
  | "keyword"
  | "word" // a word of a closed list: a phase, a speed name, `left`, `to`, `by`, `when` …
  | "name"
  | "number"
  | "unit"
  | "sign" // + - of a speed expression or of a number, and +-
  | "unknown" // ?
  | "title"
  | "remark"
  | "slip" // a `,` `:` or `=` where none belongs, told once as `separator`
  | "unread"; // text that no rule could take, told by a finding

export interface Token extends Span {
  readonly kind: TokenKind;
}
