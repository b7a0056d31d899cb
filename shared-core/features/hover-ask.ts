/** An ask: its answer in three lines, and a small plot. */

import type { CaseReport } from "../judgement/report.ts";
import { elasticModes } from "../judgement/shapes.ts";
import { type ShownSeries, shownSeries } from "../writing/answer-series.ts";
import { movesMost } from "../writing/mode-text.ts";
import { inUnit } from "../writing/units/unit-view.ts";
import { dampingText } from "./hover-moves.ts";
import { answerPlot, modesPlot } from "./hover-plot.ts";
import { type Block, lines, type Phrase } from "./readout.ts";
import { type Numbers, showHz } from "./readout-numbers.ts";

const LINES = 3;

/** `kind` is the kind of the ask, `name` what the answer is called. */
export function askReadout(numbers: Numbers, kind: string, name: string): readonly Block[] {
  const { asWritten } = numbers;
  if (kind === "modes") return modesReadout(numbers, asWritten);
  const result = asWritten.answers.get(name);
  if (result === undefined) return [lines("not answered yet")];
  if (!result.ok) return [lines(`no answer: ${result.reason}`)];
  const answer = result.value;
  const series = shownSeries(answer, numbers.units);
  const said = series
    .slice(0, LINES)
    .map((each) => peakLine(numbers, each, answer.kind === "sweep" ? "Hz" : "s"));
  const more = moreLine(series.length, "quantities", "quantity");
  if (series.length === 0) return [lines("it lists no quantity; expectations may ask it for any")];
  return [lines(...said, more), { kind: "plot", plot: answerPlot(name, answer.kind, series) }];
}

function peakLine(numbers: Numbers, { quantity, unit, peak }: ShownSeries, x: "Hz" | "s"): Phrase {
  if ("reason" in peak) return `\`${quantity}\`: no peak, ${peak.reason}`;
  const at = inUnit(peak.at, numbers.units.unitFor(x, peak.at));
  return `\`${quantity}\`: up to ${inUnit(peak.value * unit.factor, unit)} at ${at}`;
}

function modesReadout(numbers: Numbers, { modes, instance }: CaseReport): readonly Block[] {
  if (!modes.ok) return [lines(`no modes: ${modes.reason}`)];
  const names = instance.assembly.coordinates.map((coordinate) => coordinate.name);
  const elastic = elasticModes(modes.table);
  const free = modes.table.modes.filter(({ number }) => number === 0).length;
  const said = elastic.slice(0, LINES).map((mode) => {
    const damping = mode.dampingRatio === null ? "" : `, damping ${dampingText(mode.dampingRatio)}`;
    return `mode ${mode.number}: ${showHz(numbers, mode.frequencyHz)}${damping}; moves ${movesMost(mode, names)}`;
  });
  const blocks: Block[] = [
    lines(
      ...said,
      moreLine(elastic.length, "modes", "mode"),
      free === 0 ? undefined : `${free} free ${free === 1 ? "mode" : "modes"}: nothing holds the whole`,
    ),
  ];
  if (elastic.length > 0) blocks.push({ kind: "plot", plot: modesPlot(modes.table, names, numbers.units) });
  return blocks;
}

function moreLine(count: number, several: string, one: string): Phrase | undefined {
  const more = count - LINES;
  return more > 0 ? `and ${more} more ${more === 1 ? one : several}` : undefined;
}
