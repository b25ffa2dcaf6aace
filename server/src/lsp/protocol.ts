import type { FileJson } from "../report/pointsJson.ts";

/** `plumbline/points`: every computed value of a note, as `plumbline points --format json` prints it. */
export const pointsRequest = "plumbline/points";

export interface PointsParams {
  readonly textDocument: { readonly uri: string };
}

export type PointsAnswer = FileJson | null;

/** `plumbline/compare`: what changed in a note since an older text of it. */
export const compareRequest = "plumbline/compare";

export interface CompareParams {
  readonly textDocument: { readonly uri: string };
  readonly oldText: string;
  /** How the older text is spoken of. */
  readonly oldName: string;
  /** Other notes of the folder as they were then, for their cards and limits; null where there was none. Those not named are taken as they are. */
  readonly others: readonly { readonly uri: string; readonly text: string | null }[];
}

/** Null for a note that the server does not know. */
export type CompareAnswer = {
  /** True where nothing of the plan changed. */
  readonly same: boolean;
  /** What `plumbline compare --format markdown` prints. */
  readonly markdown: string;
} | null;
