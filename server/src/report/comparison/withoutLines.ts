/** A text in which no line is named: a line that moved makes it no other text. */
export function withoutLines(text: string): string {
  return text.replace(/\blines? \d+/g, "line");
}
