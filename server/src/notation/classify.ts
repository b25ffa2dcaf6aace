import { isBlank } from "./characters.ts";

/** A fence that is open after a line: null where none is. */
export interface OpenFence {
  readonly mark: 96 | 126;
  readonly length: number;
  /** True where its info string begins with the word `plumb`. */
  readonly plumb: boolean;
}

/** What reaches a line from above. Equal states are the same object wherever they can be. */
export type LineState = OpenFence | "front-matter" | null;

export type LineKind = "bar" | "prose" | "fence" | "plumb-fence" | "table" | "front-matter";

export interface Classified {
  readonly kind: LineKind;
  readonly after: LineState;
  /** True on the line that opens a fence. */
  readonly opens: boolean;
}

const prose: Classified = { kind: "prose", after: null, opens: false };
const frontMatter: Classified = { kind: "front-matter", after: "front-matter", opens: false };
const frontMatterEnd: Classified = { kind: "front-matter", after: null, opens: false };
const bar: Classified = { kind: "bar", after: null, opens: false };

/**
 * What a line is by itself, given what is open above it. Tables are found later: they need the line
 * below. `everywhere` is true in a `.plumb` file, where bar lines hold outside fences too.
 */
export function classify(text: string, before: LineState, first: boolean, everywhere: boolean): Classified {
  if (before === "front-matter") return /^---\s*$/.test(text) ? frontMatterEnd : frontMatter;
  let at = 0;
  while (isBlank(text.charCodeAt(at))) at++;
  const code = text.charCodeAt(at);
  if (code === 96 || code === 126) {
    const fence = fenceLine(text, at, code, before);
    if (fence) return fence;
  }
  if (before) {
    if (!before.plumb) return { kind: "fence", after: before, opens: false };
    return { kind: code === 124 ? "bar" : "prose", after: before, opens: false };
  }
  if (code === 124) return everywhere ? bar : prose;
  if (first && code === 45 && /^\uFEFF?---\s*$/.test(text)) return frontMatter;
  return prose;
}

function fenceLine(
  text: string,
  at: number,
  mark: 96 | 126,
  before: Exclude<LineState, "front-matter">,
): Classified | null {
  let end = at;
  while (text.charCodeAt(end) === mark) end++;
  const length = end - at;
  const rest = text.slice(end);
  if (before) {
    if (mark !== before.mark || length < before.length || rest.trim() !== "") return null;
    return { kind: before.plumb ? "plumb-fence" : "fence", after: null, opens: false };
  }
  if (length < 3 || (mark === 96 && rest.includes("`"))) return null;
  const plumb = /^\s*plumb(?![\p{L}\p{N}_-])/iu.test(rest);
  return { kind: plumb ? "plumb-fence" : "fence", after: { mark, length, plumb }, opens: true };
}

export function sameState(a: LineState, b: LineState): boolean {
  if (a === b) return true;
  if (!a || !b || a === "front-matter" || b === "front-matter") return false;
  return a.mark === b.mark && a.length === b.length && a.plumb === b.plumb;
}

/** `| --- | :--: |`. */
export function isDelimiterRow(text: string): boolean {
  return (
    /^[\s\uFEFF]*\|(\s*:?-+:?\s*\|)+\s*(:?-+:?\s*)?$/.test(text) ||
    /^[\s\uFEFF]*\|\s*:?-+:?\s*(\|\s*:?-+:?\s*)+\|?\s*$/.test(text)
  );
}

export function hasSecondBar(text: string): boolean {
  return text.indexOf("|", text.indexOf("|") + 1) >= 0;
}
