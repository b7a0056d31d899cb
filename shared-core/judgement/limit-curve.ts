import type { LimitCurve } from "../model/model.ts";

/** Frequencies (Hz) between which a limit judges; everywhere for a single value. */
export function endsOf(limit: LimitCurve): readonly [number, number] {
  if (typeof limit.points === "number") return [0, Number.POSITIVE_INFINITY];
  const at = limit.points.map((point) => point.atHz);
  return [Math.min(...at), Math.max(...at)];
}

/**
 * Value of a limit at a frequency, straight or straight on log-log paper between points; undefined outside. Where
 * it jumps, the stricter side holds.
 */
export function limitAt(limit: LimitCurve, frequencyHz: number): number | undefined {
  if (typeof limit.points === "number") return limit.points;
  const points = limit.points;
  let found: number | undefined;
  const take = (value: number): void => {
    found = found === undefined ? value : Math.min(found, value);
  };
  points.forEach((b, i) => {
    if (b.atHz === frequencyHz) take(b.value);
    const a = points[i - 1];
    if (a !== undefined && a.atHz < frequencyHz && frequencyHz < b.atHz) {
      take(between(limit, a, b, frequencyHz));
    }
  });
  return found;
}

function between(
  limit: LimitCurve,
  a: { readonly atHz: number; readonly value: number },
  b: { readonly atHz: number; readonly value: number },
  frequencyHz: number,
): number {
  const logarithmic = limit.betweenPoints === "log_log" && a.value > 0 && b.value > 0 && a.atHz > 0;
  if (!logarithmic) {
    return a.value + ((b.value - a.value) * (frequencyHz - a.atHz)) / (b.atHz - a.atHz);
  }
  const along = Math.log(frequencyHz / a.atHz) / Math.log(b.atHz / a.atHz);
  return a.value * (b.value / a.value) ** along;
}
