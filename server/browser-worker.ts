/** The server as a worker of a browser. Its first word tells the client that it was not refused. */
import { serveOverPort } from "./over-port.ts";

const scope = globalThis as unknown as Worker;
scope.postMessage("ready");
serveOverPort(scope);
