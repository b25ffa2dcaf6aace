import type { Span } from "../notation/span.ts";

/** Something that knows on which line of its file it starts now: a block, or the place that successive versions of a block hold. */
export interface Anchor {
  readonly start: number;
}

/**
 * Where something was written. It holds the block, never a line number: lines above come and go,
 * and the block knows where it starts now.
 */
export interface Origin {
  readonly uri: string;
  readonly block: Anchor;
  /** Counted from the block's first line. */
  readonly line: number;
  readonly span: Span;
}

/** The line of the file, from 0, at this moment. */
export function lineOf(origin: Origin): number {
  return origin.block.start + origin.line;
}

export function sameOrigin(a: Origin, b: Origin): boolean {
  return (
    a === b ||
    (a.block === b.block &&
      a.line === b.line &&
      a.span.start === b.span.start &&
      a.span.end === b.span.end &&
      a.uri === b.uri)
  );
}
