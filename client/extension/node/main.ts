import type * as vscode from "vscode";
import { LanguageClient, TransportKind } from "vscode-languageclient/node";
import { clientOptions } from "../connection.ts";
import { start } from "../start.ts";

/** The extension where there is Node: the server is a process of its own. */
export function activate(context: vscode.ExtensionContext): void {
  const module = context.asAbsolutePath("dist/server/main.js");
  start(context, {
    createConnection(output) {
      const client = new LanguageClient(
        "thrum",
        "Thrum",
        { module, transport: TransportKind.ipc },
        clientOptions(context, output),
      );
      return { client, dispose: () => void client.dispose().catch(() => undefined) };
    },
  });
}
