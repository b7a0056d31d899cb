import type { HistoryAnswer, ModeTable, SweepAnswer } from "../../answers/answer.ts";
import { formatNumber } from "../../units/show.ts";
import { type ShownSeries, shownSeries } from "../answer-series.ts";
import { inUnit, type UnitView } from "../units/unit-view.ts";
import type { Axis, CurvePanel, Figure } from "./figure.ts";

/** Amplitude over frequency on log axes, one panel a unit, and the phase below them. */
export function sweepFigure(name: string, answer: SweepAnswer, units: UnitView): Figure {
  const series = shownSeries(answer, units);
  const x: Axis = { label: "frequency", unit: "Hz", scale: "log", ...ends("log", answer.frequencyHz) };
  const phase: CurvePanel = {
    kind: "curves",
    x,
    y: { label: "phase", unit: "deg", scale: "linear", from: -180, to: 180, ticks: [-180, -90, 0, 90, 180] },
    share: 1,
    curves: series.map((each, style) => ({ name: each.quantity, x: each.x, y: each.phase ?? [], style })),
    marks: [],
  };
  return {
    title: name,
    description: describe(name, "sweep", series, units),
    panels: [...panelsByUnit(series, x, "log"), phase],
  };
}

/** Values over time, one panel a unit. */
export function historyFigure(name: string, answer: HistoryAnswer, units: UnitView): Figure {
  const series = shownSeries(answer, units);
  const x: Axis = { label: "time", unit: "s", scale: "linear", ...ends("linear", answer.timeS) };
  return {
    title: name,
    description: describe(name, "history", series, units),
    panels: panelsByUnit(series, x, "linear"),
  };
}

/** Shapes of the elastic modes, a bar for each coordinate; at most `most` modes. */
export function modesFigure(
  table: ModeTable,
  coordinates: readonly string[],
  units: UnitView,
  most = 6,
): Figure {
  const modes = table.modes.filter((mode) => mode.number !== null && mode.number > 0).slice(0, most);
  const titles = modes.map((mode) => {
    const hertz = mode.frequencyHz ?? 0;
    return `mode ${mode.number}: ${inUnit(hertz, units.unitFor("Hz", hertz))}`;
  });
  return {
    title: "modes",
    description: `Shapes of ${modes.length} modes. ${titles.join(", ")}.`,
    panels: modes.map((mode, i) => ({
      kind: "bars",
      title: titles[i],
      share: 1,
      bars: coordinates.map((coordinate, c) => ({ name: coordinate, value: mode.shape.re[c] })),
    })),
  };
}

function panelsByUnit(series: readonly ShownSeries[], x: Axis, scale: "linear" | "log"): CurvePanel[] {
  const texts = [...new Set(series.map((each) => each.unit.text))];
  return texts.map((unit) => {
    const own = series.filter((each) => each.unit.text === unit);
    return {
      kind: "curves",
      x,
      y: { label: scale === "log" ? "amplitude" : "value", unit, scale },
      share: 2,
      curves: own.map((each) => ({
        name: each.quantity,
        x: each.x,
        y: each.values,
        style: series.indexOf(each),
      })),
      marks: own.flatMap(({ peak, unit: { text } }) =>
        "reason" in peak || scale === "linear"
          ? []
          : [
              {
                x: peak.at,
                y: peak.value,
                label: `${formatNumber(peak.value)} ${text} at ${formatNumber(peak.at)} Hz`,
              },
            ],
      ),
    };
  });
}

function ends(scale: "linear" | "log", x: Float64Array): { from?: number; to?: number } {
  const [from, to] = [x[0], x[x.length - 1]];
  return from < to && (scale === "linear" || from > 0) ? { from, to } : {};
}

function describe(name: string, kind: string, series: readonly ShownSeries[], units: UnitView): string {
  const x = kind === "sweep" ? "Hz" : "s";
  const peaks = series.map(({ quantity, unit, peak }) =>
    "reason" in peak
      ? `${quantity}: ${peak.reason}`
      : `${quantity} peaks at ${inUnit(peak.value * unit.factor, unit)} at ${inUnit(peak.at, units.unitFor(x, peak.at))}`,
  );
  return `${kind} ${name}. ${peaks.join(", ")}.`;
}
