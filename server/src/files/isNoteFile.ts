/** True for the files that may hold notation. */
export function isNoteFile(path: string): boolean {
  return /\.(plumb|md|markdown)$/i.test(path);
}
