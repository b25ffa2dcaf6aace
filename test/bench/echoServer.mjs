// The least a server on this library can do: it takes in what changes, reads none of it, and answers with
// what it was given beforehand, so that its answers have the size of the measured server's.
import { createConnection, ProposedFeatures, TextDocumentSyncKind } from "vscode-languageserver/node";

const connection = createConnection(ProposedFeatures.all);
let answers = { diagnostics: { kind: "full", items: [] }, hints: [] };

connection.onInitialize(() => ({
  capabilities: {
    textDocumentSync: TextDocumentSyncKind.Incremental,
    diagnosticProvider: { interFileDependencies: true, workspaceDiagnostics: false },
    inlayHintProvider: true,
  },
}));
connection.onDidOpenTextDocument(() => {});
connection.onDidChangeTextDocument(() => {});
connection.onDidCloseTextDocument(() => {});
connection.onNotification("bench/answers", (given) => {
  answers = given;
});
connection.languages.diagnostics.on(() => answers.diagnostics);
connection.languages.inlayHint.on(() => answers.hints);
connection.listen();
