/**
 * Small plots of answers: pictures that stay below a size, whatever the answer holds, and the same with characters.
 */
import type { ModeTable } from "../answers/answer.ts";
import { formatNumber } from "../units/show.ts";
import type { ShownSeries } from "../writing/answer-series.ts";
import { keepExtremes } from "../writing/decimate.ts";
import { modesFigure } from "../writing/figure/answer-figures.ts";
import type { CurvePanel, Figure } from "../writing/figure/figure.ts";
import { figureSvg } from "../writing/figure/svg.ts";
import { scaleBetween, scaleOver } from "../writing/scales.ts";
import { shorten } from "../writing/table.ts";
import { terminalPlot } from "../writing/terminal-plot.ts";
import { inUnit, type UnitView } from "../writing/units/unit-view.ts";
import type { Plot } from "./readout.ts";
import { base64Length } from "./readout-base64.ts";

/** Characters of base64; a hover is sent as one piece of text. */
const LARGEST = 10_000;
const SIZE = { width: 360, height: 190 };
/** Curves that a small picture can hold apart. */
const MOST_CURVES = 3;
/** Columns to which a curve is thinned: tried from the first until the picture is small enough. */
const COLUMNS = [160, 80, 40, 20, 10, 5];
/** Characters of a name in a picture. */
const LONGEST_NAME = 48;
const TEXT = { width: 56, height: 5 };

/** A plot of the first curves of one unit. */
export function answerPlot(name: string, kind: "sweep" | "history", series: readonly ShownSeries[]): Plot {
  const x = kind === "sweep" ? "Hz" : "s";
  const shown = series
    .filter(({ unit }) => unit.text === series[0].unit.text)
    .slice(0, MOST_CURVES)
    .map((each) => ({ ...each, quantity: shorten(each.quantity, LONGEST_NAME) }));
  const title = shorten(name, LONGEST_NAME);
  const says = `${kind} ${title}: ${shown.map((each) => peakSays(each, x)).join(", ")}.`;
  const panel = curvePanel(shown, x);
  if (panel === undefined) return { svg: smallSvg({ title, description: says, panels: [] }), text: [], says };
  // Long histories are thinned once for both: finer than either can show.
  const fine = thinnedPanel(panel, COLUMNS[0]);
  return { svg: smallSvg({ title, description: says, panels: [fine] }), text: curveText(fine), says };
}

function peakSays({ quantity, unit, peak }: ShownSeries, x: "Hz" | "s"): string {
  if ("reason" in peak) return `${quantity} has no peak`;
  return `${quantity} peaks at ${inUnit(peak.value * unit.factor, unit)} at ${formatNumber(peak.at)} ${x}`;
}

/** Sweeps stand on two log axes, histories on two even ones. */
function curvePanel(shown: readonly ShownSeries[], x: "Hz" | "s"): CurvePanel | undefined {
  const scale = x === "Hz" ? "log" : "linear";
  const along = shown[0]?.x ?? [];
  const [from, to] = [along[0], along[along.length - 1]];
  if (!(from < to && (scale === "linear" || from > 0))) return undefined;
  const { unit, peak, quantity } = shown[0];
  return {
    kind: "curves",
    x: { label: x === "Hz" ? "frequency" : "time", unit: x, scale, from, to },
    y: { label: shown.length === 1 ? quantity : x === "Hz" ? "amplitude" : "value", unit: unit.text, scale },
    share: 1,
    curves: shown.map((each, style) => ({ name: each.quantity, x: each.x, y: each.values, style })),
    marks:
      "reason" in peak || scale === "linear" || shown.length > 1
        ? []
        : [
            {
              x: peak.at,
              y: peak.value,
              label: `${formatNumber(peak.value)} ${unit.text} at ${formatNumber(peak.at)} Hz`,
            },
          ],
  };
}

/** Shapes of the first modes. */
export function modesPlot(table: ModeTable, coordinates: readonly string[], units: UnitView): Plot {
  const whole = modesFigure(table, coordinates, units, MOST_CURVES);
  const figure = { ...whole, panels: whole.panels.map(fewBars) };
  return { svg: smallSvg(figure), text: [], says: figure.description };
}

/** Thinned until it is small; where even that is too much, without its curves. */
function smallSvg(whole: Figure): string {
  let figure = whole;
  for (const columns of COLUMNS) {
    figure = thinned(figure, columns);
    const svg = figureSvg(figure, SIZE);
    if (base64Length(svg) <= LARGEST) return svg;
  }
  return figureSvg({ ...figure, description: "", panels: [] }, SIZE);
}

const MOST_BARS = 10;

/** The coordinates that move most. */
function fewBars(panel: Figure["panels"][number]): Figure["panels"][number] {
  if (panel.kind !== "bars" || panel.bars.length <= MOST_BARS) return panel;
  const largest = panel.bars.toSorted((a, b) => Math.abs(b.value) - Math.abs(a.value)).slice(0, MOST_BARS);
  return { ...panel, bars: panel.bars.filter((bar) => largest.includes(bar)) };
}

function thinned(figure: Figure, columns: number): Figure {
  const panels = figure.panels.map((panel) =>
    panel.kind === "curves" ? thinnedPanel(panel, columns) : panel,
  );
  return { ...figure, panels };
}

function thinnedPanel(panel: CurvePanel, columns: number): CurvePanel {
  const { scale, from = 0, to = 1 } = panel.x;
  const x = scaleBetween(scale, from, to);
  const curves = panel.curves.map((curve) => {
    const kept = keepExtremes((i) => x.place(curve.x[i]) * columns, curve.y, columns);
    return { ...curve, x: kept.map((i) => curve.x[i]), y: kept.map((i) => curve.y[i]) };
  });
  return { ...panel, curves };
}

/** The first curve with characters. */
function curveText({ x, y, curves: [curve] }: CurvePanel): readonly string[] {
  if (curve === undefined || x.from === undefined || x.to === undefined) return [];
  const label = y.unit === "" ? curve.name : `${curve.name} in ${y.unit}`;
  const plot = terminalPlot(curve, {
    x: scaleBetween(x.scale, x.from, x.to),
    y: scaleOver(y.scale, curve.y),
    ...TEXT,
    xUnit: x.unit,
  });
  return [label, ...plot];
}
