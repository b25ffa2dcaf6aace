import type { Fix } from "../notation/finding.ts";
import type { Span } from "../notation/span.ts";
import type { FindingCode } from "./findings.ts";
import type { Origin } from "./origin.ts";

export type Severity = "error" | "warning" | "information" | "hint";

export interface Related {
  readonly origin: Origin;
  readonly message: string;
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
}
