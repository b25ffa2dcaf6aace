import type { TextCode } from "../notation/finding.ts";
import { definitionFindings } from "./findings/definitionFindings.ts";
import type { FindingEntry } from "./findings/entry.ts";
import { notationFindings } from "./findings/notationFindings.ts";
import { planFindings } from "./findings/planFindings.ts";
import { reviewFindings } from "./findings/reviewFindings.ts";

/** Every code that a user can see. */
export type FindingCode =
  | TextCode
  | keyof typeof definitionFindings
  | keyof typeof planFindings
  | keyof typeof reviewFindings;

/**
 * The one catalogue of findings. Their messages are written where they are found, with the figures of
 * the case; everything that is said of a code in general is said here.
 */
export const catalogue: Readonly<Record<FindingCode, FindingEntry>> = {
  ...notationFindings,
  ...definitionFindings,
  ...planFindings,
  ...reviewFindings,
};
