import { CodeActionKind, type ServerCapabilities, TextDocumentSyncKind } from "vscode-languageserver";
import { TOKEN_MODIFIERS, TOKEN_TYPES } from "../shared-core/index.ts";
import type { Client } from "./client.ts";
import { IDENTIFIER } from "./diagnostics.ts";
import { COMPLETION_TRIGGERS, SIGNATURE_TRIGGERS } from "./features/completion.ts";

/**
 * What the server does; parts of 3.18 only for clients that know them. Longer than other functions because it is the
 * one list of it.
 */
export function capabilitiesFor({ capabilities, pullsDiagnostics }: Client): ServerCapabilities {
  const ranges = capabilities.textDocument?.rangeFormatting?.rangesSupport === true;
  return {
    positionEncoding: "utf-16",
    textDocumentSync: {
      openClose: true,
      change: TextDocumentSyncKind.Incremental,
      save: { includeText: false },
    },
    hoverProvider: true,
    completionProvider: { triggerCharacters: COMPLETION_TRIGGERS, resolveProvider: false },
    signatureHelpProvider: { triggerCharacters: SIGNATURE_TRIGGERS },
    definitionProvider: true,
    referencesProvider: true,
    documentHighlightProvider: true,
    documentSymbolProvider: true,
    workspaceSymbolProvider: true,
    codeActionProvider: {
      codeActionKinds: [CodeActionKind.QuickFix, CodeActionKind.Refactor, CodeActionKind.Source],
      resolveProvider: false,
    },
    codeLensProvider: { resolveProvider: true },
    documentFormattingProvider: true,
    documentRangeFormattingProvider: ranges ? { rangesSupport: true } : true,
    renameProvider: capabilities.textDocument?.rename?.prepareSupport ? { prepareProvider: true } : true,
    documentLinkProvider: { resolveProvider: false },
    foldingRangeProvider: true,
    selectionRangeProvider: true,
    inlayHintProvider: { resolveProvider: false },
    semanticTokensProvider: {
      legend: { tokenTypes: [...TOKEN_TYPES], tokenModifiers: [...TOKEN_MODIFIERS] },
      full: { delta: true },
      range: true,
    },
    ...(pullsDiagnostics
      ? {
          diagnosticProvider: {
            identifier: IDENTIFIER,
            interFileDependencies: true,
            workspaceDiagnostics: true,
          },
        }
      : {}),
    workspace: {
      workspaceFolders: { supported: true, changeNotifications: true },
      fileOperations: {
        willRename: {
          filters: [
            { pattern: { glob: "**/*", matches: "file" } },
            { pattern: { glob: "**/*", matches: "folder" } },
          ],
        },
      },
    },
  };
}
