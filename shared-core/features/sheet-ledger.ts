/** Every expectation with its verdicts, and the numbers that can be moved. */
import type { CaseReport } from "../judgement/report.ts";
import type { Instance, ParameterValue } from "../model/model.ts";
import { unitToShow } from "../units/show.ts";
import { type Numbers, parameterUnit } from "./readout-numbers.ts";
import { type CaseVerdict, limitText, marginText, valueText, verdictPhrase } from "./readout-verdicts.ts";
import type { Knob, LedgerRow, LedgerVerdict } from "./sheet.ts";
import type { EarlierCase } from "./sheet-earlier.ts";
import { summaryOf } from "./summary.ts";
import type { View } from "./view.ts";

/** Steps from one end of a knob to the other; about so many, a round number each. */
const STEPS = 100;

/**
 * @param shown the case that the sheet shows, by its name; with moved numbers it is another than in the report
 * @param earlier the shown case at an earlier revision
 */
export function ledgerOf(
  view: View,
  numbers: Numbers,
  shown: CaseReport,
  earlier: EarlierCase | undefined,
): LedgerRow[] {
  const { model, lines } = view;
  const said = summaryOf(numbers.report, view.units).expectations;
  return model.expectations.map((expectation, row) => {
    const { name, node, comparison } = expectation;
    const verdicts = numbers.report.cases.flatMap((written, index) => {
      const report = written.name === shown.name ? shown : written;
      const verdict = report.verdicts.find((each) => each.name === name);
      if (verdict === undefined) return [];
      const found: CaseVerdict = { report, asWritten: index === 0, verdict };
      const message =
        report === written
          ? said[row]?.verdicts.find((each) => each.case === written.name)?.message
          : undefined;
      const before = report === shown ? earlierValue(numbers, earlier, name) : undefined;
      return [{ ...ledgerVerdict(numbers, found, message), ...(before && { earlier: before }) }];
    });
    return {
      name,
      range: lines.range(node.headSpan),
      condition: oneLine(model.tree.text.slice(comparison.span.start, comparison.span.end)),
      verdicts,
    };
  });
}

/** `3.8 Hz, failed`: value and verdict of the same expectation at the earlier revision. */
function earlierValue(numbers: Numbers, earlier: EarlierCase | undefined, name: string): string | undefined {
  if (earlier?.ok !== true) return undefined;
  const { report, asWritten } = earlier;
  const verdict = report.verdicts.find((each) => each.name === name);
  if (verdict === undefined) return undefined;
  const words = verdict.holds === null ? "open" : verdict.holds ? "held" : "failed";
  return `${valueText(numbers, { report, asWritten, verdict })}, ${words}`;
}

function ledgerVerdict(numbers: Numbers, found: CaseVerdict, message: string | undefined): LedgerVerdict {
  const { verdict, report } = found;
  const { margin, expectation, tolerance } = verdict;
  const inMargin = margin !== null && expectation.margin !== undefined && margin < expectation.margin;
  return {
    case: report.name,
    holds: verdict.holds,
    thin: verdict.holds === true && (inMargin || tolerance?.holds === false),
    value: verdict.value === null ? null : valueText(numbers, found),
    limit: verdict.limit === null ? null : limitText(numbers, found),
    margin: margin !== null && Number.isFinite(margin) ? margin : null,
    marginText: marginText(verdict),
    message: message ?? verdict.reason ?? verdictPhrase(found),
  };
}

/** Every `let` of the file that has a range or a tolerance. */
export function knobsOf(view: View, written: Instance, knobs: ReadonlyMap<string, number>): Knob[] {
  return [...written.parameters.values()].flatMap((parameter) => {
    const entity = view.model.entities.get(parameter.name);
    if (entity === undefined || entity.file !== undefined) return [];
    const [from, to] = parameter.range ?? [parameter.low ?? Number.NaN, parameter.high ?? Number.NaN];
    if (!(from < to)) return [];
    const { text: unit, factor } = knobUnit(parameter, view);
    const note = entity.node.notes.flatMap(({ accept, text }) => (accept === undefined ? [text] : []));
    const { value: whole } = entity.node;
    const text = whole?.map(({ span }) => view.model.tree.text.slice(span.start, span.end)).join(", ");
    return [
      {
        name: parameter.name,
        range: view.lines.range(entity.node.headSpan),
        written: parameter.value,
        value: knobs.get(parameter.name) ?? parameter.value,
        from,
        to,
        step: roundStep((to - from) / factor / STEPS) * factor,
        unit: unit === "1" ? "" : unit,
        factor,
        text: oneLine(text ?? parameter.written),
        ...(note.length === 0 ? {} : { note: note.join("\n") }),
      },
    ];
  });
}

function knobUnit(parameter: ParameterValue, { units }: View): { text: string; factor: number } {
  const unit = parameterUnit(parameter);
  // As for every other number: the spelling of a rate is no question of SI or inch units.
  return unit !== undefined && (units === "as-written" || parameter.rate)
    ? unit
    : unitToShow(parameter, { unit: units === "as-written" ? unit : undefined, system: units });
}

/** The nearest of 1, 2, 5 times a power of ten below. */
function roundStep(step: number): number {
  const power = 10 ** Math.floor(Math.log10(step));
  return (step >= 5 * power ? 5 : step >= 2 * power ? 2 : 1) * power;
}

const oneLine = (text: string): string => text.replace(/\s+/g, " ").trim();
