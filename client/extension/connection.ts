import * as vscode from "vscode";
import {
  type BaseLanguageClient,
  type LanguageClientOptions,
  RevealOutputChannelOn,
} from "vscode-languageclient";
import { type InitializationOptions, PROTOCOL_VERSION } from "../../shared-core/index.ts";

/** A language client, and what must be put away with it. */
export interface Connection extends vscode.Disposable {
  readonly client: BaseLanguageClient;
}

/** Schemes whose documents are models; the old side of a comparison (`git:`) is not one. */
const SCHEMES = ["file", "untitled", "vscode-vfs", "vscode-test-web", "memfs"];

export const SELECTOR = SCHEMES.map((scheme) => ({ language: "thrum", scheme }));

/** Options that do not depend on where the server runs. */
export function clientOptions(
  context: { readonly extensionUri: vscode.Uri },
  output: vscode.LogOutputChannel,
): LanguageClientOptions {
  const own: InitializationOptions = {
    protocol: PROTOCOL_VERSION,
    readsFiles: true,
    docs: `${vscode.Uri.joinPath(context.extensionUri, "docs").toString()}/`,
  };
  return {
    documentSelector: SELECTOR,
    initializationOptions: own,
    outputChannel: output,
    revealOutputChannelOn: RevealOutputChannelOn.Never,
    diagnosticCollectionName: "thrum",
    synchronize: { configurationSection: "thrum" },
    markdown: { isTrusted: false, supportHtml: false },
  };
}
