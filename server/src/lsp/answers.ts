import {
  type CancellationToken,
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
import { unitSpelling } from "../features/unitSpelling.ts";
import { fileJson } from "../report/pointsJson.ts";
import type { Client } from "./client.ts";
import { compareWithOlder } from "./compareWithOlder.ts";
import {
  codeActionOf,
  completionOf,
  FIX_ALL,
  fixAllOf,
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
import { diagnosticsOf } from "./diagnostics.ts";
import type { guardWith } from "./guard.ts";
import { dropCancelled, noteFinder } from "./noteFinder.ts";
import type { Patience } from "./patience.ts";
import {
  type CompareAnswer,
  type CompareParams,
  compareRequest,
  type PointsAnswer,
  type PointsParams,
  pointsRequest,
} from "./protocol.ts";
import type { Runtime } from "./runtime.ts";
import type { Settings } from "./settings.ts";
import type { Workspace } from "./workspace.ts";
import { workspaceReport } from "./workspaceReport.ts";

/** What answers are made from. */
export interface Answering {
  readonly workspace: Workspace;
  readonly pageUri: PageUri;
  readonly patience: Patience;
  readonly soon: Runtime["soon"];
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
  { workspace, pageUri, soon, patience, client, settings, ready }: Answering,
): void {
  const noteOf = noteFinder({ workspace, ready });

  /** Lets waiting changes in, and gives up where the text was overtaken: a burst is answered for its last text. */
  async function settled(uri: string, token: CancellationToken): Promise<void> {
    const version = workspace.openNote(uri)?.version;
    for (let turn = 0; turn < 3; turn++) await new Promise<void>(soon);
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
      return {
        kind: DocumentDiagnosticReportKind.Full,
        items: note ? diagnosticsOf(note, pageUri, patience) : [],
      };
    }),
  );

  connection.languages.diagnostics.onWorkspace(
    answering("workspace diagnostic", async ({ previousResultIds }, token, progress, partial) => {
      await ready();
      dropCancelled(token);
      return workspaceReport(
        { workspace, pageUri, patience, soon, token, progress, partial },
        previousResultIds,
      );
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
      if (!note) return [];
      const spelling = asksFor(FIX_ALL, context.only ?? []) ? unitSpelling(note) : [];
      const actions = codeActions(note, range.start.line, range.end.line)
        .map((action) => codeActionOf(action, uri, note.document.lineEnd, context.diagnostics))
        .filter(({ kind }) => !context.only || asksFor(kind ?? "", context.only));
      return [...actions, ...(spelling.length > 0 ? [fixAllOf(spelling, uri)] : [])];
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

  connection.onRequest(
    compareRequest,
    answering("compare", async (params: CompareParams, token: CancellationToken): Promise<CompareAnswer> => {
      const note = await noteOf(params.textDocument.uri, token);
      const folder = workspace.folderOf(params.textDocument.uri);
      if (!note || !folder) return null;
      // Folders of one window do not see each other's cards, neither now nor then.
      const others = params.others.filter(({ uri }) => workspace.folderOf(uri) === folder);
      return compareWithOlder(note, folder, { ...params, others });
    }),
  );
}

/** A kind asks for its own and for those below it. */
function asksFor(kind: string, only: readonly string[]): boolean {
  return only.some((asked) => asked === "" || kind === asked || kind.startsWith(`${asked}.`));
}
