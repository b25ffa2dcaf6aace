import type { CopyForm } from "../features/copiedText.ts";
import type { Entry, ReadFile } from "../files/fileTree.ts";
import type { Fences } from "../report/fences.ts";
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

/** What a client may say in its initialization options. */
export interface InitializationOptions {
  /**
   * Requests that the client answers. One that names `plumbline/listFiles` and `plumbline/readFile`
   * is asked for files that the server cannot see itself.
   */
  readonly answers?: readonly string[];
  /** URI of the folder that holds the pages, for a server that cannot tell where it ships. */
  readonly pages?: string;
}

/** `plumbline/listFiles`: what a folder holds itself, asked of the client; null where it is none. */
export const listFilesRequest = "plumbline/listFiles";

export interface ListFilesParams {
  readonly uri: string;
}

export type ListFilesAnswer = readonly Entry[] | null;

/** `plumbline/readFile`: what a file of `mostBytes` at most says, asked of the client. */
export const readFileRequest = "plumbline/readFile";

export interface ReadFileParams {
  readonly uri: string;
  readonly mostBytes: number;
}

export type ReadFileAnswer = ReadFile;

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
