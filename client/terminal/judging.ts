import {
  type FileOutcome,
  type FileReport,
  judge,
  learnUnits,
  type Model,
  understand,
} from "../../shared-core/index.ts";
import { type Call, UnknownWord } from "./call.ts";
import type { Source } from "./files.ts";
import type { Host } from "./host.ts";
import { workspaceReader } from "./workspace.ts";

/** Judges a file. A fault of the program costs this file and is told on stderr; the others go on. */
export async function judgeSource(source: Source, host: Host): Promise<FileOutcome> {
  const { path, content } = source;
  if (!content.ok) return { readable: false, path, reason: content.detail };
  try {
    const report = judge(await understood(path, content.text, host));
    for (const { where, error } of report.faults) tellFault(host, `${path}, ${where}`, error);
    return { readable: true, path, report };
  } catch (error) {
    tellFault(host, path, error);
    return {
      readable: false,
      path,
      reason: "an internal fault of thrum; the details stand on standard error",
    };
  }
}

/** The model of a text; units that the language does not spell itself are looked up when one is met. */
async function understood(path: string, text: string, host: Host): Promise<Model> {
  const read = () => understand(path, text, workspaceReader(path, host.cwd));
  const model = read();
  return (await learnUnits(model)) ? read() : model;
}

function tellFault(host: Host, where: string, error: unknown): void {
  host.stderr.write(`thrum: internal fault in ${where}\n${error instanceof Error ? error.stack : error}\n`);
}

/** Files that a run read, for watching: the model and what it uses. */
export function filesBehind(outcome: FileOutcome): string[] {
  if (!outcome.readable) return [outcome.path];
  return [outcome.path, ...outcome.report.model.files];
}

/** Keeps only the case that `--case` names; without the option everything. */
export function chosenCase(call: Call, outcomes: readonly FileOutcome[]): readonly FileOutcome[] {
  const name = call.value("case");
  if (name === undefined) return outcomes;
  const known = new Set(
    outcomes.flatMap((each) => (each.readable ? each.report.model.cases.map((known) => known.name) : [])),
  );
  if (known.size > 0 && !known.has(name)) {
    const list = [...known].map((each) => JSON.stringify(each)).join(", ");
    throw new UnknownWord(`no file has a case ${name}`, name, [...known], `there are ${list}`);
  }
  return outcomes.map((each) => (each.readable ? { ...each, report: onlyCase(each.report, name) } : each));
}

function onlyCase(report: FileReport, name: string): FileReport {
  const first = report.model.cases[0]?.name;
  return {
    ...report,
    // What is wrong as written is wrong in every case.
    diagnostics: report.diagnostics.filter(
      (diagnostic) => diagnostic.case === undefined || diagnostic.case === name || diagnostic.case === first,
    ),
    cases: report.cases.filter((each) => each.name === name),
  };
}
