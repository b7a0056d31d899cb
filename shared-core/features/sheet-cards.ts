/** One card an ask, in file order. */
import type { HistoryAnswer, Mode, SweepAnswer } from "../answers/answer.ts";
import type { CaseReport } from "../judgement/report.ts";
import { elasticModes } from "../judgement/shapes.ts";
import type { Ask } from "../model/model.ts";
import { formatNumber } from "../units/show.ts";
import { shownSeries } from "../writing/answer-series.ts";
import { historyFigure, modesFigure, sweepFigure } from "../writing/figure/answer-figures.ts";
import type { CurvePanel, Figure } from "../writing/figure/figure.ts";
import { inUnit, largest, type UnitView } from "../writing/units/unit-view.ts";
import { type Numbers, partPercent, sharePercent, showHz } from "./readout-numbers.ts";
import type { ModesCard, PlotCard, SheetCard } from "./sheet.ts";
import { limitCurves } from "./sheet-limits.ts";
import { plotTable } from "./sheet-tables.ts";
import type { View } from "./view.ts";

const MOST_MODES = 12;
/** Elements named in the energy of a mode, and the least share worth a name. */
const ENERGY = { most: 5, least: 0.01 };

export interface CardInput {
  readonly view: View;
  readonly numbers: Numbers;
  /** With moved numbers, if some are. */
  readonly shown: CaseReport;
  /** As it stands in the text, where `shown` is another. */
  readonly written?: CaseReport;
  /** The same case at an earlier revision. */
  readonly earlier?: CaseReport;
}

export function cardsOf(input: CardInput): SheetCard[] {
  const { shown, view } = input;
  const { asks } = shown.instance;
  const cards = asks.map((ask) => ({
    ...cardOf(input, ask),
    range: view.lines.range(ask.node.headSpan),
  }));
  return asks.some(({ kind }) => kind === "modes") ? cards : [modesCard(input, "modes"), ...cards];
}

function cardOf(input: CardInput, ask: Ask): SheetCard {
  if (ask.kind === "modes") return modesCard(input, ask.name, ask.count, ask.upToHz);
  const title = `${ask.kind === "later" ? ask.askKind.replaceAll("_", " ") : ask.kind} ${ask.name}`;
  const base = { kind: "reason", name: ask.name, title } as const;
  if (ask.kind === "later") {
    const reason = `${ask.askKind} is read, and this version does not compute it yet`;
    return { ...base, description: reason, reason };
  }
  const result = input.shown.answers.get(ask.name);
  if (result?.ok !== true) {
    const reason = result?.reason ?? "it has not been answered yet";
    return { ...base, description: `${title}: ${reason}`, reason };
  }
  if (result.value.series.size === 0) {
    const reason = "it lists no quantity; expectations may ask it for any";
    return { ...base, description: reason, reason };
  }
  return plotCard(input, ask.name, title, result.value);
}

function modesCard(
  { shown, numbers }: CardInput,
  name: string,
  count: number = MOST_MODES,
  upToHz: number = Number.POSITIVE_INFINITY,
): SheetCard {
  const { modes: found, instance } = shown;
  if (!found.ok) {
    return { kind: "reason", name, title: "modes", description: found.reason, reason: found.reason };
  }
  const elastic = elasticModes(found.table);
  const wanted = elastic.filter(({ frequencyHz }) => frequencyHz <= upToHz).slice(0, count);
  const names = instance.assembly.coordinates.map((coordinate) => coordinate.name);
  const card: ModesCard = {
    kind: "modes",
    name,
    title: "modes",
    description: modesFigure(found.table, names, numbers.units).description,
    modes: wanted.slice(0, MOST_MODES).map((mode) => ({
      id: `mode:${mode.number}`,
      label: `mode ${mode.number} · ${showHz(numbers, mode.frequencyHz)}`,
      damping: mode.dampingRatio === null ? "" : `damping ratio ${sharePercent(mode.dampingRatio)}`,
      shape: mode.shape.re,
      energy: energyOf(mode),
    })),
    table: {
      head: ["mode", "frequency", "damped frequency", "damping ratio", ...names],
      rows: wanted.map((mode) => [
        String(mode.number),
        showHz(numbers, mode.frequencyHz),
        showHz(numbers, mode.dampedFrequencyHz),
        mode.dampingRatio === null ? "–" : sharePercent(mode.dampingRatio),
        ...Array.from(mode.shape.re, (part) => formatNumber(part, 3)),
      ]),
    },
  };
  return card;
}

function energyOf({ energyShare }: Mode): ModesCard["modes"][number]["energy"] {
  const all = Object.entries(energyShare).sort(([, a], [, b]) => b - a);
  const named = all.filter(([, share]) => share >= ENERGY.least).slice(0, ENERGY.most);
  const rest =
    all.reduce((sum, [, share]) => sum + share, 0) - named.reduce((sum, [, share]) => sum + share, 0);
  const others = rest >= ENERGY.least / 10 ? [["others", rest] as const] : [];
  return [...named, ...others].map(([name, share]) => ({ name, share, text: partPercent(share) }));
}

