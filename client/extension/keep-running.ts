import * as vscode from "vscode";
import {
  type BaseLanguageClient,
  CloseAction,
  ErrorAction,
  type ErrorHandler,
  State,
} from "vscode-languageclient";

/** Starts the server, and again when it ended by itself. */
export interface Supervisor {
  start(): Promise<void>;
  restart(): Promise<void>;
}

/** Pauses before the starts that follow ends within `WINDOW`, in ms; after them the user is asked. */
const PAUSES = [0, 250, 500, 1000, 2000];
const WINDOW = 180_000;
/** A start that failed may be followed by one that does not, for so long, in ms. */
const GRACE = 5000;

/**
 * Sets what happens when the connection is lost: a new start without a word; after several within three minutes
 * one message with a way to start it again. Documents are sent anew by the client.
 */
export function keepRunning(client: BaseLanguageClient, output: vscode.LogOutputChannel): Supervisor {
  const ends: number[] = [];
  // What the client has to say of a start that failed goes to the log; people are told once, below.
  const log = client.error.bind(client);
  client.error = (message, data) => log(message, data, false);
  client.clientOptions.initializationFailedHandler = (error) => {
    output.error(`The server ended while it started: ${String(error?.message ?? error)}`);
    return false;
  };
  const supervisor: Supervisor = {
    async start() {
      try {
        await client.start();
      } catch (error) {
        output.error(error as Error);
        await new Promise((resolve) => setTimeout(resolve, GRACE));
        const gaveUp = ends.length > PAUSES.length;
        if (client.state === State.Stopped && !gaveUp)
          void offerRestart(supervisor, output, vscode.l10n.t("The Thrum server could not be started."));
      }
    },
    async restart() {
      ends.length = 0;
      if (client.state === State.Running) await client.stop().catch((error) => output.error(error));
      await supervisor.start();
    },
  };
  const handler: ErrorHandler = {
    error: (error) => {
      output.error(`The connection to the server: ${error.message}`);
      return { action: ErrorAction.Continue, handled: true };
    },
    async closed() {
      const now = Date.now();
      ends.push(now);
      while (ends[0] < now - WINDOW) ends.shift();
      output.warn(`The server ended by itself, ${ends.length} of ${PAUSES.length} within three minutes`);
      if (ends.length > PAUSES.length) {
        const told = vscode.l10n.t("The Thrum server ended {0} times within three minutes.", ends.length);
        void offerRestart(supervisor, output, told);
        return { action: CloseAction.DoNotRestart, handled: true };
      }
      await new Promise((resolve) => setTimeout(resolve, PAUSES[ends.length - 1]));
      return { action: CloseAction.Restart, handled: true };
    },
  };
  client.clientOptions.errorHandler = handler;
  return supervisor;
}

async function offerRestart(
  supervisor: Supervisor,
  output: vscode.LogOutputChannel,
  message: string,
): Promise<void> {
  const [restart, show] = [vscode.l10n.t("Restart"), vscode.l10n.t("Show log")];
  const chosen = await vscode.window.showErrorMessage(message, restart, show);
  if (chosen === show) output.show();
  if (chosen === restart) await supervisor.restart();
}
