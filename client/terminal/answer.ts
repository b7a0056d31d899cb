import {
  answerText,
  checkJson,
  diagnosticLines,
  type FileOutcome,
  type FileReport,
  jsonText,
  oneLine,
  PLAIN,
  withAsks,
} from "../../shared-core/index.ts";
import { writeAnswers } from "./answer-files.ts";
import { type Call, UnknownWord } from "./call.ts";
import { exitStatus } from "./check.ts";
import { inkOf } from "./colour.ts";
import { selectOne } from "./files.ts";
import { chosenCase, filesBehind, judgeSource } from "./judging.ts";
import { unitSystem } from "./settings.ts";
import { repeat } from "./watch.ts";

/** Answers what a file asks: tables and plots or JSON on stdout, what is wrong with the file on stderr. */
export function run(call: Call): Promise<number> {
  return repeat(call, async () => {
    const judged = await judgeSource(await selectOne(call), call.host);
    const [file] = chosenCase(call, [judged]);
    if (file.readable) answer(file, call);
    else call.host.stderr.write(`thrum: ${file.path} cannot be read: ${oneLine(file.reason)}\n`);
    return { status: exitStatus([file]), files: filesBehind(judged) };
  });
}

function answer(file: Extract<FileOutcome, { readable: true }>, call: Call): void {
  const { host } = call;
  const { report } = file;
  const asks = chosenAsks(report, call.operands.slice(1));
  const places = diagnosticLines(file.path, report, PLAIN);
  if (places.length > 0) host.stderr.write(`${places.join("\n")}\n`);
  if (call.has("json")) {
    host.stdout.write(jsonText(checkJson([{ ...file, report: withAsks(report, asks) }])));
  } else {
    const options = { ink: inkOf(host), units: unitSystem(call), width: host.stdout.width, asks };
    host.stdout.write(answerText(report, options));
  }
  for (const path of writeAnswers(report, asks, call)) host.stderr.write(`wrote ${path}\n`);
}

/** Names of the asks to show; `modes` stands for every ask of that kind. */
function chosenAsks(report: FileReport, words: readonly string[]): string[] {
  const answers = new Set(report.cases.flatMap((each) => [...each.answers.keys()]));
  const modes = new Set(["modes", ...modesAsks(report)]);
  if (words.length === 0) return ["modes", ...answers];
  return words.map((word) => {
    if (modes.has(word)) return "modes";
    if (answers.has(word)) return word;
    // Without a case there is nothing computed, and the diagnostics say why.
    if (report.cases.length === 0) return word;
    const known = [...answers, ...modes];
    const list = `there are ${known.join(", ")}`;
    throw new UnknownWord(`${report.file} asks nothing called ${word}`, word, known, list);
  });
}

function modesAsks(report: FileReport): string[] {
  return report.cases.flatMap((each) =>
    each.instance.asks.filter((ask) => ask.kind === "modes").map((ask) => ask.name),
  );
}
