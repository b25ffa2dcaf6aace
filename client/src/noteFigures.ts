import { commands, type TextDocument, workspace } from "vscode";
import { type BaseLanguageClient, State } from "vscode-languageclient";
import type {
  FencesAnswer,
  fencesRequest,
  figuresChangedNotification,
  NoteParams,
} from "../../server/src/lsp/protocol.ts";
import type { Figures, FiguresOf } from "./markdownPreview.ts";

const fences: typeof fencesRequest = "plumbline/fences";
const figuresChanged: typeof figuresChangedNotification = "plumbline/figuresChanged";

/** What was answered for one version of a note. */
interface Answered {
  readonly version: number;
  /** As the preview's parser sees it. */
  readonly text: string;
  readonly figures: Figures;
}

/**
 * Keeps the server's last answer for each note that a preview draws, and has the previews drawn anew
 * when a newer one comes. `dispose` ends the listening.
 */
export function noteFigures(client: BaseLanguageClient): {
  readonly figuresOf: FiguresOf;
  dispose(): void;
} {
  const answered = new Map<string, Answered>();
  /** What is asked for now, by note: an answer to an earlier question is no answer any more. */
  const asked = new Map<string, { readonly version: number }>();
  /** What was last drawn of each note, and for which text. */
  const drawn = new Map<string, { readonly text: string; readonly figures: string }>();

  const figuresOf: FiguresOf = (uri, text) => {
    const last = answered.get(uri);
    const figures: Figures = last?.text === text ? last.figures : { kind: "coming" };
    drawn.set(uri, { text, figures: JSON.stringify(figures) });
    if (last?.text !== text) void ask(uri);
    return figures;
  };

  async function ask(uri: string): Promise<void> {
    const note = openNote(uri);
    if (!note) return take(uri, { version: 0, text: drawn.get(uri)?.text ?? "", figures: closed });
    const { version } = note;
    if (asked.get(uri)?.version === version || answered.get(uri)?.version === version) return;
    const question = { version };
    asked.set(uri, question);
    const text = asParsed(note.getText());
    const figures = await answer(uri, version);
    if (asked.get(uri) !== question) return;
    asked.delete(uri);
    take(uri, { version, text, figures });
  }

  async function answer(uri: string, version: number): Promise<Figures> {
    try {
      const params: NoteParams = { textDocument: { uri } };
      const found = await client.sendRequest<FencesAnswer>(fences, params);
      if (!found) return unread;
      return found.version === version ? { kind: "known", answer: found } : { kind: "coming" };
    } catch {
      return silent;
    }
  }

  function take(uri: string, now: Answered): void {
    answered.set(uri, now);
    const before = drawn.get(uri);
    // A preview of another text draws itself anew when it learns of this one.
    if (before?.text !== now.text || before.figures === JSON.stringify(now.figures)) return;
    void commands.executeCommand("markdown.preview.refresh");
  }

  /** Nothing known holds any longer. */
  function forget(): void {
    answered.clear();
    asked.clear();
    for (const uri of drawn.keys()) void ask(uri);
  }

  const listening = [
    client.onNotification(figuresChanged, forget),
    client.onDidChangeState(({ newState }) => {
      if (newState !== State.Starting) forget();
    }),
    // Asked for at once, so that the answer is there when the preview has waited for the typing to pause.
    workspace.onDidChangeTextDocument(({ document }) => {
      const uri = document.uri.toString();
      if (drawn.has(uri)) void ask(uri);
    }),
    workspace.onDidCloseTextDocument(({ uri }) => {
      for (const known of [answered, asked, drawn]) known.delete(uri.toString());
    }),
  ];
  return {
    figuresOf,
    dispose() {
      for (const one of listening) one.dispose();
    },
  };
}

function openNote(uri: string): TextDocument | undefined {
  return workspace.textDocuments.find((one) => one.uri.toString() === uri);
}

/** The preview's parser brings line ends and a few characters into one form before it reads a text. */
function asParsed(text: string): string {
  return text
    .replace(/[\u2028\u2029]/g, "")
    .replace(/\r\n?/g, "\n")
    .replaceAll("\0", "\uFFFD");
}

const closed: Figures = { kind: "none", why: "No figures: the note is not open in this window." };
const unread: Figures = {
  kind: "none",
  why: "No figures: Plumbline reads notes on the disk and new ones only.",
};
const silent: Figures = {
  kind: "none",
  why: "No figures: the server does not answer. The command Plumbline: Restart the Server starts it anew.",
};
