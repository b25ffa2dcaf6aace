/** "a, b or c". */
export function orListed(items: readonly string[]): string {
  return items.join(", ").replace(/, ([^,]*)$/, " or $1");
}
