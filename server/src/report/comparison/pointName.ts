/** What a point is called: `departure "Noise turn"`. */
export function pointName({ phase, title }: Readonly<{ phase?: unknown; title?: unknown }>): string {
  return `${phase ?? "?"}${title ? ` "${title}"` : ""}`;
}
