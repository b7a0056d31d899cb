import {
  checkJson,
  type FileOutcome,
  holds,
  jsonText,
  summaryLine,
  verdictText,
} from "../../shared-core/index.ts";
import { type Call, EXIT } from "./call.ts";
import { inkOf } from "./colour.ts";
import { reportUnmatched, select } from "./files.ts";
import { chosenCase, filesBehind, judgeSource } from "./judging.ts";
import { unitSystem } from "./settings.ts";
import { repeat } from "./watch.ts";

/** Judges files: text or JSON on stdout, the verdict as exit status. */
export function run(call: Call): Promise<number> {
  return repeat(call, async () => {
    const selection = await select(call);
    const unmatched = reportUnmatched(selection, call.host);
    const judged = await Promise.all(selection.sources.map((source) => judgeSource(source, call.host)));
    const files = chosenCase(call, judged);
    call.host.stdout.write(call.has("json") ? jsonText(checkJson(files)) : text(files, call));
    return { status: unmatched ? EXIT.cannotRun : exitStatus(files), files: judged.flatMap(filesBehind) };
  });
}

/** An unread file or a broken rule outweighs a failed expectation: the run did not do what it was asked. */
export function exitStatus(files: readonly FileOutcome[]): number {
  if (files.some((file) => !file.readable || file.report.faults.length > 0)) return EXIT.cannotRun;
  return files.every(holds) ? EXIT.holds : EXIT.fails;
}

function text(files: readonly FileOutcome[], call: Call): string {
  const options = { ink: inkOf(call.host), units: unitSystem(call) };
  const parts = files.map((file) => verdictText(file, options));
  return files.length > 1 ? [...parts, summaryLine(files)].join("\n") : parts.join("");
}
