/** A stretch of one line, in UTF-16 code units from the line's start; `end` is exclusive. */
export interface Span {
  readonly start: number;
  readonly end: number;
}
