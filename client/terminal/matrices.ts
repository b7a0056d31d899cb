import { diagnosticLines, oneLine, PLAIN, systemFiles } from "../../shared-core/index.ts";
import { type Call, EXIT } from "./call.ts";
import { selectOne } from "./files.ts";
import { chosenCase, judgeSource } from "./judging.ts";
import { needed } from "./settings.ts";
import { writeFiles } from "./write.ts";

/** Writes the equations of motion of one case, as written unless `--case` says otherwise. */
export async function run(call: Call): Promise<number> {
  const folder = needed(call, "to", "DIR");
  const { host } = call;
  const [file] = chosenCase(call, [await judgeSource(await selectOne(call), host)]);
  if (!file.readable) {
    host.stderr.write(`thrum: ${file.path} cannot be read: ${oneLine(file.reason)}\n`);
    return EXIT.cannotRun;
  }
  const [first] = file.report.cases;
  if (first === undefined) {
    host.stderr.write(`${diagnosticLines(file.path, file.report, PLAIN).join("\n")}\n`);
    host.stderr.write(`thrum: ${file.path} has errors that leave no equations to write\n`);
    return EXIT.fails;
  }
  for (const path of writeFiles(folder, systemFiles(first.instance.assembly), host))
    host.stdout.write(`${path}\n`);
  return EXIT.holds;
}
