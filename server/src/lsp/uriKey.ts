/**
 * One spelling for every URI of a file. Editors and Node encode other characters of a path, and
 * write a drive's letter either way: compared as they come, an open note and the disk's would be two.
 */
export function uriKey(uri: string): string {
  let path = uri;
  try {
    path = decodeURIComponent(uri);
  } catch {
    // Not encoded as URIs are, so it is compared as it stands.
  }
  return path.replace(/^file:\/\/\/([A-Z]):/, (drive) => drive.toLowerCase());
}
