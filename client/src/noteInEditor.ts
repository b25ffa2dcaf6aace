import { type TextEditor, window } from "vscode";

/** The active editor, if it shows a note. Throws a sentence where it does not. */
export function noteInEditor(): TextEditor {
  const editor = window.activeTextEditor;
  if (editor && ["plumb", "markdown"].includes(editor.document.languageId)) return editor;
  throw new Error("Open a note first: a .plumb file, or a Markdown file with a plumb fence.");
}
