/** The last part of a URI, as a reader knows the file. */
export function fileName(uri: string): string {
  const last = uri.slice(uri.lastIndexOf("/") + 1);
  try {
    return decodeURIComponent(last);
  } catch {
    return last;
  }
}
