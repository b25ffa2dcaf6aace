import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { IGrammar, IRawGrammar } from "vscode-textmate";

const require = createRequire(import.meta.url);
// Both are CommonJS whose exports Node cannot name in an import.
const { loadWASM, OnigScanner, OnigString } =
  require("vscode-oniguruma") as typeof import("vscode-oniguruma");
const { INITIAL, parseRawGrammar, Registry } = require("vscode-textmate") as typeof import("vscode-textmate");

const files: Readonly<Record<string, URL>> = {
  "source.plumb": new URL("../../syntaxes/plumb.tmLanguage.json", import.meta.url),
  "markdown.plumb.codeblock": new URL("../../syntaxes/markdown.tmLanguage.json", import.meta.url),
  // The editor's own Markdown grammar, as a package carries it.
  "text.html.markdown": new URL(`file://${require.resolve("tm-grammars/grammars/markdown.json")}`),
};

const onigLib = loadWASM(readFileSync(require.resolve("vscode-oniguruma/release/onig.wasm")).buffer).then(
  () => ({
    createOnigScanner: (patterns: string[]) => new OnigScanner(patterns),
    createOnigString: (text: string) => new OnigString(text),
  }),
);

const registry = new Registry({
  onigLib,
  loadGrammar: async (scope) => rawGrammar(scope),
  getInjections: (scope) => (scope === "text.html.markdown" ? ["markdown.plumb.codeblock"] : undefined),
});

/** The tokenizer that the editor uses, with the grammars that the extension contributes. */
export async function loadGrammar(scope: "source.plumb" | "text.html.markdown"): Promise<IGrammar> {
  const grammar = await registry.loadGrammar(scope);
  if (grammar === null) throw new Error(`No grammar for ${scope}`);
  return grammar;
}

/** Null where the scope is of a grammar that is none of ours and not Markdown's. */
export function rawGrammar(scope: string): IRawGrammar | null {
  const file = files[scope];
  return file === undefined ? null : parseRawGrammar(readFileSync(file, "utf8"), file.pathname);
}

/** For each line, the scopes of each of its characters, outermost first, joined with blanks. */
export function scopesOf(grammar: IGrammar, lines: readonly string[]): string[][] {
  let stack = INITIAL;
  return lines.map((line) => {
    const result = grammar.tokenizeLine(line, stack);
    stack = result.ruleStack;
    const scopes: string[] = [];
    for (const token of result.tokens) {
      for (let at = token.startIndex; at < token.endIndex; at++) scopes[at] = token.scopes.join(" ");
    }
    return scopes;
  });
}
