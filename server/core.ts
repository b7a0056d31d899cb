/**
 * The core as one program, for a server on Node to load. Where there is no Node it is the server as well: `self` is
 * the scope of a worker, or one end of a `MessageChannel` that the client hands in where workers are refused. The
 * first word says that it is there.
 */
import { serveOverPort } from "./over-port.ts";

export * from "../shared-core/index.ts";

if (typeof self !== "undefined") {
  const port = self as unknown as Worker | MessagePort;
  port.postMessage("ready");
  serveOverPort(port);
}
