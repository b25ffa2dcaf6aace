/**
 * A text for a terminal or a log: control characters other than tabs and line ends are shown as "�", for a
 * title or a file's name must not colour, move or wipe what is written beside it.
 */
export function printable(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are what is looked for.
  return text.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f]/g, "�");
}
