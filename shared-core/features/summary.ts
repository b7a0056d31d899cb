/** A report in a few lines: for a status, a test tree, a list of models. */
import type { CaseReport, FileReport, Verdict } from "../judgement/report.ts";
import type { Expectation } from "../model/model.ts";
import { LineIndex } from "../text/line-index.ts";
import { formatNumber, type UnitSystem } from "../units/show.ts";
import { verdictUnit } from "../writing/verdict-text.ts";
import { type Numbers, numbersOf, showHz, signed } from "./readout-numbers.ts";
import { type CaseVerdict, limitText, valueText, verdictPhrase } from "./readout-verdicts.ts";
import type { CaseVerdict as CaseSummary, ExpectationSummary, ModelSummary } from "./summary-content.ts";
import type { View } from "./view.ts";

/** Expectations are those of the text; their verdicts those of the report, none where it has no numbers for them. */
export function summaryOf(report: FileReport, units: UnitSystem): ModelSummary {
  const { model } = report;
  const lines = new LineIndex(model.tree.text);
  const numbers = numbersOf({ report, units, stale: false } as View);
  return {
    title: model.title,
    cases: model.cases.map(({ name }) => name),
    frequencies: numbers === undefined ? [] : frequenciesOf(numbers.asWritten, numbers.units),
    expectations: model.expectations.map((expectation) => ({
      name: expectation.name,
      range: lines.range(expectation.node.headSpan),
      comparison: comparisonOf(model.tree.text, expectation),
      verdicts: numbers === undefined ? [] : verdictsIn(numbers, expectation),
    })),
    errors: count(report, "error"),
    warnings: count(report, "warning"),
  };
}

/** `holds 7 of 8 · 4.1 Hz · 12.6 Hz`. */
export function stateText({ expectations, frequencies, errors }: ModelSummary): string {
  const verdicts = expectations.flatMap((each) => each.verdicts);
  const held = verdicts.filter(({ holds }) => holds === true).length;
  const parts = [
    ...(verdicts.length > 0 ? [`holds ${held} of ${verdicts.length}`] : []),
    ...(verdicts.length === 0 && errors > 0 ? [`${errors} ${errors === 1 ? "error" : "errors"}`] : []),
    ...frequencies.slice(0, NAMED),
  ];
  return parts.join(" · ");
}

/** The same of one case, whatever its numbers are; where there are several, the count says that it is of one. */
export function caseStateText(report: CaseReport, { units }: Pick<Numbers, "units">, alone: boolean): string {
  const held = report.verdicts.filter(({ holds }) => holds === true).length;
  const { length } = report.verdicts;
  const frequencies = frequenciesOf(report, units).slice(0, NAMED);
  return [
    ...(length > 0 ? [`holds ${held} of ${length}${alone ? "" : " in this case"}`] : []),
    ...frequencies,
  ].join(" · ");
}

/** Natural frequencies that a status names. */
const NAMED = 2;
/** Natural frequencies of a summary; more would be a mode table. */
const LISTED = 20;

function frequenciesOf({ modes }: CaseReport, units: Numbers["units"]): readonly string[] {
  if (!modes.ok) return [];
  return modes.table.modes
    .filter(({ number, frequencyHz }) => number !== null && number > 0 && frequencyHz !== null)
    .slice(0, LISTED)
    .map(({ frequencyHz }) => showHz({ units }, Number((frequencyHz as number).toPrecision(3))));
}

function comparisonOf(text: string, { operator, right }: Expectation): ExpectationSummary["comparison"] {
  return `${operator} ${text.slice(right.span.start, right.span.end)}`;
}

function verdictsIn(numbers: Numbers, expectation: Expectation): readonly CaseSummary[] {
  return numbers.report.cases.flatMap((report, index) =>
    report.verdicts
      .filter(({ name }) => name === expectation.name)
      .map((verdict) => caseSummary(numbers, { report, asWritten: index === 0, verdict })),
  );
}

function caseSummary(numbers: Numbers, found: CaseVerdict): CaseSummary {
  const { verdict, report } = found;
  return {
    case: report.name,
    holds: verdict.holds,
    value: verdict.value === null ? null : valueText(numbers, found),
    limit: verdict.limit === null ? null : limitText(numbers, found),
    unit: verdictUnit(numbers.report, report.instance, verdict, numbers.system).text,
    message: messageOf(numbers.report, found),
    ...mattersMost(verdict),
  };
}

/** What was said about it, else the verdict in words. */
function messageOf({ diagnostics }: FileReport, found: CaseVerdict): string {
  const { verdict, report, asWritten } = found;
  const { node, name } = verdict.expectation;
  const said = diagnostics.find(
    ({ code, span, case: of, message }) =>
      (code === "expectation-fails" || code === "expectation-thin") &&
      node.span.start <= span.start &&
      span.end <= node.span.end &&
      (asWritten ? of === undefined : of === report.name) &&
      (message.includes(`\`${name}\``) || !name.includes(".")),
  );
  if (said !== undefined) return said.hint === undefined ? said.message : `${said.message}; ${said.hint}`;
  return verdict.reason ?? verdictPhrase(found);
}

function mattersMost({ mattersMost: most }: Verdict): { readonly mattersMost?: string } {
  if (most === undefined) return {};
  const percent = most.sensitivity * 10;
  return { mattersMost: `${most.name} +10 %: ${signed(percent, `${formatNumber(Math.abs(percent), 2)} %`)}` };
}

const count = ({ diagnostics }: FileReport, severity: "error" | "warning"): number =>
  diagnostics.filter((diagnostic) => diagnostic.severity === severity).length;
