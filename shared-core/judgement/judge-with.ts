import type { ModeTable } from "../answers/answer.ts";
import { CODES } from "../diagnostics/codes.ts";
import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { Ask, Expectation, Instance, Model } from "../model/model.ts";
import { fail, type Outcome } from "../numerics/outcome.ts";
import { sortAccepted } from "./accept.ts";
import { judgeExpectations, unjudged } from "./expectations.ts";
import { RULES } from "./registry.ts";
import type { AnswerResult, CaseReport, FileReport, InternalFault, JudgeOptions } from "./report.ts";
import type { CostClass, Finding, Judged, Rule, RuleContext } from "./rule.ts";
import { finish, type Steps } from "./steps.ts";
import type { Remark, Trial } from "./trial.ts";
import { type Sources, trialOf } from "./trial-of.ts";

/** `judge` with its sources given from outside, so that it can be tried on hand-made ones. */
export function judgeWith(sources: Sources, model: Model, options: JudgeOptions = {}): FileReport {
  return finish(judgeSteps(sources, model, options.upTo), options.cancelled ?? (() => false));
}

/** The same piece by piece: each answer, each corner of a tolerance, each rule is a step. */
export function* judgeSteps(
  sources: Sources,
  model: Model,
  upTo: CostClass = "answers",
  known: readonly (readonly Judged[] | undefined)[] = [],
): Steps<FileReport> {
  const work: Work = {
    sources,
    model,
    known,
    wanted: WANTED[upTo],
    done: new Set(),
    diagnostics: [...model.diagnostics],
    keys: new Set(),
    faults: [],
  };
  const cases: CaseReport[] = [];
  if (model.buildable) {
    for (let index = 0; index < model.cases.length && !(yield); index++) {
      const report = yield* judgeCase(work, index);
      if (report !== undefined) cases.push(report);
    }
  }
  const done = (yield) || work.faults.length > 0 ? new Set<CostClass>() : work.done;
  const { said, accepted } = sortAccepted(model, work.diagnostics, done);
  return {
    file: model.file,
    model,
    diagnostics: inOrder(said),
    accepted,
    cases,
    faults: work.faults,
  };
}

const WANTED: Readonly<Record<CostClass, ReadonlySet<CostClass>>> = {
  text: new Set(["text"]),
  modes: new Set(["text", "modes"]),
  answers: new Set(["text", "modes", "answers"]),
};

interface Work {
  readonly sources: Sources;
  readonly model: Model;
  /** By case, expectations that were judged in an earlier text of the same meaning. */
  readonly known: readonly (readonly Judged[] | undefined)[];
  readonly wanted: ReadonlySet<CostClass>;
  /** Cost classes of which every rule has been asked in every case so far. */
  readonly done: Set<CostClass>;
  readonly diagnostics: Diagnostic[];
  /** What has been said as written, so that cases do not repeat it. */
  readonly keys: Set<string>;
  readonly faults: InternalFault[];
}

function* judgeCase(work: Work, index: number): Steps<CaseReport | undefined> {
  const name = work.model.cases[index].name;
  const remarks: Remark[] = [];
  const trial = behindWall(work, "instance", name, () =>
    trialOf(work.sources, work.model, index, {
      remark: (remark) => remarks.push(remark),
      fault: (where, error) => sayFault(work, where, name, error),
    }),
  );
  if (trial === undefined) return undefined;
  sayInstance(work, index, trial.instance);
  const modes = readModes(work, name, trial);
  const answers = yield* readAnswers(work, name, trial);
  const judged = work.wanted.has("answers") ? yield* readExpectations(work, index, trial, remarks) : [];
  const { instance, analysis } = trial;
  const context: RuleContext = {
    model: work.model,
    instance,
    assembly: instance.assembly,
    analysis,
    modes,
    answers,
    judged,
    evaluate: trial.evaluate,
  };
  yield* askRules(work, index, context);
  return {
    name,
    instance,
    analysis,
    modes: modes.ok ? { ok: true, table: modes.value } : { ok: false, reason: modes.reason },
    answers,
    verdicts: judged.map(({ verdict }) => verdict),
    judged,
  };
}

/** Diagnostics that come with the numbers of a case; a case does not repeat those as written. */
function sayInstance(work: Work, index: number, instance: Instance): void {
  for (const diagnostic of instance.diagnostics) {
    sayOnce(work, index, diagnostic, diagnostic.message);
  }
}

