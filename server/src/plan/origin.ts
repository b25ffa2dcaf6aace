import type { Block } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";

/**
 * Where something was written. It holds the block, never a line number: lines above come and go,
 * and the block knows where it starts now.
 */
export interface Origin {
  readonly uri: string;
  readonly block: Block;
  /** Counted from the block's first line. */
  readonly line: number;
  readonly span: Span;
}

/** The line of the file, from 0, at this moment. */
export function lineOf(origin: Origin): number {
  return origin.block.start + origin.line;
}
