import {
  commands,
  EventEmitter,
  type ExtensionContext,
  type Tab,
  Uri,
  ViewColumn,
  window,
  workspace,
} from "vscode";

const SCHEME = "plumbline-comparison";

export interface Comparisons {
  /** Shows a comparison of a note beside it, in the place of an older one of the same note. */
  show(note: Uri, markdown: string): Promise<void>;
}

/** Comparisons are documents that only the editor's memory has: they are read, and never saved. */
export function offerComparisons({ subscriptions }: ExtensionContext): Comparisons {
  const texts = new Map<string, string>();
  const changed = new EventEmitter<Uri>();
  subscriptions.push(
    changed,
    workspace.registerTextDocumentContentProvider(SCHEME, {
      onDidChange: changed.event,
      provideTextDocumentContent: (uri) => texts.get(uri.toString()) ?? gone,
    }),
  );
  return {
    async show(note, markdown) {
      const uri = comparisonUri(note);
      texts.set(uri.toString(), markdown);
      changed.fire(uri);
      await closeShown(uri);
      await preview(uri);
    },
  };
}

const gone =
  "This comparison is no longer there. Run **Plumbline: Compare the Note with Its Last Commit** again.\n";

/** The name ends as Markdown does, which is what the preview goes by. */
function comparisonUri(note: Uri): Uri {
  const name = note.path.slice(note.path.lastIndexOf("/") + 1);
  return Uri.from({ scheme: SCHEME, path: `/${name} since its last commit.md`, query: note.toString() });
}

/** A preview cannot be brought to the front where it stands, and a second one beside it helps nobody. */
async function closeShown(uri: Uri): Promise<void> {
  const shown = tabsOf(uri);
  if (shown.length > 0) await window.tabGroups.close(shown, true);
}

function tabsOf(uri: Uri): readonly Tab[] {
  const name = uri.path.slice(1);
  return window.tabGroups.all.flatMap(({ tabs }) => tabs.filter(({ label }) => label.endsWith(name)));
}

/** The preview's tab comes a little after its command has ended; until then a second run would not find it. */
function opened(uri: Uri): Promise<void> {
  return new Promise((resolve) => {
    const end = () => {
      clearTimeout(timer);
      listening.dispose();
      resolve();
    };
    const listening = window.tabGroups.onDidChangeTabs(() => tabsOf(uri).length > 0 && end());
    const timer = setTimeout(end, LONGEST_MS);
    if (tabsOf(uri).length > 0) end();
  });
}

const LONGEST_MS = 3000;

async function preview(uri: Uri): Promise<void> {
  try {
    await commands.executeCommand("markdown.showPreviewToSide", uri);
    await opened(uri);
  } catch {
    // The built-in Markdown preview can be turned off; the text says the same.
    const document = await workspace.openTextDocument(uri);
    await window.showTextDocument(document, { viewColumn: ViewColumn.Beside, preserveFocus: true });
  }
}
