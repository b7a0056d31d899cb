import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { CaseReport, FileReport, Verdict } from "../judgement/report.ts";
import { writtenUnit } from "../judgement/shown-unit.ts";
import type { Instance } from "../model/model.ts";
import { isNumber, sameKind } from "../units/quantity.ts";
import { formatNumber, siUnit, type UnitSystem } from "../units/show.ts";
import { type FileOutcome, holds } from "./file-outcome.ts";
import type { Ink } from "./ink.ts";
import { diagnosticLines, oneLine } from "./places-text.ts";
import { type Column, tableLines } from "./table.ts";
import { inUnit, largest, type ShownUnit, unitView } from "./units/unit-view.ts";
import { writtenUnits } from "./units/written-units.ts";

export interface TextOptions {
  readonly ink: Ink;
  readonly units: UnitSystem;
}

/** What `thrum check` says of one file: expectations by case, then diagnostics, then one line with the verdict. */
export function verdictText(file: FileOutcome, options: TextOptions): string {
  const { ink } = options;
  if (!file.readable)
    return `${file.path}:1:1: ${ink.bad("error")} file-unreadable ${oneLine(file.reason)}\n`;
  const { report, path } = file;
  const title = report.model.title === undefined ? [] : [ink.strong(oneLine(report.model.title)), ""];
  const cases = report.cases.flatMap((each, index) => caseLines(report, each, index === 0, options));
  const places = diagnosticLines(path, report, ink);
  const lines = [...title, ...cases, ...places, ...(places.length ? [""] : []), verdictLine(file, ink)];
  return `${lines.join("\n")}\n`;
}

/** `3 files: 2 hold, 1 fails`, for more than one file. */
export function summaryLine(files: readonly FileOutcome[]): string {
  const good = files.filter(holds).length;
  const bad = files.length - good;
  const parts = [
    ...(good ? [`${good} ${good === 1 ? "holds" : "hold"}`] : []),
    ...(bad ? [`${bad} ${bad === 1 ? "fails" : "fail"}`] : []),
  ];
  return `${files.length} files: ${parts.join(", ")}\n`;
}

function caseLines(report: FileReport, each: CaseReport, first: boolean, options: TextOptions): string[] {
  if (each.verdicts.length === 0) return [];
  const rows = each.verdicts.map((verdict) => verdictCells(report, each, verdict, options));
  const paint = (text: string, row: number, column: number): string => {
    if (column === 0) return verdictInk(each.verdicts[row], options.ink)(text);
    return column >= MARGIN_COLUMN ? options.ink.quiet(text) : text;
  };
  const head = first ? [] : [`case ${options.ink.strong(each.name)}`];
  const lines = tableLines(VERDICT_COLUMNS, rows, paint).map(
    (line, i) => `  ${line}${whyOpen(each.verdicts[i])}`,
  );
  return [...head, ...lines, ""];
}

/** A reason is a sentence: it stands behind the row and takes no part in the widths of the columns. */
function whyOpen({ value, holds, reason }: Verdict): string {
  return holds === null || value === null ? `  ${oneLine(reason ?? "it could not be computed")}` : "";
}

const VERDICT_COLUMNS: readonly Column[] = [
  { head: "", align: "left" },
  { head: "", align: "left" },
  { head: "", align: "right" },
  { head: "", align: "left" },
  { head: "", align: "right" },
  { head: "", align: "left" },
];
const MARGIN_COLUMN = 4;

function verdictCells(
  report: FileReport,
  each: CaseReport,
  verdict: Verdict,
  { units }: TextOptions,
): string[] {
  const word = verdict.holds === null ? "open" : verdict.holds ? "holds" : "fails";
  if (verdict.value === null) return [word, verdict.name];
  const unit = verdictUnit(report, each.instance, verdict, units);
  const limit =
    verdict.limit === null ? "" : `${SIGNS[verdict.expectation.operator]} ${inUnit(verdict.limit, unit)}`;
  return [word, verdict.name, inUnit(verdict.value, unit), limit, marginText(verdict), notes(verdict, unit)];
}

const SIGNS = { "<=": "≤", ">=": "≥", "<": "<", ">": ">" } as const;

/** Value and limit stand in the unit in which the limit is written, else in that of the file. */
export function verdictUnit(
  report: FileReport,
  instance: Instance,
  { kind, value, limit, expectation }: Verdict,
  system: UnitSystem,
): ShownUnit {
  for (const side of [expectation.right, expectation.left]) {
    const unit = writtenUnit(instance, side);
    // A percent sign and the spelling of a rate are no question of SI or inch units.
    const kept = system === "as-written" || isNumber(kind) || kind.rate;
    if (unit !== undefined && kept && sameKind(unit.kind, kind)) return unit;
  }
  return unitView(system, writtenUnits(report.model)).unitFor(siUnit(kind), largest([value, limit]));
}

function marginText({ margin }: Verdict): string {
  if (margin === null || !Number.isFinite(margin)) return "";
  const share = formatNumber(Number((Math.abs(margin) * 100).toPrecision(2)));
  return `${share} % ${margin < 0 ? "beyond" : "left"}`;
}

function notes({ tolerance, mattersMost }: Verdict, unit: ShownUnit): string {
  const parts: string[] = [];
  if (tolerance?.kind === "worst_case" && tolerance.worst !== null)
    parts.push(`worst ${inUnit(tolerance.worst, unit)} (${tolerance.how ?? "searched"})`);
  if (tolerance?.share !== undefined)
    parts.push(`${formatNumber(tolerance.share * 100)} % of ${tolerance.samples ?? "all"} draws hold`);
  if (tolerance?.holds === null && tolerance.reason)
    parts.push(`tolerance open: ${oneLine(tolerance.reason)}`);
  if (mattersMost) parts.push(`${mattersMost.name} +10 %: ${signed(mattersMost.sensitivity * 10)} %`);
  return parts.join(", ");
}

const signed = (value: number): string =>
  `${value < 0 ? "−" : "+"}${formatNumber(Number(Math.abs(value).toPrecision(2)))}`;

function verdictInk(verdict: Verdict, ink: Ink): (text: string) => string {
  if (verdict.holds === null) return ink.warn;
  return verdict.holds ? ink.good : ink.bad;
}

function verdictLine(file: Extract<FileOutcome, { readable: true }>, ink: Ink): string {
  const verdicts = file.report.cases.flatMap((each) => each.verdicts);
  const held = verdicts.filter((verdict) => verdict.holds === true).length;
  const parts = [
    verdicts.length ? `holds ${held} of ${verdicts.length}` : noVerdicts(file.report),
    ...counted(file.report.diagnostics),
  ];
  const paint = holds(file) ? ink.good : ink.bad;
  return `${file.path}: ${paint(parts.join(", "))}`;
}

/** An error in the model leaves its expectations unjudged; that is not the same as expecting nothing. */
function noVerdicts({ model }: FileReport): string {
  const waiting = model.tree.statements.filter((statement) => statement.keyword.text === "expect").length;
  return waiting === 0 ? "nothing expected" : `${waiting} not judged`;
}

function counted(diagnostics: readonly Diagnostic[]): string[] {
  return (["error", "warning", "hint"] as const).flatMap((severity) => {
    const count = diagnostics.filter((diagnostic) => diagnostic.severity === severity).length;
    return count === 0 ? [] : [`${count} ${severity}${count === 1 ? "" : "s"}`];
  });
}
