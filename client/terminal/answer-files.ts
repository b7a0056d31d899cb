import { answerFiles, type FileReport, type TextFile } from "../../shared-core/index.ts";
import type { Call } from "./call.ts";
import { unitSystem } from "./settings.ts";
import { writeFiles } from "./write.ts";

/** Writes what `--csv` and `--svg` ask for; hands back the paths as they are shown. */
export function writeAnswers(report: FileReport, asks: readonly string[], call: Call): string[] {
  const written = (option: "csv" | "svg"): string[] => {
    const folder = call.value(option);
    if (folder === undefined) return [];
    const files: TextFile[] = answerFiles(report, { asks, as: option, units: unitSystem(call) });
    return writeFiles(folder, files, call.host);
  };
  return [...written("csv"), ...written("svg")];
}
