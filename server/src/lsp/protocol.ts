import type { FileJson } from "../report/pointsJson.ts";

/** `plumbline/points`: every computed value of a note, as `plumbline points --format json` prints it. */
export const pointsRequest = "plumbline/points";

export interface PointsParams {
  readonly textDocument: { readonly uri: string };
}

export type PointsAnswer = FileJson | null;
