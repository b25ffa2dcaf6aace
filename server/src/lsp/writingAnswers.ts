import type { Connection } from "vscode-languageserver";
import { onEnter } from "../features/onEnter.ts";
import { selectionRanges } from "../features/selectionRanges.ts";
import { semanticTokens } from "../features/semanticTokens.ts";
import { signatureHelp } from "../features/signatureHelp.ts";
import type { Answering } from "./answers.ts";
import { selectionRangeOf, semanticTokensOf, signatureHelpOf, textEditOf } from "./convert.ts";
import type { guardWith } from "./guard.ts";
import { noteFinder } from "./noteFinder.ts";

/** Answers what helps with writing a line: its arguments, its words, and what Enter does. */
export function answerWritingRequests(
  connection: Connection,
  { answering }: ReturnType<typeof guardWith>,
  { workspace, client, ready }: Answering,
): void {
  const noteOf = noteFinder({ workspace, ready });

  connection.onSignatureHelp(
    answering("signature help", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      const found = note && signatureHelp(note, position.line, position.character);
      return found ? signatureHelpOf(found, client().placesArguments) : null;
    }),
  );

  connection.onSelectionRanges(
    answering("selection range", async ({ textDocument: { uri }, positions }, token) => {
      const note = await noteOf(uri, token);
      return note ? positions.map((position) => selectionRangeOf(selectionRanges(note, position))) : null;
    }),
  );

  connection.languages.semanticTokens.on(
    answering("semantic tokens", async ({ textDocument: { uri } }, token) => {
      const note = await noteOf(uri, token);
      return semanticTokensOf(note ? semanticTokens(note, 0, note.document.lineCount - 1) : []);
    }),
  );

  connection.languages.semanticTokens.onRange(
    answering("semantic tokens of a range", async ({ textDocument: { uri }, range }, token) => {
      const note = await noteOf(uri, token);
      return semanticTokensOf(note ? semanticTokens(note, range.start.line, range.end.line) : []);
    }),
  );

  connection.onDocumentOnTypeFormatting(
    answering("formatting on Enter", async ({ textDocument: { uri }, position }, token) => {
      const note = await noteOf(uri, token);
      return note ? onEnter(note, position.line, position.character).map(textEditOf) : [];
    }),
  );
}
