import * as vscode from "vscode";
import type { LanguageClientOptions, MessageTransports } from "vscode-languageclient";
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from "vscode-languageclient/browser";
import { serveInPage } from "../../../server/browser.ts";
import { clientOptions } from "../connection.ts";
import { start } from "../start.ts";

/** How long a worker may take to say that it is there, in ms; a refused one says nothing at all. */
const WORKER_PATIENCE = 3000;

/** The extension where there is no Node: the server is a worker, or runs in the extension's own thread. */
export function activate(context: vscode.ExtensionContext): void {
  start(context, {
    createConnection(output) {
      const options: LanguageClientOptions = clientOptions(context, output);
      const client = new LanguageClient("thrum", "Thrum", () => transports(context, output), options);
      return { client, dispose: () => void client.dispose().catch(() => undefined) };
    },
  });
}

async function transports(
  context: vscode.ExtensionContext,
  output: vscode.LogOutputChannel,
): Promise<MessageTransports> {
  const program = vscode.Uri.joinPath(context.extensionUri, "dist/server/browser.js");
  try {
    const worker = await startedWorker(program.toString(true));
    return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
  } catch (error) {
    output.info(`No worker for the server (${(error as Error).message}); it runs beside the extension`);
    const { port1, port2 } = new MessageChannel();
    serveInPage(port2);
    return { reader: new BrowserMessageReader(port1), writer: new BrowserMessageWriter(port1) };
  }
}

/** A worker that has said its first word, `ready`. */
function startedWorker(url: string): Promise<Worker> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(url);
    const late = setTimeout(() => fail("it did not answer"), WORKER_PATIENCE);
    const fail = (why: string) => {
      clearTimeout(late);
      worker.terminate();
      reject(new Error(why));
    };
    worker.onerror = (event) => fail(event.message || "it was refused");
    worker.onmessage = ({ data }) => {
      if (data !== "ready") return;
      clearTimeout(late);
      worker.onmessage = null;
      worker.onerror = null;
      resolve(worker);
    };
  });
}
