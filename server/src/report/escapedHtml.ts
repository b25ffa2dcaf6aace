const entities: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** A text as it stands, inside HTML or an attribute in quotes. */
export function escapedHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character] ?? "");
}
