/** The server for an editor in a browser that runs it in its own thread; browser-worker.ts is the worker. */
export { serveOverPort as serveInPage } from "./over-port.ts";
