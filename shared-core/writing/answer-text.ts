import type { HistoryAnswer, SweepAnswer } from "../answers/answer.ts";
import type { AnswerResult, CaseReport, FileReport } from "../judgement/report.ts";
import { formatNumber } from "../units/show.ts";
import { type ShownSeries, shownSeries } from "./answer-series.ts";
import { modeLines } from "./mode-text.ts";
import { oneLine } from "./places-text.ts";
import { scaleBetween, scaleOver } from "./scales.ts";
import { tableLines } from "./table.ts";
import { terminalPlot } from "./terminal-plot.ts";
import { inUnit, type UnitView, unitView } from "./units/unit-view.ts";
import { writtenUnits } from "./units/written-units.ts";
import type { TextOptions } from "./verdict-text.ts";

export interface AnswerTextOptions extends TextOptions {
  /** Columns of the terminal. */
  readonly width: number;
  /** Names of asks to show; `modes` is the mode table. */
  readonly asks: readonly string[];
}

const PLOT_HEIGHT = 8;
const WIDEST_PLOT = 100;

/** What `thrum answer` shows of a file: for each case the mode table, then each ask with its peaks and curves. */
export function answerText(report: FileReport, options: AnswerTextOptions): string {
  const units = unitView(options.units, writtenUnits(report.model));
  const title = report.model.title === undefined ? [] : [options.ink.strong(oneLine(report.model.title)), ""];
  const cases = report.cases.flatMap((each, index) => [
    ...(index === 0 ? [] : [`case ${options.ink.strong(each.name)}`, ""]),
    ...caseLines(each, units, options),
  ]);
  return `${[...title, ...cases].join("\n")}\n`;
}

function caseLines(each: CaseReport, units: UnitView, options: AnswerTextOptions): string[] {
  const blocks: string[][] = [];
  if (options.asks.includes("modes")) blocks.push(modeBlock(each, units, options));
  for (const [name, result] of each.answers) {
    if (options.asks.includes(name)) blocks.push(answerBlock(name, result, units, options));
  }
  return blocks.flatMap((block) => [...block, ""]);
}

function modeBlock(each: CaseReport, units: UnitView, { ink }: AnswerTextOptions): string[] {
  if (!each.modes.ok)
    return [`${ink.strong("modes")}  ${ink.bad("not computed")}: ${oneLine(each.modes.reason)}`];
  const names = each.instance.assembly.coordinates.map((coordinate) => coordinate.name);
  return [ink.strong("modes"), ...indent(modeLines(each.modes.table, names, units))];
}

function answerBlock(
  name: string,
  result: AnswerResult,
  units: UnitView,
  options: AnswerTextOptions,
): string[] {
  const { ink } = options;
  if (!result.ok)
    return [`${ink.strong(name)}  ${result.kind}, ${ink.bad("not computed")}: ${oneLine(result.reason)}`];
  const series = shownSeries(result.value, units);
  const x = result.value.kind === "sweep" ? "Hz" : "s";
  return [
    `${ink.strong(name)}  ${result.value.kind}${series.length ? `, ${span(result.value, x)}` : ""}`,
    ...indent(peakLines(series, x, units)),
    ...series.flatMap((each) => plotLines(each, x, options)),
  ];
}

function span(answer: SweepAnswer | HistoryAnswer, unit: string): string {
  const x = answer.kind === "sweep" ? answer.frequencyHz : answer.timeS;
  if (x.length === 0) return "no points";
  return `${formatNumber(x[0])} to ${formatNumber(x[x.length - 1])} ${unit}, ${x.length} points`;
}

function peakLines(series: readonly ShownSeries[], x: "Hz" | "s", units: UnitView): string[] {
  const rows = series.map(({ quantity, unit, peak }) =>
    "reason" in peak
      ? [quantity, "", oneLine(peak.reason)]
      : [
          quantity,
          `peak ${inUnit(peak.value * unit.factor, unit)}`,
          `at ${inUnit(peak.at, units.unitFor(x, peak.at))}`,
        ],
  );
  return tableLines(
    [
      { head: "", align: "left" },
      { head: "", align: "right" },
      { head: "", align: "left" },
    ],
    rows,
  );
}

/** Sweeps stand on two log axes, histories on two even ones. */
function plotLines(series: ShownSeries, x: "Hz" | "s", { ink, width }: AnswerTextOptions): string[] {
  const kind = x === "Hz" ? "log" : "linear";
  const inside = series.x.length > 1 && (kind === "linear" || series.x[0] > 0);
  if (!inside) return [];
  const lines = terminalPlot(
    { x: series.x, y: series.values },
    {
      x: scaleBetween(kind, series.x[0], series.x[series.x.length - 1]),
      y: scaleOver(kind, series.values),
      width: Math.min(width, WIDEST_PLOT) - 2,
      height: PLOT_HEIGHT,
      xUnit: x,
    },
  );
  const label = series.unit.text === "" ? series.quantity : `${series.quantity} in ${series.unit.text}`;
  return ["", `  ${ink.quiet(label)}`, ...indent(lines)];
}

const indent = (lines: readonly string[]): string[] => lines.map((line) => (line === "" ? "" : `  ${line}`));
