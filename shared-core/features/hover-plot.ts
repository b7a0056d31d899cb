/**
 * Small plots of answers: pictures that stay below a size, whatever the answer holds, and the same with characters.
 */
import type { HistoryAnswer, ModeTable, SweepAnswer } from "../answers/answer.ts";
import { type ShownSeries, shownSeries } from "../writing/answer-series.ts";
import { keepExtremes } from "../writing/decimate.ts";
import { historyFigure, modesFigure, sweepFigure } from "../writing/figure/answer-figures.ts";
import type { CurvePanel, Figure } from "../writing/figure/figure.ts";
import { figureSvg } from "../writing/figure/svg.ts";
import { scaleBetween, scaleOver } from "../writing/scales.ts";
import { terminalPlot } from "../writing/terminal-plot.ts";
import type { UnitView } from "../writing/units/unit-view.ts";
import type { Plot } from "./readout.ts";
import { base64Length } from "./readout-base64.ts";

/** Characters of base64; a hover is sent as one piece of text. */
const LARGEST = 10_000;
const SIZE = { width: 360, height: 190 };
/** Curves that a small picture can hold apart. */
const MOST_CURVES = 3;
/** Columns to which a curve is thinned: tried from the first until the picture is small enough. */
const COLUMNS = [160, 80, 40, 20, 10, 5];
const TEXT = { width: 56, height: 5 };

export function answerPlot(name: string, answer: SweepAnswer | HistoryAnswer, units: UnitView): Plot {
  const whole =
    answer.kind === "sweep" ? sweepFigure(name, answer, units) : historyFigure(name, answer, units);
  const [first] = shownSeries(answer, units);
  return {
    svg: smallSvg(whole),
    text: first === undefined ? [] : seriesText(first, answer.kind === "sweep" ? "Hz" : "s"),
    says: whole.description,
  };
}

/** Shapes of the first modes. */
export function modesPlot(table: ModeTable, coordinates: readonly string[], units: UnitView): Plot {
  const figure = modesFigure(table, coordinates, units, MOST_CURVES);
  return { svg: smallSvg(figure), text: [], says: figure.description };
}

/** Thinned until it is small; where even that is too much, without its curves. */
function smallSvg(whole: Figure): string {
  const figure = firstCurves(whole);
  for (const columns of COLUMNS) {
    const svg = figureSvg(thinned(figure, columns), SIZE);
    if (base64Length(svg) <= LARGEST) return svg;
  }
  return figureSvg({ ...figure, description: "", panels: [] }, SIZE);
}

/** The panel of amplitudes or values only, with its first curves; the legend names them. */
function firstCurves(figure: Figure): Figure {
  const curves = figure.panels.find((panel) => panel.kind === "curves");
  if (curves?.kind === "curves") {
    const kept = curves.curves.slice(0, MOST_CURVES);
    return { ...figure, panels: [{ ...curves, curves: kept, marks: curves.marks.slice(0, 1) }] };
  }
  const shapes = figure.panels
    .slice(0, MOST_CURVES)
    .map((panel) => (panel.kind === "bars" ? fewBars(panel) : panel));
  return { ...figure, panels: shapes };
}

const MOST_BARS = 10;

function fewBars<T extends { readonly bars: readonly { readonly name: string; readonly value: number }[] }>(
  panel: T,
): T {
  if (panel.bars.length <= MOST_BARS) return panel;
  const largest = [...panel.bars].sort((a, b) => Math.abs(b.value) - Math.abs(a.value)).slice(0, MOST_BARS);
  return { ...panel, bars: panel.bars.filter((bar) => largest.includes(bar)) };
}

function thinned(figure: Figure, columns: number): Figure {
  const panels = figure.panels.map((panel) =>
    panel.kind === "curves" ? thinnedPanel(panel, columns) : panel,
  );
  return { ...figure, panels };
}

function thinnedPanel(panel: CurvePanel, columns: number): CurvePanel {
  const x = scaleOver(panel.x.scale, ...panel.curves.map((curve) => curve.x));
  const curves = panel.curves.map((curve) => {
    const kept = keepExtremes((i) => x.place(curve.x[i]) * columns, curve.y, columns);
    return { ...curve, x: kept.map((i) => curve.x[i]), y: kept.map((i) => curve.y[i]) };
  });
  return { ...panel, curves };
}

function seriesText(series: ShownSeries, xUnit: "Hz" | "s"): readonly string[] {
  const kind = xUnit === "Hz" ? "log" : "linear";
  const [from, to] = [series.x[0], series.x[series.x.length - 1]];
  if (!(series.x.length > 1 && from < to && (kind === "linear" || from > 0))) return [];
  const label = series.unit.text === "" ? series.quantity : `${series.quantity} in ${series.unit.text}`;
  const plot = terminalPlot(
    { x: series.x, y: series.values },
    { x: scaleBetween(kind, from, to), y: scaleOver(kind, series.values), ...TEXT, xUnit },
  );
  return [label, ...plot];
}
