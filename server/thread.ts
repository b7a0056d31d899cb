/** The thread in which numbers are computed; main.ts starts it. */
import { parentPort } from "node:worker_threads";
import { runThread } from "./engine-thread.ts";
import { tidyWhenIdle } from "./tidy.ts";

if (parentPort) {
  tidyWhenIdle();
  runThread(parentPort);
}
