import type { ClientCapabilities, InitializeParams } from "vscode-languageserver";
import { type InitializationOptions, PROTOCOL_VERSION } from "../shared-core/index.ts";

/** What the client can do, asked once. */
export interface Client {
  readonly capabilities: ClientCapabilities;
  readonly pullsDiagnostics: boolean;
  readonly pullsSettings: boolean;
  readonly watchesFiles: boolean;
  readonly showsProgress: boolean;
  readonly markdown: boolean;
  readonly snippets: boolean;
  readonly relatedDocuments: boolean;
  /** It knows the requests beside the standard protocol. */
  readonly ours: boolean;
  readonly readsFiles: boolean;
  readonly docs: string | undefined;
  readonly settings: unknown;
}

export function clientOf({ capabilities, initializationOptions }: InitializeParams): Client {
  const { textDocument, workspace, window } = capabilities;
  const options = optionsOf(initializationOptions);
  const ours = options.protocol === PROTOCOL_VERSION;
  return {
    capabilities,
    pullsDiagnostics: textDocument?.diagnostic !== undefined,
    pullsSettings: workspace?.configuration === true,
    watchesFiles: workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    showsProgress: window?.workDoneProgress === true,
    markdown: textDocument?.hover?.contentFormat?.includes("markdown") === true,
    snippets: textDocument?.completion?.completionItem?.snippetSupport === true,
    relatedDocuments: textDocument?.diagnostic?.relatedDocumentSupport === true,
    ours,
    readsFiles: ours && options.readsFiles === true,
    docs: typeof options.docs === "string" && options.docs.endsWith("/") ? options.docs : undefined,
    settings: options.settings,
  };
}

function optionsOf(sent: unknown): InitializationOptions {
  return typeof sent === "object" && sent !== null ? sent : {};
}
