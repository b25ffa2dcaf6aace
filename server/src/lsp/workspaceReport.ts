import {
  type CancellationToken,
  type Diagnostic,
  DocumentDiagnosticReportKind,
  type ResultProgressReporter,
  type WorkDoneProgressReporter,
  type WorkspaceDiagnosticReport,
  type WorkspaceDiagnosticReportPartialResult,
} from "vscode-languageserver";
import type { PageUri } from "./convert.ts";
import { diagnosticsOf } from "./diagnostics.ts";
import { nextTurn, type Soon } from "./nextTurn.ts";
import { dropCancelled } from "./noteFinder.ts";
import type { Patience } from "./patience.ts";
import type { Workspace } from "./workspace.ts";

type Items = WorkspaceDiagnosticReport["items"];

/** What a report is made from, and where it is told. */
export interface Reporting {
  readonly workspace: Workspace;
  readonly pageUri: PageUri;
  readonly patience: Patience;
  readonly soon: Soon;
  readonly token: CancellationToken;
  readonly progress: WorkDoneProgressReporter;
  /** Told piece by piece where the client takes it so. */
  readonly partial: ResultProgressReporter<WorkspaceDiagnosticReportPartialResult> | undefined;
}

/** So many notes are told in one piece. */
const PIECE = 32;

/**
 * Every note of the window; those whose diagnostics the client has already are told as unchanged.
 * Other requests are let in between two notes. A client that takes pieces gets all of them so, and an
 * empty rest.
 */
export async function workspaceReport(
  reporting: Reporting,
  previous: readonly { readonly uri: string; readonly value: string }[],
): Promise<WorkspaceDiagnosticReport> {
  const { workspace, soon, token, progress, partial } = reporting;
  const known = new Map(previous.map(({ uri, value }) => [uri, value]));
  const uris = workspace.notes.map(({ uri }) => uri);
  let items: Items = [];
  const tell = () => {
    if (!partial) return;
    partial.report({ items });
    items = [];
  };
  progress.begin("Plumbline: checking notes", 0, `0 of ${uris.length}`, true);
  try {
    for (const [i, uri] of uris.entries()) {
      items.push(...reportOf(reporting, uri, known.get(uri)));
      if (PIECE <= items.length) {
        tell();
        progress.report((100 * (i + 1)) / uris.length, `${i + 1} of ${uris.length}`);
      }
      await nextTurn(soon);
      dropCancelled(token);
    }
    // What a removed note was told is taken back.
    for (const uri of known.keys()) {
      if (!workspace.note(uri))
        items.push({ uri, version: null, kind: DocumentDiagnosticReportKind.Full, items: [] });
    }
    if (0 < items.length) tell();
    return { items };
  } finally {
    progress.done();
  }
}

/** None for a note that went while others were checked. */
function reportOf(
  { workspace, pageUri, patience }: Reporting,
  uri: string,
  known: string | undefined,
): Items {
  const note = workspace.note(uri);
  if (!note) return [];
  const diagnostics = diagnosticsOf(note, pageUri, patience);
  const id = resultId(diagnostics);
  const base = { uri, version: workspace.openNote(uri)?.version ?? null, resultId: id };
  return known === id
    ? [{ ...base, kind: DocumentDiagnosticReportKind.Unchanged }]
    : [{ ...base, kind: DocumentDiagnosticReportKind.Full, items: diagnostics }];
}

/** A short name for a list of diagnostics: the same list has the same one. */
function resultId(diagnostics: readonly Diagnostic[]): string {
  const text = JSON.stringify(diagnostics);
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i++) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
  return `${text.length}-${(hash >>> 0).toString(36)}`;
}
