import { judge } from "../../shared-core/judgement/judge.ts";
import type { FileReport, JudgeOptions, Verdict } from "../../shared-core/judgement/report.ts";
import type { FileReader, Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";

const nothing: FileReader = { read: () => ({ ok: false, why: "missing", detail: "no such file" }) };

export const modelOf = (text: string): Model => understand("pier.thrum", `thrum 1\n${text}`, nothing);

/** The report on a text, without the version line; a fault of Thrum fails the test. */
export function judged(text: string, options?: JudgeOptions): FileReport {
  const report = judge(modelOf(text), options);
  if (report.faults.length > 0) throw report.faults[0].error;
  return report;
}

/** Verdict of the expectation `held` of a text, as written. */
export function verdictOf(text: string, name = "held"): Verdict {
  const report = judged(text);
  const verdict = report.cases[0]?.verdicts.find((candidate) => candidate.name === name);
  if (verdict === undefined) throw new Error(report.diagnostics.map(({ message }) => message).join("\n"));
  return verdict;
}

/** Value of an expression over a model: written as an expectation that holds for any value. */
export function valueIn(text: string, expression: string): number {
  const { value, reason } = verdictOf(`${text}\nexpect held = ${expression} >= 0\n`);
  if (value === null) throw new Error(reason);
  return value;
}

export const codesOf = (report: FileReport): readonly string[] => report.diagnostics.map(({ code }) => code);

export const saidOf = (report: FileReport, code: string): FileReport["diagnostics"] =>
  report.diagnostics.filter((diagnostic) => diagnostic.code === code);
