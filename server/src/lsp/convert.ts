import {
  CodeActionKind,
  type CompletionItem,
  CompletionItemKind,
  type Diagnostic,
  DiagnosticSeverity,
  DiagnosticTag,
  type DocumentHighlight,
  DocumentHighlightKind,
  type DocumentSymbol,
  type FoldingRange,
  type InlayHint,
  InsertTextFormat,
  type Location,
  type CodeAction as LspCodeAction,
  type Hover as LspHover,
  type Range,
  type SelectionRange,
  type SemanticTokens,
  SemanticTokensBuilder,
  type SignatureHelp,
  type SymbolInformation,
  SymbolKind,
  type TextEdit,
  type WorkspaceEdit,
} from "vscode-languageserver";
import type { CodeAction } from "../features/codeActions.ts";
import type { Completion } from "../features/completion.ts";
import type { OutlineEntry } from "../features/documentSymbols.ts";
import type { Fold } from "../features/folding.ts";
import type { Hover } from "../features/hover.ts";
import type { Hint } from "../features/inlayHints.ts";
import type { NameUse } from "../features/nameUses.ts";
import type { Renaming } from "../features/rename.ts";
import type { Stretch } from "../features/selectionRanges.ts";
import { type ColouredToken, colours } from "../features/semanticTokens.ts";
import type { Signature } from "../features/signatureHelp.ts";
import type { FoundSymbol } from "../features/workspaceSymbols.ts";
import type { Edit } from "../notation/finding.ts";
import type { LineEdit } from "../notation/layout.ts";
import type { Span } from "../notation/span.ts";
import { BUILT_IN_URI } from "../plan/builtIn.ts";
import type { Severity } from "../plan/finding.ts";
import type { Note, PlacedFinding } from "../plan/note.ts";
import { lineOf, type Origin } from "../plan/origin.ts";

/** Where a page is; the built-in limits and each finding have one. */
export type PageUri = (name: string) => string | null;

export function rangeOf(line: number, { start, end }: Span): Range {
  return { start: { line, character: start }, end: { line, character: end } };
}

export function locationOf(origin: Origin, pageUri: PageUri): Location | null {
  return placeOf({ uri: origin.uri, line: lineOf(origin), span: origin.span }, pageUri);
}

/** Null where the built-in limits have no page to be shown on. */
export function placeOf(
  { uri, line, span }: Pick<NameUse, "uri" | "line" | "span">,
  pageUri: PageUri,
): Location | null {
  const shown = uri === BUILT_IN_URI ? pageUri("common-practice.plumb") : uri;
  return shown === null ? null : { uri: shown, range: rangeOf(line, span) };
}

export function highlightOf({ line, span, defines }: NameUse): DocumentHighlight {
  return {
    range: rangeOf(line, span),
    kind: defines ? DocumentHighlightKind.Write : DocumentHighlightKind.Read,
  };
}

/**
 * The edits of a renaming. With `versionOf` each document's edits name the version that they are for,
 * null for one that no editor has open; without it they are for a client that knows no versions.
 */
export function renamingOf(
  { newName, places }: Renaming,
  versionOf: ((uri: string) => number | null) | null,
): WorkspaceEdit {
  const edits = new Map<string, TextEdit[]>();
  for (const { uri, line, span } of places) {
    edits.set(uri, [...(edits.get(uri) ?? []), { range: rangeOf(line, span), newText: newName }]);
  }
  if (!versionOf) return { changes: Object.fromEntries(edits) };
  return {
    documentChanges: [...edits].map(([uri, own]) => ({
      textDocument: { uri, version: versionOf(uri) },
      edits: own,
    })),
  };
}

const severities: Readonly<Record<Severity, DiagnosticSeverity>> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  information: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};

