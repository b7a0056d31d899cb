import * as vscode from "vscode";
import type { MessageTransports } from "vscode-languageclient";
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from "vscode-languageclient/browser";
import { clientOptions } from "../connection.ts";
import { start } from "../start.ts";

/** How long the server may take to say that it is there, in ms; a refused worker says nothing at all. */
const PATIENCE = 3000;

/** The extension where there is no Node: the server is a worker, or runs in the extension's own thread. */
export function activate(context: vscode.ExtensionContext): void {
  start(context, {
    createConnection(output) {
      const transports = () => connect(context, output);
      const client = new LanguageClient("thrum", "Thrum", transports, clientOptions(context, output));
      return { client, dispose: () => void client.dispose().catch(() => undefined) };
    },
  });
}

async function connect(
  context: vscode.ExtensionContext,
  output: vscode.LogOutputChannel,
): Promise<MessageTransports> {
  const program = vscode.Uri.joinPath(context.extensionUri, "dist/server/core.cjs");
  const source = new TextDecoder().decode(await vscode.workspace.fs.readFile(program));
  const port = await startWorker(source).catch((error: Error) => {
    output.info(`No worker for the server (${error.message}); it runs beside the extension`);
    return startBeside(source);
  });
  return { reader: new BrowserMessageReader(port), writer: new BrowserMessageWriter(port) };
}

/** From the text, because a worker may not be loaded from where the extension lies. */
async function startWorker(source: string): Promise<Worker> {
  const url = URL.createObjectURL(new Blob([source], { type: "text/javascript" }));
  const worker = new Worker(url);
  try {
    await firstWord(worker);
    return worker;
  } catch (error) {
    worker.terminate();
    throw error;
  } finally {
    URL.revokeObjectURL(url);
  }
}

/** Runs the worker's program in this thread; it speaks through the port that it is given as its scope. */
async function startBeside(source: string): Promise<MessagePort> {
  const { port1, port2 } = new MessageChannel();
  const ready = firstWord(port1);
  new Function("self", source)(port2);
  await ready;
  return port1;
}

/** Resolves when the other side has said its first word, `ready`. */
function firstWord(port: Worker | MessagePort): Promise<void> {
  return new Promise((resolve, reject) => {
    const late = setTimeout(() => end(() => reject(new Error("it did not answer"))), PATIENCE);
    const refused = (event: Event) =>
      end(() => reject(new Error((event as ErrorEvent).message || "it was refused")));
    const end = (then: () => void) => {
      clearTimeout(late);
      port.onmessage = null;
      port.removeEventListener("error", refused);
      then();
    };
    port.addEventListener("error", refused);
    port.onmessage = ({ data }: MessageEvent) => {
      if (data === "ready") end(resolve);
    };
  });
}
