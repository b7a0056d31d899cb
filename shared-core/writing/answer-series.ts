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
export function shownSeries(answer: SweepAnswer | HistoryAnswer, units: UnitView): ShownSeries[] {
  return answer.kind === "sweep" ? sweepSeries(answer, units) : historySeries(answer, units);
}

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

function historySeries(answer: HistoryAnswer, units: UnitView): ShownSeries[] {
  return [...answer.series].map(([quantity, { unit: si, values }]) => {
    const peak = answer.peaks.get(quantity);
    const unit = units.unitFor(si, Math.abs(peak?.value ?? largest(values)));
    const place = peak === undefined ? -1 : placeFor(answer.timeS, peak.at);
    return {
      quantity,
      unit,
      x: withSample(answer.timeS, place, peak?.at ?? 0),
      values: withSample(values, place, signedPeak(values, place, peak?.value ?? 0)).map(
        (v) => v / unit.factor,
      ),
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

/** Peaks of a history may be given as sizes; the sample takes the sign of its neighbour. */
function signedPeak(values: Float64Array, place: number, peak: number): number {
  return place >= 0 && values[place] < 0 ? -Math.abs(peak) : peak;
}
