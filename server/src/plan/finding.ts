import type { Fix } from "../notation/finding.ts";
import type { Span } from "../notation/span.ts";
import type { FindingCode } from "./findings.ts";
import type { Origin } from "./origin.ts";

export type Severity = "error" | "warning" | "information" | "hint";

export interface Related {
  readonly origin: Origin;
  readonly message: string;
}

/** A place that a message names by its line, from 0: lines above come and go, and then it has to be written anew. */
export interface Mention {
  readonly origin: Origin;
  readonly line: number;
}

/** A finding of a block; `line` counts from the block's first line (from the document's where it has none). */
export interface Finding {
  readonly code: FindingCode;
  readonly severity: Severity;
  readonly line: number;
  readonly span: Span;
  /** One plain sentence with both figures and the way out. */
  readonly message: string;
  readonly related: readonly Related[];
  readonly fixes: readonly Fix[];
  /** What was held against a bound, at its worst corner, SI, where the code has a figure that can be accepted. */
  readonly figure?: number;
  /** The lines that the message names, each as it was when the message was written. */
  readonly mentions?: readonly Mention[];
  /** The row that is broken, as it is written. */
  readonly rule?: string;
  /** Who took it, and why; null or absent where nobody did. */
  readonly accepted?: Acceptance | null;
  /** True where the note says that it is meant to come. */
  readonly expected?: boolean;
}

/** What an `accept` clause says, with its figure as it is written. */
export type Acceptance = {
  readonly code: FindingCode;
  readonly to: string | null;
  readonly because: string;
  readonly by: string | null;
  readonly until: string | null;
};
