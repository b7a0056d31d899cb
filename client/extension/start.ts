import * as vscode from "vscode";
import { registerCommands } from "./commands.ts";
import type { Connection } from "./connection.ts";
import { keepRunning } from "./keep-running.ts";
import { registerRowPaste } from "./paste-rows.ts";
import { answerFileRequests } from "./read-files.ts";
import { registerStatus } from "./status.ts";
import { registerTests } from "./tests.ts";

/** What both hosts, desktop and browser, give: a way to start a language client. */
export interface Start {
  /** Makes a client that is not started yet. */
  createConnection(output: vscode.LogOutputChannel): Connection;
}

/** Everything the extension contributes, on one client. */
export async function start(context: vscode.ExtensionContext, host: Start): Promise<void> {
  const output = vscode.window.createOutputChannel("Thrum", { log: true });
  const connection = host.createConnection(output);
  context.subscriptions.push(output, connection);
  const supervisor = keepRunning(connection, output);
  answerFileRequests(connection.client);
  context.subscriptions.push(
    registerStatus(connection.client),
    registerTests(connection.client),
    registerRowPaste(connection.client),
    ...registerCommands(connection.client, supervisor, output),
  );
  await supervisor.start();
}
