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

/** Schemes of files that are models; the old side of a comparison (`git:`) is not one. */
export const FILE_SCHEMES: readonly string[] = [
  "file",
  "vscode-remote",
  "vscode-vfs",
  "vscode-test-web",
  "memfs",
];

export const SELECTOR = [...FILE_SCHEMES, "untitled"].map((scheme) => ({ language: "thrum", scheme }));

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
