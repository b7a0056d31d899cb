import { oneLine, outlineOf, understand } from "../../shared-core/index.ts";
import { type Call, EXIT } from "./call.ts";
import { selectOne } from "./files.ts";
import { workspaceReader } from "./workspace.ts";

/** Writes the canonical text of a model. A model with errors has one too: a diff must show those revisions. */
export async function run(call: Call): Promise<number> {
  const { host } = call;
  const { path, content } = await selectOne(call);
  if (!content.ok) {
    host.stderr.write(`thrum: ${path} cannot be read: ${oneLine(content.detail)}\n`);
    return EXIT.cannotRun;
  }
  const model = understand(path, content.text, workspaceReader(path, host.cwd));
  host.stdout.write(outlineOf(model));
  return EXIT.holds;
}
