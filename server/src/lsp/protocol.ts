import type { CopyForm } from "../features/copiedText.ts";
import type { Fences } from "../report/fences.ts";
import type { FileJson } from "../report/pointsJson.ts";

/** `plumbline/points`: every computed value of a note, as `plumbline points --format json` prints it. */
export const pointsRequest = "plumbline/points";

export interface PointsParams {
  readonly textDocument: { readonly uri: string };
}

export type PointsAnswer = FileJson | null;

/** What is asked of one note. */
export interface NoteParams {
  readonly textDocument: { readonly uri: string };
}

/** `plumbline/fences`: the fences of a note that is open, as tables that are ready to be drawn. */
export const fencesRequest = "plumbline/fences";

/** With the version of the text that the figures are for; null where the note is not open. */
export type FencesAnswer = (Fences & { readonly version: number }) | null;

/** `plumbline/figuresChanged`, told to the client: figures of any note may be others now, though its own text is the same. */
export const figuresChangedNotification = "plumbline/figuresChanged";

/** `plumbline/readLine`: what is computed and found on a line, as a sentence; null where the note is not known. */
export const readLineRequest = "plumbline/readLine";

export interface ReadLineParams extends NoteParams {
  /** From 0. */
  readonly line: number;
}

/** `plumbline/copyWithValues`: lines with their values, to be pasted elsewhere; null where the note is not known. */
export const copyWithValuesRequest = "plumbline/copyWithValues";

export interface CopyWithValuesParams extends NoteParams {
  /** The first and the last line, from 0. */
  readonly from: number;
  readonly to: number;
  readonly form: CopyForm;
}
