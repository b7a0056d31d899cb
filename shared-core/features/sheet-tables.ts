import type { HistoryAnswer, SweepAnswer } from "../answers/answer.ts";
import { formatNumber } from "../units/show.ts";
import type { ShownUnit, UnitView } from "../writing/units/unit-view.ts";
import type { SheetTable } from "./sheet.ts";

/** Rows that somebody reads; a file has them all. */
const MOST_ROWS = 120;

/** Samples of an answer as text: evenly chosen ones and those nearest to the peaks. */
export function plotTable(answer: SweepAnswer | HistoryAnswer, units: UnitView): SheetTable {
  const x = answer.kind === "sweep" ? answer.frequencyHz : answer.timeS;
  const indices = chosen(
    x,
    [...answer.peaks.values()].flatMap((peak) => ("at" in peak ? [peak.at] : [])),
  );
  const columns =
    answer.kind === "sweep"
      ? [...answer.series].flatMap(([name, { unit, re, im }]) => {
          const shown = unitOf(units, answer, name, unit);
          return [
            {
              head: withUnit(name, shown),
              text: (i: number) => formatNumber(Math.hypot(re[i], im[i]) / shown.factor),
            },
            {
              head: `${name} phase in deg`,
              text: (i: number) => formatNumber((Math.atan2(im[i], re[i]) * 180) / Math.PI),
            },
          ];
        })
      : [...answer.series].map(([name, { unit, values }]) => {
          const shown = unitOf(units, answer, name, unit);
          return { head: withUnit(name, shown), text: (i: number) => formatNumber(values[i] / shown.factor) };
        });
  const first = answer.kind === "sweep" ? "frequency in Hz" : "time in s";
  return {
    head: [first, ...columns.map(({ head }) => head)],
    rows: indices.map((i) => [formatNumber(x[i], 6), ...columns.map(({ text }) => text(i))]),
    ...(indices.length < x.length ? { left: `${indices.length} of ${x.length} rows` } : {}),
  };
}

function chosen(x: Float64Array, peaks: readonly number[]): number[] {
  const step = Math.max(1, Math.ceil(x.length / MOST_ROWS));
  const indices = new Set<number>();
  for (let i = 0; i < x.length; i += step) indices.add(i);
  if (x.length > 0) indices.add(x.length - 1);
  for (const at of peaks) {
    let nearest = 0;
    for (let i = 1; i < x.length; i++) if (Math.abs(x[i] - at) < Math.abs(x[nearest] - at)) nearest = i;
    indices.add(nearest);
  }
  return [...indices].sort((a, b) => a - b);
}

function unitOf(
  units: UnitView,
  { peaks }: SweepAnswer | HistoryAnswer,
  name: string,
  si: string,
): ShownUnit {
  const peak = peaks.get(name);
  return units.unitFor(si, peak !== undefined && "value" in peak ? Math.abs(peak.value) : 1);
}

const withUnit = (name: string, { text }: ShownUnit): string => (text === "" ? name : `${name} in ${text}`);
