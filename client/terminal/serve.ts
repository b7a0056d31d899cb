import { type Call, UsageError } from "./call.ts";

/** Serves an editor until it goes; ends with the server's own exit status. */
export async function run(call: Call): Promise<number> {
  if (!call.has("stdio")) throw new UsageError("serve needs to know how to talk to the editor: --stdio");
  if (call.host.serve === undefined) throw new UsageError("serve needs a terminal program with its server");
  await call.host.serve();
  return new Promise(() => {});
}
