import type { Mode, Peak } from "../answers/answer.ts";
import type { Diagnostic, Fix } from "../diagnostics/diagnostic.ts";
import type { AnswerResult, CaseReport, Verdict } from "../judgement/report.ts";
import type { ParameterValue } from "../model/model.ts";
import { LineIndex } from "../text/line-index.ts";
import type { Span } from "../text/span.ts";
import { siUnit } from "../units/show.ts";
import type { FileOutcome } from "./file-outcome.ts";
import { holds } from "./file-outcome.ts";
import type { Json } from "./json-text.ts";

/** The document of `thrum check --json`, as docs/schema/check.json has it. SI values, rates in Hz. */
export function checkJson(files: readonly FileOutcome[]): Json {
  return { thrum: 1, holds: files.every(holds), files: files.map(fileJson) };
}

export function fileJson(file: FileOutcome): Json {
  if (!file.readable) {
    const place = { line: 0, character: 0 };
    const diagnostic = {
      code: "file-unreadable",
      severity: "error",
      message: file.reason,
      range: { start: place, end: place },
    };
    return { file: file.path, diagnostics: [diagnostic], cases: [] };
  }
  const lines = new LineIndex(file.report.model.tree.text);
  return {
    file: file.path,
    diagnostics: file.report.diagnostics.map((diagnostic) => diagnosticJson(diagnostic, lines)),
    cases: file.report.cases.map(caseJson),
  };
}

function diagnosticJson(diagnostic: Diagnostic, lines: LineIndex): Json {
  return {
    code: diagnostic.code,
    severity: diagnostic.severity,
    message: diagnostic.message,
    hint: diagnostic.hint,
    case: diagnostic.case,
    range: rangeJson(diagnostic.span, lines),
    fix: diagnostic.fixes?.length ? fixJson(diagnostic.fixes[0], lines) : undefined,
  };
}

function rangeJson(span: Span, lines: LineIndex): Json {
  const { start, end } = lines.range(span);
  return {
    start: { line: start.line, character: start.character },
    end: { line: end.line, character: end.character },
  };
}

function fixJson(fix: Fix, lines: LineIndex): Json {
  return {
    title: fix.title,
    safe: fix.safe,
    edits: fix.edits.map((edit) => ({ range: rangeJson(edit.span, lines), text: edit.text })),
  };
}

function caseJson(report: CaseReport): Json {
  const coordinates = report.instance.assembly.coordinates.map((coordinate) => coordinate.name);
  const modes = report.modes.ok
    ? { modes: report.modes.table.modes.map((mode) => modeJson(mode, coordinates)) }
    : { modes: null, reason: report.modes.reason };
  return {
    name: report.name,
    parameters: record([...report.instance.parameters], parameterJson),
    coordinates,
    ...modes,
    answers: record([...report.answers], answerJson),
    expectations: report.verdicts.map(verdictJson),
  };
}

function parameterJson(parameter: ParameterValue): Json {
  return {
    value: finite(parameter.value),
    unit: siUnit(parameter),
    written: parameter.written,
    low: parameter.low,
    high: parameter.high,
    reason: Number.isFinite(parameter.value) ? undefined : "its expression has no finite value",
  };
}

function modeJson(mode: Mode, coordinates: readonly string[]): Json {
  const shape = coordinates.map((name, i) => [name, [finite(mode.shape.re[i]), finite(mode.shape.im[i])]]);
  return {
    number: mode.number,
    frequencyHz: finite(mode.frequencyHz),
    dampedFrequencyHz: finite(mode.dampedFrequencyHz),
    dampingRatio: finite(mode.dampingRatio),
    eigenvalue: mode.eigenvalue.map(finite),
    realRoots: mode.realRoots?.map(finite),
    shape: Object.fromEntries(shape),
    effectiveMass: record(Object.entries(mode.effectiveMass), finite),
    energyShare: record(Object.entries(mode.energyShare), finite),
    reason: whyNull(mode),
  };
}

function whyNull(mode: Mode): string | undefined {
  if (mode.number === null) return "this root has no undamped partner";
  if (mode.number === 0 && mode.dampingRatio === null) return "a free mode has no damping ratio";
  return undefined;
}

function answerJson(result: AnswerResult): Json {
  if (!result.ok) return { kind: result.kind, series: null, peaks: null, reason: result.reason };
  const answer = result.value;
  if (answer.kind === "sweep")
    return {
      kind: answer.kind,
      frequencyHz: samples(answer.frequencyHz),
      series: record([...answer.series], ({ unit, re, im, reason }) => ({
        unit,
        re: samples(re),
        im: samples(im),
        reason: reason ?? missingSamples(re, im),
      })),
      peaks: record([...answer.peaks], (peak) => peakJson(peak, "atHz")),
    };
  return {
    kind: answer.kind,
    timeS: samples(answer.timeS),
    series: record([...answer.series], ({ unit, values }) => ({
      unit,
      values: samples(values),
      reason: missingSamples(values),
    })),
    peaks: record([...answer.peaks], (peak) => peakJson(peak, "atS")),
  };
}

function peakJson(peak: Peak | { readonly reason: string }, at: "atHz" | "atS"): Json {
  if ("reason" in peak) return { value: null, [at]: null, reason: peak.reason };
  const reason = Number.isFinite(peak.value) ? undefined : "it grows without bound";
  return { value: finite(peak.value), [at]: finite(peak.at), reason };
}

function verdictJson(verdict: Verdict): Json {
  return {
    name: verdict.name,
    holds: verdict.holds,
    value: finite(verdict.value),
    limit: finite(verdict.limit),
    unit: verdict.unit,
    margin: finite(verdict.margin),
    reason: verdict.reason ?? (verdict.holds === null ? "it could not be computed" : undefined),
    tolerance: toleranceJson(verdict.tolerance),
  };
}

function toleranceJson(tolerance: Verdict["tolerance"]): Json | undefined {
  if (tolerance === undefined) return undefined;
  return {
    kind: tolerance.kind,
    holds: tolerance.holds,
    worst: finite(tolerance.worst),
    at: tolerance.at && record(Object.entries(tolerance.at), finite),
    how: tolerance.how,
    share: tolerance.share,
    samples: tolerance.samples,
    reason: tolerance.reason ?? (tolerance.holds === null ? "it could not be computed" : undefined),
  };
}

/** JSON has no NaN and no infinity: null, with a reason beside it. */
function finite(value: number | null | undefined): number | null {
  return value !== null && value !== undefined && Number.isFinite(value) ? value : null;
}

const samples = (values: Float64Array): Json => Array.from(values, finite);

function missingSamples(...parts: readonly Float64Array[]): string | undefined {
  return parts.some((part) => part.some((value) => !Number.isFinite(value)))
    ? "some points have no finite value"
    : undefined;
}

function record<T>(entries: readonly (readonly [string, T])[], json: (value: T) => Json): Json {
  return Object.fromEntries(entries.map(([key, value]) => [key, json(value)]));
}
