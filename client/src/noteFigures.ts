import { commands, type TextDocument, workspace } from "vscode";
import { type BaseLanguageClient, State } from "vscode-languageclient";
import type {
  FencesAnswer,
  fencesRequest,
  figuresChangedNotification,
  NoteParams,
} from "../../server/src/lsp/protocol.ts";
import type { Figures, FiguresOf } from "./markdownPreview.ts";
import { spaced } from "./spaced.ts";

const fences: typeof fencesRequest = "plumbline/fences";
const figuresChanged: typeof figuresChangedNotification = "plumbline/figuresChanged";

/**
 * A preview that is loaded anew while it still loads may keep the older page, as the editor does it; so
 * there is time between, and after the last time it is loaded once more when a slow page is surely there.
 */
const RELOAD_MILLISECONDS = 2000;
const AGAIN_MILLISECONDS = 6000;

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

  const redraw = spaced(
    () => void commands.executeCommand("markdown.preview.refresh"),
    RELOAD_MILLISECONDS,
    AGAIN_MILLISECONDS,
  );

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
      // This may hear of a change before the client has told the server of it; the next question comes after that.
      for (let attempt = 0; attempt < 4; attempt++) {
        const found = await client.sendRequest<FencesAnswer>(fences, params);
        if (!found) return unread;
        if (found.version === version) return { kind: "known", answer: found };
      }
      // A later version is asked for by itself.
      return { kind: "coming" };
    } catch {
      return silent;
    }
  }

  function take(uri: string, now: Answered): void {
    answered.set(uri, now);
    const before = drawn.get(uri);
    // A preview of another text draws itself anew when it learns of this one.
    if (before?.text !== now.text || before.figures === JSON.stringify(now.figures)) return;
    redraw.run();
  }

  /** Before a preview draws it, so that the first drawing has its figures already. */
  function askAhead({ languageId, uri }: TextDocument): void {
    if (languageId === "markdown") void ask(uri.toString());
  }

  /** Nothing known holds any longer. */
  function forget(): void {
    answered.clear();
    asked.clear();
    workspace.textDocuments.forEach(askAhead);
    // A preview outlives its editor: it opens the note again when it draws.
    const closed = [...drawn.keys()].filter((uri) => !openNote(uri));
    for (const uri of closed) drawn.delete(uri);
    if (closed.length > 0) redraw.run();
  }

  const listening = [
    client.onNotification(figuresChanged, forget),
    client.onDidChangeState(({ newState }) => {
      if (newState !== State.Starting) forget();
    }),
    redraw,
    workspace.onDidOpenTextDocument(askAhead),
    workspace.onDidChangeTextDocument(({ document }) => askAhead(document)),
    workspace.onDidCloseTextDocument(({ uri }) => {
      answered.delete(uri.toString());
      asked.delete(uri.toString());
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
  why: "No figures: Plumbline reads no notes from this place. Save the note in a folder that is open.",
};
const silent: Figures = {
  kind: "none",
  why: "No figures: the server does not answer. The command Plumbline: Restart the Server starts it anew.",
};
