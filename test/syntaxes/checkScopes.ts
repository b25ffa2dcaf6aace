import { expect } from "vitest";
import type { IGrammar } from "vscode-textmate";
import { scopesOf } from "./grammars.ts";

interface Expectation {
  readonly line: number;
  readonly from: number;
  readonly to: number;
  readonly scope: string;
  readonly markerLine: number;
}

/**
 * Holds a note against the marker lines in it: carets under a stretch of the line above, then a scope
 * that each character of the stretch has, or, after `not`, that none of them has.
 */
export function checkScopes(grammar: IGrammar, marked: string): void {
  const { lines, expectations } = readMarked(marked);
  const scopes = scopesOf(grammar, lines);
  const failures: string[] = [];
  for (const { line, from, to, scope, markerLine } of expectations) {
    const wanted = scope.replace(/^not /, "");
    for (let at = from; at < to; at++) {
      const actual = scopes[line]?.[at] ?? "(beyond the line)";
      if (hasScope(actual, wanted) !== scope.startsWith("not ")) continue;
      failures.push(`line ${markerLine + 1}: "${lines[line]?.slice(from, to)}": ${scope}; it is ${actual}`);
      break;
    }
  }
  expect(failures).toEqual([]);
  expect(expectations.length).toBeGreaterThan(0);
}

/** True where one of the scopes is the wanted one or one of its kind: `string.quoted.double` is a `string`. */
export function hasScope(scopes: string, wanted: string): boolean {
  return scopes.split(" ").some((scope) => scope === wanted || scope.startsWith(`${wanted}.`));
}

function readMarked(marked: string): { lines: string[]; expectations: Expectation[] } {
  const lines: string[] = [];
  const expectations: Expectation[] = [];
  for (const [markerLine, text] of marked.split("\n").entries()) {
    const marker = /^( *)(\^+) ((?:not )?[a-z.-]+)$/.exec(text);
    if (marker === null) {
      lines.push(text);
      continue;
    }
    const [, indent = "", carets = "", scope = ""] = marker;
    const from = indent.length;
    expectations.push({ line: lines.length - 1, from, to: from + carets.length, scope, markerLine });
  }
  return { lines, expectations };
}