export function diagnosticOf({ line, finding }: PlacedFinding, pageUri: PageUri): Diagnostic {
  const href = pageUri(`${finding.code}.md`);
  const related = finding.related.flatMap(({ origin, message }) => {
    const location = locationOf(origin, pageUri);
    return location ? [{ location, message }] : [];
  });
  return {
    range: rangeOf(line, finding.span),
    severity: severities[finding.severity],
    code: finding.code,
    source: "plumbline",
    message: finding.message,
    ...(href ? { codeDescription: { href } } : {}),
    ...(related.length > 0 ? { relatedInformation: related } : {}),
    ...(finding.code === "unused-definition" ? { tags: [DiagnosticTag.Unnecessary] } : {}),
  };
}

/** What a hint is resolved by, beside its place. */
export interface HintData {
  readonly uri: string;
}

/** A hint without its tooltips and locations, which few are asked for. */
export function plainHint(hint: Hint, uri: string): InlayHint {
  return { ...shortHint(hint), data: { uri } satisfies HintData };
}

/** A hint with all that stands behind it. */
export function wholeHint(hint: Hint, pageUri: PageUri): InlayHint {
  const label = hint.parts.map(({ text, tooltip, origin }) => {
    const location = origin && locationOf(origin, pageUri);
    return { value: text, ...(tooltip ? { tooltip } : {}), ...(location ? { location } : {}) };
  });
  return { ...shortHint(hint), label };
}

function shortHint(hint: Hint): InlayHint {
  return {
    position: { line: hint.line, character: hint.character },
    label: hint.parts.map(({ text }) => ({ value: text })),
    paddingLeft: true,
  };
}

/** True where the note still says what the client shows: after an edit another figure may stand there. */
export function saysTheSame(shown: InlayHint, hint: Hint): boolean {
  const { label } = shown;
  const text = typeof label === "string" ? label : label.map(({ value }) => value).join("");
  return text === hint.parts.map((part) => part.text).join("");
}

export function hoverOf({ line, span, text }: Hover): LspHover {
  return { contents: { kind: "markdown", value: text }, range: rangeOf(line, span) };
}

const completionKinds: Readonly<Record<Completion["kind"], CompletionItemKind>> = {
  keyword: CompletionItemKind.Keyword,
  name: CompletionItemKind.Variable,
  unit: CompletionItemKind.Unit,
  value: CompletionItemKind.Value,
  word: CompletionItemKind.EnumMember,
};

export function completionOf(completion: Completion, line: number, snippets: boolean): CompletionItem {
  const { label, kind, detail, documentation, insertText, snippet, rank, span } = completion;
  // Without snippets nothing stands behind the place where the author types on.
  const plain = (insertText.split(/\$\d/)[0] ?? "").replace(/\$\{\d+[:|]([^,}|]*)[^}]*\}/g, "$1");
  return {
    label,
    kind: completionKinds[kind],
    ...(detail ? { detail } : {}),
    ...(documentation ? { documentation: { kind: "markdown", value: documentation } } : {}),
    sortText: `${String(rank).padStart(3, "0")} ${label}`,
    filterText: label,
    insertTextFormat: snippet && snippets ? InsertTextFormat.Snippet : InsertTextFormat.PlainText,
    textEdit: { range: rangeOf(line, span), newText: snippet && !snippets ? plain : insertText },
  };
}

export function textEditOf({ line, start, end, newText, wholeLine }: Edit): TextEdit {
  const range = wholeLine
    ? { start: { line, character: 0 }, end: { line: line + 1, character: 0 } }
    : rangeOf(line, { start, end });
  return { range, newText };
}

/** @param lineEnd how the note's lines end: many a client inserts what it is given as it is */
export function codeActionOf(
  action: CodeAction,
  uri: string,
  lineEnd: string,
  diagnostics: readonly Diagnostic[],
): LspCodeAction {
  const { finding, findingLine } = action;
  const own = diagnostics.filter(
    (one) =>
      finding !== null &&
      one.code === finding.code &&
      one.range.start.line === findingLine &&
      one.range.start.character === finding.span.start,
  );
  return {
    title: action.title,
    kind: action.kind === "rewrite" ? CodeActionKind.RefactorRewrite : CodeActionKind.QuickFix,
    ...(own.length > 0 ? { diagnostics: own } : {}),
    ...(action.preferred ? { isPreferred: true } : {}),
    edit: {
      changes: {
        [uri]: action.edits.map(textEditOf).map((one) => ({
          ...one,
          newText: one.newText.replaceAll("\n", lineEnd),
        })),
      },
    },
  };
}

