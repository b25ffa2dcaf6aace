import type { FencesAnswer } from "../../server/src/lsp/protocol.ts";
import { type Escape, fenceHtml, waitingHtml } from "./fenceHtml.ts";

/** What is known of a text at this moment. */
export type Figures =
  | { readonly kind: "known"; readonly answer: NonNullable<FencesAnswer> }
  | { readonly kind: "coming" }
  | { readonly kind: "none"; readonly why: string };

/** The figures of exactly this text; a look at them is also the wish to hear when there are newer ones. */
export type FiguresOf = (uri: string, text: string) => Figures;

interface Token {
  readonly type: string;
  readonly info: string;
  readonly content: string;
  readonly map: readonly number[] | null;
  meta: unknown;
}

interface Meta {
  readonly noteText: string;
}

type Rule = (
  tokens: Token[],
  index: number,
  options: never,
  env: unknown,
  renderer: { renderAttrs(token: never): string },
) => string;

/** Of the preview's parser, what is used here. */
export interface PreviewParser {
  readonly core: {
    readonly ruler: {
      push(name: string, rule: (state: { readonly src: string; readonly tokens: Token[] }) => void): void;
    };
  };
  readonly renderer: { readonly rules: Record<string, unknown> };
  readonly utils: { readonly escapeHtml: Escape };
}

/**
 * Draws the fences of a preview as the server's last answer for their text says them. Where there is
 * no answer for exactly that text, their lines are drawn: no figure is ever an older text's.
 */
export function extendMarkdownIt<P extends PreviewParser>(parser: P, figuresOf: FiguresOf): P {
  // The text is known while it is parsed and the note's address while it is drawn, so one is carried to the other.
  parser.core.ruler.push("plumbline", ({ src, tokens }) => {
    for (const token of tokens) if (isPlumb(token)) token.meta = { noteText: src } satisfies Meta;
  });
  const others = parser.renderer.rules.fence as Rule | undefined;
  const fence: Rule = (tokens, index, options, env, renderer) => {
    const token = tokens[index] as Token;
    if (!isPlumb(token)) return others?.(tokens, index, options, env, renderer) ?? "";
    const drawn = drawFence(token, env, figuresOf, parser.utils.escapeHtml);
    // Its attributes keep the preview and the editor at the same line.
    return `<div${renderer.renderAttrs(token as never)}>${drawn}</div>\n`;
  };
  parser.renderer.rules.fence = fence;
  return parser;
}

function isPlumb({ type, info }: Token): boolean {
  return type === "fence" && /^\s*plumb(?![\p{L}\p{M}\p{N}_-])/iu.test(info);
}

function drawFence(
  { content, map, meta }: Token,
  env: unknown,
  figuresOf: FiguresOf,
  escaped: Escape,
): string {
  const uri = (env as { currentDocument?: unknown } | undefined)?.currentDocument;
  const text = (meta as Meta | null)?.noteText;
  const figures = uri && text !== undefined ? figuresOf(String(uri), text) : nowhere;
  if (figures.kind === "coming") return waitingHtml(content, "Figures are coming.", escaped);
  if (figures.kind === "none") return waitingHtml(content, figures.why, escaped);
  const found = figures.answer.fences.find(
    ({ line, endLine, closed }) => line === map?.[0] && (!closed || endLine === map[1]),
  );
  return found ? fenceHtml(found, figures.answer, content, escaped) : waitingHtml(content, unread, escaped);
}

const nowhere: Figures = { kind: "none", why: "No figures: the preview does not say which note this is." };

const unread =
  "Plumbline does not read this fence, for it stands inside a quotation or another block. Move it to the edge of the note.";
