/**
 * A text of the author's or of a card's as it stands, inside Markdown: no mark in it means anything,
 * so that a title neither breaks a table nor draws a picture from somewhere else.
 */
export function plainMarkdown(text: string): string {
  return text.replace(/[\\`*_[\]<>|!~&#$]/g, "\\$&").replace(/:\/\//g, ":\\//");
}
