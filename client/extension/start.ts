import * as vscode from "vscode";
import { STATE, type StateParams } from "../../shared-core/index.ts";
import { registerCommands } from "./commands.ts";
import type { Connection } from "./connection.ts";
import { keepRunning } from "./keep-running.ts";
import { registerRowPaste } from "./paste-rows.ts";
import { answerFileRequests } from "./read-files.ts";
import { registerSheet } from "./sheet.ts";
import { registerStatus } from "./status.ts";
import { registerTests } from "./tests.ts";

/** What both hosts, desktop and browser, give: a way to start a language client. */
export interface Start {
  /** Makes a client that is not started yet. */
  createConnection(output: vscode.LogOutputChannel): Connection;
}

/** Everything the extension contributes, on one client. Does not wait for the server to be up. */
export function start(context: vscode.ExtensionContext, host: Start): void {
  const output = vscode.window.createOutputChannel("Thrum", { log: true });
  const connection = host.createConnection(output);
  const { client } = connection;
  const supervisor = keepRunning(client, output);
  // A client keeps one listener a method, and several parts want to hear of the numbers.
  const states = new vscode.EventEmitter<StateParams>();
  client.onNotification(STATE, (state: StateParams) => states.fire(state));
  answerFileRequests(client);
  context.subscriptions.push(
    output,
    connection,
    states,
    registerStatus(client, states.event),
    registerTests(client, states.event),
    registerRowPaste(client),
    registerSheet(context, client, states.event),
    ...registerCommands(client, supervisor, output),
  );
  void vscode.commands.executeCommand("setContext", "thrum.active", true);
  supervisor.start().catch((error) => output.error(error));
}
