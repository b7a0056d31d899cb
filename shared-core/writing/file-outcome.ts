import type { FileReport } from "../judgement/report.ts";

/** What became of one file of a run: judged, or not even read. `path` is relative, with `/`. */
export type FileOutcome =
  | { readonly readable: true; readonly path: string; readonly report: FileReport }
  | { readonly readable: false; readonly path: string; readonly reason: string };

/**
 * True when nothing stands against a file: no error, no rule that broke, and every expectation holds in every
 * case. One that could not be computed does not hold: a build that passes must not rest on a number that is not
 * there, nor on a rule that was not asked.
 */
export function holds(file: FileOutcome): boolean {
  if (!file.readable) return false;
  const { diagnostics, cases, faults } = file.report;
  return (
    faults.length === 0 &&
    diagnostics.every((diagnostic) => diagnostic.severity !== "error") &&
    cases.every((report) => report.verdicts.every((verdict) => verdict.holds === true))
  );
}
