import { BrowserMessageReader, BrowserMessageWriter, createConnection } from "vscode-languageserver/browser";
import { version } from "../package.json";
import { serve } from "./connection.ts";
import { LocalEngine } from "./engine-local.ts";

/**
 * Serves over a message port: a worker's own scope, or one end of a `MessageChannel` when the server runs beside
 * its client in one thread. Files come from the client; numbers are computed in slices between messages.
 */
export function serveOverPort(port: MessagePort | Worker): void {
  if ("start" in port) port.start();
  const connection = createConnection(new BrowserMessageReader(port), new BrowserMessageWriter(port));
  serve(connection, { startEngine: () => new LocalEngine(), version });
}
