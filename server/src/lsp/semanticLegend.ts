import { SemanticTokenModifiers, type SemanticTokensLegend } from "vscode-languageserver";
import { colours } from "../features/semanticTokens.ts";

/** By which numbers the colours of words are told; a client passes over those that it does not know. */
export const legend: SemanticTokensLegend = {
  tokenTypes: [...colours],
  tokenModifiers: [SemanticTokenModifiers.definition],
};
