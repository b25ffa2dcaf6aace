/** Asks `initialize` as a client that pulls diagnostics and hints and can nothing else, and confirms it. */
export async function initialize(server, folderUri = null) {
  const result = await server.request("initialize", {
    processId: process.pid,
    rootUri: folderUri,
    workspaceFolders: folderUri ? [{ uri: folderUri, name: "bench" }] : null,
    capabilities: {
      general: { positionEncodings: ["utf-16"] },
      textDocument: {
        synchronization: { dynamicRegistration: false },
        publishDiagnostics: { relatedInformation: true },
        diagnostic: { dynamicRegistration: false, relatedDocumentSupport: false },
        inlayHint: {
          dynamicRegistration: false,
          resolveSupport: { properties: ["tooltip", "label.tooltip", "label.location"] },
        },
      },
      workspace: { workspaceFolders: true },
    },
  });
  server.notify("initialized", {});
  return result;
}
