import type { Connection, TextDocumentContentChangeEvent } from "vscode-languageserver";
import { TextDocument } from "vscode-languageserver-textdocument";
import type { Change } from "./session.ts";

export interface DocumentHandlers {
  opened(document: TextDocument): void;
  changed(uri: string, changes: readonly Change[]): void;
  saved(uri: string): void;
  closed(uri: string): void;
}

/** Keeps the texts of open documents, edit by edit, in UTF-16 units as the client counts them. */
export function followDocuments(connection: Connection, handlers: DocumentHandlers): void {
  const documents = new Map<string, TextDocument>();
  connection.onDidOpenTextDocument(({ textDocument: { uri, languageId, version, text } }) => {
    const document = TextDocument.create(uri, languageId, version, text);
    documents.set(uri, document);
    handlers.opened(document);
  });
  connection.onDidChangeTextDocument(({ textDocument: { uri, version }, contentChanges }) => {
    const document = documents.get(uri);
    if (document === undefined) return;
    const changes = contentChanges.map((change) => apply(document, change, version));
    if (changes.length > 0) handlers.changed(uri, changes);
  });
  connection.onDidSaveTextDocument(({ textDocument: { uri } }) => handlers.saved(uri));
  connection.onDidCloseTextDocument(({ textDocument: { uri } }) => {
    if (documents.delete(uri)) handlers.closed(uri);
  });
}

/** Each change counts in the text that the one before it left. */
function apply(document: TextDocument, change: TextDocumentContentChangeEvent, version: number): Change {
  const { text } = change;
  const whole = { start: 0, end: document.getText().length };
  const span =
    "range" in change
      ? { start: document.offsetAt(change.range.start), end: document.offsetAt(change.range.end) }
      : whole;
  TextDocument.update(document, [change], version);
  return { span, length: text.length };
}