function plotCard(
  input: CardInput,
  name: string,
  title: string,
  answer: SweepAnswer | HistoryAnswer,
): PlotCard {
  const under = (["earlier", "written"] as const).flatMap((role) => {
    const found = input[role]?.answers.get(name);
    return found?.ok === true && found.value.kind === answer.kind ? [{ role, answer: found.value }] : [];
  });
  const units = sharedUnits(input.numbers.units, [answer, ...under.map((each) => each.answer)]);
  const panels = panelsOf(name, answer, units);
  const ghosts = under.map(({ role, answer: of }) => ({ role, panels: panelsOf(name, of, units) }));
  const { description } = figureOf(name, answer, units);
  const merged = panels.map((panel) => withGhosts(panel, ghosts));
  const values = merged.filter(({ y }) => y.label !== "phase");
  const wrapped = merged.find(({ y }) => y.label === "phase");
  return {
    kind: answer.kind,
    name,
    title,
    description,
    panels: values.map((panel) => ({
      ...panel,
      curves: [...panel.curves, ...limitCurves(input.shown, name, answer, panel, units)],
    })),
    ...(wrapped === undefined ? {} : { phase: { wrapped, unwrapped: unwrappedPanel(wrapped) } }),
    peaks: peaksOf(answer, units),
    table: plotTable(answer, units),
  };
}

/** Bars of a figure belong to modes; a plot has curves only. */
function panelsOf(name: string, answer: SweepAnswer | HistoryAnswer, units: UnitView): CurvePanel[] {
  return figureOf(name, answer, units).panels.filter((panel) => panel.kind === "curves");
}

const figureOf = (name: string, answer: SweepAnswer | HistoryAnswer, units: UnitView): Figure =>
  answer.kind === "sweep" ? sweepFigure(name, answer, units) : historyFigure(name, answer, units);

/** One unit for all curves of a kind, moved and written, so that they stand on one axis. */
function sharedUnits(units: UnitView, answers: readonly (SweepAnswer | HistoryAnswer)[]): UnitView {
  const sizes = new Map<string, number>();
  for (const { series, peaks } of answers) {
    for (const [quantity, { unit, ...rows }] of series) {
      const peak = peaks.get(quantity);
      const row = "values" in rows ? rows.values : rows.re;
      const size = peak !== undefined && "value" in peak ? Math.abs(peak.value) : largest(row);
      sizes.set(unit, Math.max(size, sizes.get(unit) ?? 0));
    }
  }
  return { unitFor: (si, size) => units.unitFor(si, sizes.get(si) ?? size) };
}

interface Ghosts {
  readonly role: "earlier" | "written";
  readonly panels: readonly CurvePanel[];
}

/** Under each answer the same quantity of another model, where it has it, in the same style. */
function withGhosts(panel: CurvePanel, ghosts: readonly Ghosts[]): CurvePanel {
  const under = ghosts.flatMap(({ role, panels }) => {
    const same = panels.find(({ y }) => y.label === panel.y.label && y.unit === panel.y.unit);
    return panel.curves.flatMap(({ name, style }) => {
      const curve = same?.curves.find((each) => each.name === name);
      return curve === undefined ? [] : [{ ...curve, style, role }];
    });
  });
  return { ...panel, curves: [...under, ...panel.curves] };
}

/** Degrees without jumps of a whole turn; an axis that follows them. */
function unwrappedPanel(panel: CurvePanel): CurvePanel {
  const curves = panel.curves.map((curve) => ({ ...curve, y: unwrapped(curve.y) }));
  const sizes = curves.flatMap(({ y }) => [Math.min(0, ...ends(y)), Math.max(0, ...ends(y))]);
  const [low, high] = [Math.min(-180, ...sizes), Math.max(0, ...sizes)];
  const [from, to] = [Math.floor(low / 90) * 90, Math.ceil(high / 90) * 90];
  const step = 90 * Math.ceil((to - from) / 90 / 8);
  const ticks = Array.from({ length: Math.floor((to - from) / step) + 1 }, (_, i) => from + i * step);
  return { ...panel, y: { ...panel.y, from, to, ticks }, curves };
}

function ends(row: ArrayLike<number>): [number, number] {
  let [low, high] = [0, 0];
  for (let i = 0; i < row.length; i++) {
    if (row[i] < low) low = row[i];
    if (row[i] > high) high = row[i];
  }
  return [low, high];
}

export function unwrapped(degrees: ArrayLike<number>): Float64Array {
  const out = new Float64Array(degrees.length);
  let turns = 0;
  for (let i = 0; i < degrees.length; i++) {
    const jump = i === 0 ? 0 : degrees[i] - degrees[i - 1];
    if (jump > 180) turns -= 1;
    else if (jump < -180) turns += 1;
    out[i] = degrees[i] + 360 * turns;
  }
  return out;
}

function peaksOf(answer: SweepAnswer | HistoryAnswer, units: UnitView): string[] {
  const x = answer.kind === "sweep" ? "Hz" : "s";
  return shownSeries(answer, units).map(({ quantity, unit, peak }) =>
    "reason" in peak
      ? `${quantity}: no peak, ${peak.reason}`
      : `${quantity} up to ${inUnit(peak.value * unit.factor, unit)} at ${inUnit(peak.at, units.unitFor(x, peak.at))}`,
  );
}
