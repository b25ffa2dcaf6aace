import type { FileJson } from "../report/pointsJson.ts";

/** `plumbline/points`: every computed value of a note, as `plumbline points --format json` prints it. */
export const pointsRequest = "plumbline/points";

export interface PointsParams {
  readonly textDocument: { readonly uri: string };
}

export type PointsAnswer = FileJson | null;

/** `plumbline/status`: how many notes of the window are checked, and what was found in them. It has no parameters. */
export const statusRequest = "plumbline/status";

/** `plumbline/statusChanged`, told to a client that says `experimental.plumbline.statusChanged`: a {@link Status}. */
export const statusChangedNotification = "plumbline/statusChanged";

/** What stands in the notes that are checked; while `checking` is true more are to come. */
export interface Status {
  readonly notes: number;
  readonly points: number;
  readonly errors: number;
  readonly warnings: number;
  readonly checking: boolean;
}
