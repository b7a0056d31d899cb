/**
 * The server where there is no Node. `self` is the scope of a worker; where an editor refuses workers, the client
 * runs this program with one end of a `MessageChannel` in its place. The first word says that it is there.
 */
import { serveOverPort } from "./over-port.ts";

const port = self as unknown as Worker | MessagePort;
port.postMessage("ready");
serveOverPort(port);
