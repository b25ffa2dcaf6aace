import {
  type CancellationToken,
  CodeActionKind,
  type Connection,
  DocumentDiagnosticReportKind,
  type InlayHint,
  LSPErrorCodes,
  ResponseError,
} from "vscode-languageserver";
import { codeActions } from "../features/codeActions.ts";
import { completion } from "../features/completion.ts";
import { definition } from "../features/definition.ts";
import { documentSymbols } from "../features/documentSymbols.ts";
import { folding } from "../features/folding.ts";
import { formatting } from "../features/formatting.ts";
import { hover } from "../features/hover.ts";
import { inlayHints } from "../features/inlayHints.ts";
import type { Note } from "../plan/note.ts";
import { fileJson } from "../report/pointsJson.ts";
import type { Client } from "./client.ts";
import {
  codeActionOf,
  completionOf,
  flatSymbolsOf,
  foldOf,
  type HintData,
  hoverOf,
  lineEditOf,
  locationOf,
  type PageUri,
  plainHint,
  saysTheSame,
  symbolOf,
  wholeHint,
} from "./convert.ts";
import { diagnosticsOf, workspaceReport } from "./diagnostics.ts";
import type { guardWith } from "./guard.ts";
import { type PointsAnswer, type PointsParams, pointsRequest } from "./protocol.ts";
import type { Settings } from "./settings.ts";
import type { Workspace } from "./workspace.ts";

/** What answers are made from. */
export interface Answering {
  readonly workspace: Workspace;
  readonly pageUri: PageUri;
  client(): Client;
  /** Once the client has said them. */
  settings(): Promise<Settings>;
  /** Resolves once the folders are read. */
  ready(): Promise<void>;
}

/** Answers every request about a note. */
export function answerRequests(
  connection: Connection,
  { answering }: ReturnType<typeof guardWith>,
  { workspace, pageUri, client, settings, ready }: Answering,
): void {
  /** The note, once the folders are read. Null for a text that nobody opened. */
  async function noteOf(uri: string, token: CancellationToken): Promise<Note | null> {
    await ready();
    dropCancelled(token);
    return workspace.note(uri);
  }

  /** Lets waiting changes in, and gives up where the text was overtaken: a burst is answered for its last text. */
  async function settled(uri: string, token: CancellationToken): Promise<void> {
    const version = workspace.openNote(uri)?.version;
    for (let turn = 0; turn < 3; turn++) await new Promise((resolve) => setImmediate(resolve));
    dropCancelled(token);
    if (workspace.openNote(uri)?.version !== version) {
      throw new ResponseError(LSPErrorCodes.ContentModified, "The text has changed since.");
    }
  }

  connection.languages.diagnostics.on(
    answering("diagnostic", async ({ textDocument: { uri } }, token) => {
      await settled(uri, token).catch((error) => {
        if (error instanceof ResponseError && error.code === LSPErrorCodes.ContentModified) {
          throw new ResponseError(LSPErrorCodes.ServerCancelled, "The text has changed since.", {
            retriggerRequest: false,
          });
        }
        throw error;
      });
      const note = await noteOf(uri, token);
      return { kind: DocumentDiagnosticReportKind.Full, items: note ? diagnosticsOf(note, pageUri) : [] };
    }),
  );

  connection.languages.diagnostics.onWorkspace(
    answering("workspace diagnostic", async ({ previousResultIds }, token) => {
      await ready();
      return workspaceReport(workspace, previousResultIds, pageUri, token);
    }),
  );

  connection.languages.inlayHint.on(
    answering("inlay hint", async ({ textDocument: { uri }, range }, token) => {
      await settled(uri, token);
      const note = await noteOf(uri, token);
      const { hints, kinds } = await settings();
      if (!note) return [];
      return inlayHints(note, range.start.line, range.end.line, hints, kinds).map((hint) =>
        client().resolvesHints ? plainHint(hint, uri) : wholeHint(hint, pageUri),
      );
    }),
  );

  connection.languages.inlayHint.resolve(
    answering("resolve a hint", async (shown: InlayHint, token) => {
      const note = await noteOf((shown.data as HintData | undefined)?.uri ?? "", token);
      const { hints, kinds } = await settings();
      const { line, character } = shown.position;
      const hint =
        note && inlayHints(note, line, line, hints, kinds).find((one) => one.character === character);
      return hint && saysTheSame(shown, hint) ? { ...shown, ...wholeHint(hint, pageUri) } : shown;
    }),
  );

  connection.onHover(
    answering("hover", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      const found = note && hover(note, position.line, position.character);
      return found ? hoverOf(found) : null;
    }),
  );

  connection.onCompletion(
    answering("completion", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      const items = note ? completion(note, position.line, position.character) : [];
      return items.map((item) => completionOf(item, position.line, client().snippets));
    }),
  );

  connection.onDefinition(
    answering("definition", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      const origin = note && definition(note, position.line, position.character);
      return origin ? locationOf(origin, pageUri) : null;
    }),
  );

  connection.onCodeAction(
    answering("code action", async ({ textDocument: { uri }, range, context }, token) => {
      const note = await noteOf(uri, token);
      if (!note || !asksForFixes(context.only)) return [];
      return codeActions(note, range.start.line, range.end.line).map((action) =>
        codeActionOf(action, uri, context.diagnostics),
      );
    }),
  );

  connection.onDocumentSymbol(
    answering("document symbol", async ({ textDocument: { uri } }, token) => {
      const note = await noteOf(uri, token);
      if (!note) return [];
      const symbols = documentSymbols(note);
      return client().nestsSymbols
        ? symbols.map((symbol) => symbolOf(symbol, note))
        : symbols.flatMap((symbol) => flatSymbolsOf(symbol, note));
    }),
  );

  connection.onFoldingRanges(
    answering("folding range", async ({ textDocument: { uri } }, token) => {
      const note = await noteOf(uri, token);
      return note ? folding(note).map(foldOf) : [];
    }),
  );

  connection.onDocumentFormatting(
    answering("formatting", async ({ textDocument: { uri } }, token) => {
      const note = await noteOf(uri, token);
      return note
        ? formatting(note, 0, note.document.lineCount - 1).map((edit) => lineEditOf(edit, note))
        : [];
    }),
  );

  connection.onDocumentRangeFormatting(
    answering("range formatting", async ({ textDocument: { uri }, range }, token) => {
      const note = await noteOf(uri, token);
      return note
        ? formatting(note, range.start.line, range.end.line).map((edit) => lineEditOf(edit, note))
        : [];
    }),
  );

  connection.onRequest(
    pointsRequest,
    answering(
      "points",
      async ({ textDocument }: PointsParams, token: CancellationToken): Promise<PointsAnswer> => {
        const note = await noteOf(textDocument.uri, token);
        return note ? fileJson(note, textDocument.uri) : null;
      },
    ),
  );
}

function dropCancelled(token: CancellationToken): void {
  if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, "Cancelled.");
}

/** A kind asks for its own and for those below it. */
function asksForFixes(only: readonly string[] | undefined): boolean {
  return !only || only.some((kind) => kind === "" || kind === CodeActionKind.QuickFix);
}
