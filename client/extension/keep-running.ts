import * as vscode from "vscode";
import { type BaseLanguageClient, CloseAction, ErrorAction, State } from "vscode-languageclient";
import type { Connection } from "./connection.ts";

/** Starts the server, and again when it ended by itself. */
export interface Supervisor {
  start(): Promise<void>;
  restart(): Promise<void>;
}

/** Ends by itself that are answered with a new start, within `WINDOW` ms; then the user is asked. */
const MOST_RESTARTS = 5;
const WINDOW = 180_000;

/**
 * Sets what happens when the connection is lost: a new start at once, without a word; after several within three
 * minutes one message with a way to start it again. Documents are sent anew by the client.
 */
export function keepRunning({ client }: Connection, output: vscode.LogOutputChannel): Supervisor {
  const ends: number[] = [];
  client.clientOptions.errorHandler = {
    error: (error) => {
      output.error(`The connection to the server: ${error.message}`);
      return { action: ErrorAction.Continue, handled: true };
    },
    closed: () => {
      const now = Date.now();
      ends.push(now);
      while (ends[0] < now - WINDOW) ends.shift();
      output.warn(`The server ended by itself, ${ends.length} of ${MOST_RESTARTS} within three minutes`);
      if (ends.length <= MOST_RESTARTS) return { action: CloseAction.Restart, handled: true };
      void offerRestart(client, output, ends);
      return { action: CloseAction.DoNotRestart, handled: true };
    },
  };
  return {
    start: () => client.start(),
    async restart() {
      ends.length = 0;
      if (client.state === State.Running) await client.stop().catch((error) => output.error(error));
      await client.start();
    },
  };
}

async function offerRestart(
  client: BaseLanguageClient,
  output: vscode.LogOutputChannel,
  ends: number[],
): Promise<void> {
  const [restart, show] = [vscode.l10n.t("Restart"), vscode.l10n.t("Show log")];
  const message = vscode.l10n.t("The Thrum server ended {0} times within three minutes.", ends.length);
  const chosen = await vscode.window.showErrorMessage(message, restart, show);
  if (chosen === show) output.show();
  if (chosen !== restart) return;
  ends.length = 0;
  await client.start();
}