function readModes(work: Work, name: string, trial: Trial): Outcome<ModeTable> {
  if (!work.wanted.has("modes")) return fail("modes were not asked for");
  return behindWall(work, "modes", name, () => trial.modes()) ?? fail("modes could not be computed");
}

function* readAnswers(work: Work, name: string, trial: Trial): Steps<ReadonlyMap<string, AnswerResult>> {
  const answers = new Map<string, AnswerResult>();
  if (!work.wanted.has("answers")) return answers;
  for (const ask of trial.instance.asks) {
    if (ask.kind === "modes" || (yield)) continue;
    const answer = behindWall(work, ask.name, name, () => answerOf(trial, ask));
    answers.set(ask.name, answer ?? noAnswer(ask, "it could not be computed"));
  }
  return answers;
}

/** The answer of one ask that is not of modes. */
export function answerOf(trial: Trial, ask: Ask): AnswerResult {
  if (ask.kind === "sweep") {
    if (trial.noSteadyAnswer !== undefined) return noAnswer(ask, trial.noSteadyAnswer);
    const sweep = trial.analysis.sweep(ask);
    return sweep.ok ? sweep : noAnswer(ask, sweep.reason);
  }
  if (ask.kind === "history") {
    const history = trial.analysis.history(ask);
    return history.ok ? history : noAnswer(ask, history.reason);
  }
  return noAnswer(ask, "this version does not compute it");
}

const noAnswer = (ask: Ask, reason: string): AnswerResult => ({
  ok: false,
  kind: ask.kind === "later" ? ask.askKind : ask.kind,
  reason,
});

function* readExpectations(
  work: Work,
  index: number,
  trial: Trial,
  remarks: Remark[],
): Steps<readonly Judged[]> {
  const { name } = work.model.cases[index];
  const meant = work.model.expectations.filter(({ cases }) => cases === undefined || cases.includes(name));
  const known = work.known[index];
  if (known?.length === meant.length) {
    return meant.map((expectation, i) => judgedAgain(trial, expectation, known[i]));
  }
  try {
    return yield* judgeExpectations(trial, remarks, meant);
  } catch (error) {
    sayFault(work, "expectations", name, error);
    return meant.map((expectation) => unjudged(expectation));
  }
}

/** What was found of an expectation holds for the same one of another text. */
function judgedAgain({ instance }: Trial, expectation: Expectation, known: Judged): Judged {
  const asks = new Map(instance.asks.map((ask) => [ask.name, ask]));
  return {
    ...known,
    expectation,
    verdict: { ...known.verdict, expectation },
    remarks: known.remarks.map((remark) => ({ ...remark, ask: asks.get(remark.ask.name) ?? remark.ask })),
  };
}

function* askRules(work: Work, index: number, context: RuleContext): Steps<void> {
  const done = new Set(work.wanted);
  for (const rule of RULES) {
    if (!work.wanted.has(rule.cost)) continue;
    if (yield) {
      done.delete(rule.cost);
      continue;
    }
    const name = work.model.cases[index].name;
    const findings = behindWall(work, rule.code, name, () => rule.check(context)) ?? [];
    for (const finding of findings) say(work, index, rule, finding);
  }
  for (const cost of done) work.done.add(cost);
}

function say(work: Work, index: number, { code }: Pick<Rule, "code">, finding: Finding): void {
  const { key, ...rest } = finding;
  sayOnce(work, index, { code, severity: CODES[code], ...rest }, key ?? finding.message);
}

function sayOnce(work: Work, index: number, diagnostic: Diagnostic, key: string): void {
  const { code, span } = diagnostic;
  const whole = `${code} ${span.start} ${key}`;
  if (index === 0) work.keys.add(whole);
  else if (work.keys.has(whole)) return;
  work.diagnostics.push(index === 0 ? diagnostic : { ...diagnostic, case: work.model.cases[index].name });
}

/** A bug costs what stands behind the wall and no more; it is handed to the caller. */
function behindWall<T>(work: Work, where: string, name: string, run: () => T): T | undefined {
  try {
    return run();
  } catch (error) {
    sayFault(work, where, name, error);
    return undefined;
  }
}

/** Once for each place and case: a function may break at every corner of the bands. */
function sayFault(work: Work, where: string, name: string, error: unknown): void {
  if (work.faults.some((fault) => fault.where === where && fault.case === name)) return;
  work.faults.push({ where, case: name, error });
}

/** By place, as written before cases, otherwise as said. */
function inOrder(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  return [...diagnostics].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
}