/** The kind of the action that spells all units of a note; clients run it on saving where the user says so. */
export const FIX_ALL = `${CodeActionKind.SourceFixAll}.plumbline`;

export function fixAllOf(edits: readonly Edit[], uri: string): LspCodeAction {
  return {
    title: "Spell the units of this note as the notation does",
    kind: FIX_ALL,
    edit: { changes: { [uri]: edits.map(textEditOf) } },
  };
}

const symbolKinds: Readonly<Record<OutlineEntry["kind"], SymbolKind>> = {
  point: SymbolKind.Event,
  setting: SymbolKind.Property,
  card: SymbolKind.Class,
  limits: SymbolKind.Namespace,
  configuration: SymbolKind.Field,
};

export function symbolOf(symbol: OutlineEntry, note: Note): DocumentSymbol {
  const end = note.document.lineText(symbol.lastLine).length;
  return {
    name: symbol.name,
    detail: symbol.detail,
    kind: symbolKinds[symbol.kind],
    range: {
      start: { line: symbol.firstLine, character: 0 },
      end: { line: symbol.lastLine, character: end },
    },
    selectionRange: rangeOf(symbol.nameLine, symbol.nameSpan),
    children: symbol.children.map((child) => symbolOf(child, note)),
  };
}

/** The same as a list, for a client that shows no tree. */
export function flatSymbolsOf(symbol: OutlineEntry, note: Note, container = ""): SymbolInformation[] {
  const { name, kind, range } = symbolOf(symbol, note);
  const own = { name, kind, location: { uri: note.uri, range } };
  return [
    container ? { ...own, containerName: container } : own,
    ...symbol.children.flatMap((child) => flatSymbolsOf(child, note, name)),
  ];
}

export function workspaceSymbolOf({ uri, entry, container }: FoundSymbol): SymbolInformation {
  return {
    name: entry.name,
    kind: symbolKinds[entry.kind],
    location: { uri, range: rangeOf(entry.nameLine, entry.nameSpan) },
    ...(container ? { containerName: container } : {}),
  };
}

/** The least stretch, with those it grows to as its parents. */
export function selectionRangeOf(stretches: readonly Stretch[]): SelectionRange {
  const [widest, ...others] = stretches.toReversed();
  const outermost: SelectionRange = { range: widest ?? rangeOf(0, { start: 0, end: 0 }) };
  return others.reduce<SelectionRange>((parent, range) => ({ range, parent }), outermost);
}

export function semanticTokensOf(tokens: readonly ColouredToken[]): SemanticTokens {
  const builder = new SemanticTokensBuilder();
  for (const { line, start, end, colour, defines } of tokens) {
    builder.push(line, start, end - start, colours.indexOf(colour), defines ? 1 : 0);
  }
  // Without the name of a result: none is asked for what changed since.
  return { data: builder.build().data };
}

export function signatureHelpOf(signature: Signature, byPlace: boolean): SignatureHelp {
  const { label, documentation, parameters, active } = signature;
  return {
    signatures: [
      {
        label,
        documentation: { kind: "markdown", value: documentation },
        parameters: parameters.map(({ start, end }) => ({
          label: byPlace ? [start, end] : label.slice(start, end),
        })),
        activeParameter: active,
      },
    ],
    activeSignature: 0,
    activeParameter: active,
  };
}

export function foldOf({ firstLine, lastLine }: Fold): FoldingRange {
  return { startLine: firstLine, endLine: lastLine };
}

export function lineEditOf({ line, newText }: LineEdit, note: Note): TextEdit {
  return { range: rangeOf(line, { start: 0, end: note.document.lineText(line).length }), newText };
}
