import type { HistoryAnswer, SweepAnswer } from "../answers/answer.ts";
import { largest, type ShownUnit, type UnitView } from "./units/unit-view.ts";

/** One curve of an answer, ready to be shown: real values in `unit`. */
export interface ShownSeries {
  readonly quantity: string;
  readonly unit: ShownUnit;
  /** Hz or s. */
  readonly x: Float64Array;
  /** In `unit`. */
  readonly values: Float64Array;
  /** Sweeps only: argument of the response in degrees, -180 to 180; negative lags. */
  readonly phase?: Float64Array;
  /** The largest size, which may stand between two samples; why there is none. */
  readonly peak: { readonly at: number; readonly value: number } | { readonly reason: string };
}

/**
 * Curves of an answer in the units people see: magnitudes of a sweep, values of a history. A peak found between
 * two samples is put in as a sample, so that every picture shows it at its full height.
 */
export function shownSeries(answer: SweepAnswer | HistoryAnswer, units: UnitView): readonly ShownSeries[] {
  const known = KNOWN.get(answer);
  if (known?.units === units) return known.series;
  const series = answer.kind === "sweep" ? sweepSeries(answer, units) : historySeries(answer, units);
  KNOWN.set(answer, { units, series });
  return series;
}

/** A picture, its words and its peaks ask for the same rows one after the other. */
const KNOWN = new WeakMap<
  SweepAnswer | HistoryAnswer,
  { readonly units: UnitView; readonly series: readonly ShownSeries[] }
>();

function sweepSeries(answer: SweepAnswer, units: UnitView): ShownSeries[] {
  return [...answer.series].map(([quantity, { unit: si, re, im }]) => {
    const size = re.map((part, i) => Math.hypot(part, im[i]));
    const phase = re.map((part, i) => (Math.atan2(im[i], part) * 180) / Math.PI);
    const found = answer.peaks.get(quantity) ?? { reason: "no peak was found" };
    const peak = "reason" in found ? undefined : found;
    const unit = units.unitFor(si, peak?.value ?? largest(size));
    const place = peak === undefined ? -1 : placeFor(answer.frequencyHz, peak.at);
    return {
      quantity,
      unit,
      x: withSample(answer.frequencyHz, place, peak?.at ?? 0),
      values: withSample(size, place, peak?.value ?? 0).map((value) => value / unit.factor),
      phase: withSample(phase, place, Number.NaN),
      peak:
        peak === undefined ? (found as { reason: string }) : { at: peak.at, value: peak.value / unit.factor },
    };
  });
}

/** All rows share one axis: the peaks of each are samples of all, on the line between the others' neighbours. */
function historySeries(answer: HistoryAnswer, units: UnitView): ShownSeries[] {
  const peaks = [...answer.peaks.values()].map(({ at }) => at);
  const times = withTimes(answer.timeS, peaks);
  return [...answer.series].map(([quantity, { unit: si, values }]) => {
    const peak = answer.peaks.get(quantity);
    const unit = units.unitFor(si, Math.abs(peak?.value ?? largest(values)));
    return {
      quantity,
      unit,
      x: times,
      values: valuesAt(times, answer.timeS, values, peak).map((value) => value / unit.factor),
      peak: peak ? { at: peak.at, value: peak.value / unit.factor } : { reason: "no peak was found" },
    };
  });
}

/** Index before which a sample belongs; -1 when it is there already or lies outside. */
function placeFor(x: Float64Array, at: number): number {
  const place = x.findIndex((each) => each >= at);
  return place < 0 || x[place] === at ? -1 : place;
}

function withSample(list: Float64Array, place: number, value: number): Float64Array {
  if (place < 0) return list;
  const out = new Float64Array(list.length + 1);
  out.set(list.subarray(0, place));
  // Where the sample has no value of its own (a phase), the curve keeps its neighbour's.
  out[place] = Number.isNaN(value) ? list[place] : value;
  out.set(list.subarray(place), place + 1);
  return out;
}

/** The same row where no peak stands between its samples. */
function withTimes(timeS: Float64Array, peaks: readonly number[]): Float64Array {
  const [from, to] = [timeS[0], timeS[timeS.length - 1]];
  const more = new Set(peaks.filter((at) => at > from && at < to && placeFor(timeS, at) >= 0));
  return more.size === 0 ? timeS : Float64Array.from([...timeS, ...more]).sort();
}

/** A row at more times than it has samples: its peak at its own, a straight line at the others'. */
function valuesAt(
  times: Float64Array,
  timeS: Float64Array,
  values: Float64Array,
  peak: { readonly at: number; readonly value: number } | undefined,
): Float64Array {
  if (times === timeS) return values;
  let next = 0;
  return times.map((at) => {
    if (timeS[next] === at) return values[next++];
    if (at === peak?.at) return signedPeak(values[next], peak.value);
    const share = (at - timeS[next - 1]) / (timeS[next] - timeS[next - 1]);
    return values[next - 1] + share * (values[next] - values[next - 1]);
  });
}

/** Peaks of a history may be given as sizes; the sample takes the sign of its neighbour. */
const signedPeak = (neighbour: number, peak: number): number => (neighbour < 0 ? -Math.abs(peak) : peak);
