/** What is read from a sweep or a history: extremes and where they lie, values, phases, rms. */

import type { FrequencyResponse, TimeResponse } from "../../answers/analysis.ts";
import type { Peak } from "../../answers/answer.ts";
import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { AnswerArguments, HistoryAsk, SweepAsk } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { number, rate } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { percent, rate as sayRate, time } from "../wording.ts";
import { numberOf, seriesOf, sweepOf } from "./arguments.ts";
import { seconds, seriesValue } from "./quantities.ts";
import { remarkUndamped } from "./remarks.ts";

export type Extreme = "peak" | "highest" | "lowest" | "least";

/** The value of an extreme. */
export function extreme(which: Extreme) {
  return (trial: Trial, args: AnswerArguments): Found<Quantity> => {
    const series = seriesOf(args);
    if (!series.ok) return series;
    const found = extremeOf(trial, series.value.ask, series.value.quantity, which);
    return found.ok ? succeed(seriesValue(series.value.quantity, found.value.value)) : found;
  };
}

/** Where an extreme lies: a rate in a sweep, a time in a history. */
export function placeOfExtreme(which: Extreme) {
  return (trial: Trial, args: AnswerArguments): Found<Quantity> => {
    const series = seriesOf(args);
    if (!series.ok) return series;
    const { ask, quantity } = series.value;
    const found = extremeOf(trial, ask, quantity, which);
    if (!found.ok) return found;
    return succeed(ask.kind === "sweep" ? rate(found.value.at) : seconds(found.value.at));
  };
}

/** In a sweep the largest rms of the steady response, the peak over sqrt(2); in time over the whole answer. */
export function rms(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const series = seriesOf(args);
  if (!series.ok) return series;
  const { ask, quantity } = series.value;
  if (ask.kind === "sweep") {
    const peak = extremeOf(trial, ask, quantity, "peak");
    return peak.ok ? succeed(seriesValue(quantity, peak.value.value / Math.SQRT2)) : peak;
  }
  const response = inTime(trial, ask);
  if (!response.ok) return response;
  remarkStartingUp(trial, ask);
  const found = response.value.rms(quantity);
  return found.ok ? succeed(seriesValue(quantity, found.value)) : found;
}

/** Magnitude in a sweep, signed value in a history, computed at that very frequency or time. */
export function valueAt(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const series = seriesOf(args);
  if (!series.ok) return series;
  const at = numberOf(args, "at");
  if (!at.ok) return at;
  const { ask, quantity } = series.value;
  if (ask.kind === "sweep") {
    if (!at.value.rate) return fail(`\`${ask.name}\` is a sweep: at wants a rate such as 12 Hz`);
    const found = phasorAt(trial, ask, quantity, at.value.value);
    return found.ok ? succeed(seriesValue(quantity, Math.hypot(...found.value))) : found;
  }
  if (at.value.rate) return fail(`\`${ask.name}\` is a history: at wants a time such as 0.2 s`);
  const response = inTime(trial, ask);
  if (!response.ok) return response;
  const time0 = at.value.value;
  if (time0 < 0 || time0 > ask.lasting * (1 + 1e-12)) {
    return fail(`\`${ask.name}\` ends at ${time(ask.lasting)}, before ${time(time0)}`);
  }
  const found = response.value.at(quantity, Math.min(time0, ask.lasting));
  return found.ok ? succeed(seriesValue(quantity, found.value)) : found;
}

/** Argument of X in x = Re(X e^{i w t}), in rad: negative lags. */
export function phaseAt(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const ask = sweepOf(args);
  if (!ask.ok) return ask;
  const series = seriesOf(args);
  if (!series.ok) return series;
  const at = numberOf(args, "at");
  if (!at.ok) return at;
  const found = phasorAt(trial, ask.value, series.value.quantity, at.value.value);
  if (!found.ok) return found;
  const [re, im] = found.value;
  if (re === 0 && im === 0) return fail(`${series.value.quantity.text} stands still there and has no phase`);
  return succeed(number(Math.atan2(im, re)));
}

/** Complex amplitude of a quantity at a frequency of a sweep. */
export function phasorAt(
  trial: Trial,
  ask: SweepAsk,
  quantity: QuantityRef,
  frequencyHz: number,
): Found<readonly [number, number]> {
  const response = steady(trial, ask);
  if (!response.ok) return response;
  if (!(frequencyHz >= 0))
    return fail(`a steady response has no frequency below zero, as ${sayRate(frequencyHz)}`);
  return response.value.at(quantity, frequencyHz);
}

/** The steady response of a sweep, unless a mode grows. */
export function steady(trial: Trial, ask: SweepAsk): Found<FrequencyResponse> {
  if (trial.noSteadyAnswer !== undefined) return fail(trial.noSteadyAnswer);
  return trial.analysis.frequencyResponse(ask.by);
}

export function inTime(trial: Trial, ask: HistoryAsk): Found<TimeResponse> {
  return trial.analysis.timeResponse(ask);
}

export function extremeOf(
  trial: Trial,
  ask: SweepAsk | HistoryAsk,
  quantity: QuantityRef,
  which: Extreme,
): Found<Peak> {
  return ask.kind === "sweep"
    ? extremeInSweep(trial, ask, quantity, which)
    : extremeInTime(trial, ask, quantity, which);
}

/** A steady sine swings between plus and minus its magnitude: highest is the peak, lowest its negative. */
function extremeInSweep(trial: Trial, ask: SweepAsk, quantity: QuantityRef, which: Extreme): Found<Peak> {
  const response = steady(trial, ask);
  if (!response.ok) return response;
  if (which === "least") return response.value.least(quantity, ask.fromHz, ask.toHz);
  const peak = response.value.peak(quantity, ask.fromHz, ask.toHz);
  if (!peak.ok) {
    remarkUndamped(trial, ask);
    return fail(peak.reason);
  }
  return which === "lowest" ? succeed({ ...peak.value, value: -peak.value.value }) : peak;
}

function extremeInTime(trial: Trial, ask: HistoryAsk, quantity: QuantityRef, which: Extreme): Found<Peak> {
  const response = inTime(trial, ask);
  if (!response.ok) return response;
  const high = response.value.highest(quantity);
  if (!high.ok || which === "highest") return high;
  const low = response.value.lowest(quantity);
  if (!low.ok || which === "lowest") return low;
  const [up, down] = [high.value, low.value];
  if (which === "peak") {
    return succeed(Math.abs(up.value) >= Math.abs(down.value) ? up : { at: down.at, value: -down.value });
  }
  if (up.value > 0 && down.value < 0) {
    const crossings = response.value.crossings(quantity, 0, "any");
    return crossings.ok ? succeed({ value: 0, at: crossings.value[0] ?? up.at }) : fail(crossings.reason);
  }
  return succeed(up.value <= 0 ? { at: up.at, value: -up.value } : down);
}

/** Part of the start that may be left at the end of a history whose mean is taken. */
const STILL_RINGS = 0.05;

/** A mean over a history whose free vibration has not died away tells of the start more than of the drive. */
function remarkStartingUp(trial: Trial, ask: HistoryAsk): void {
  const { assembly } = trial.instance;
  const table = trial.modes();
  const driven = ask.by.some((index) => {
    const kind = assembly.drives[index]?.shape.kind;
    return kind === "sine" || kind === "unbalance";
  });
  if (!driven || !table.ok) return;
  const slowest = table.value.modes
    .filter((mode) => mode.number !== 0 && mode.eigenvalue[0] < 0)
    .map((mode) => ({ mode, left: Math.exp(mode.eigenvalue[0] * ask.lasting) }))
    .sort((a, b) => b.left - a.left)[0];
  if (slowest === undefined || slowest.left <= STILL_RINGS) return;
  const which = slowest.mode.number === null ? "a decaying motion" : `mode ${slowest.mode.number}`;
  trial.remark({
    code: "not-settled",
    ask,
    message: `\`${ask.name}\` ends after ${time(ask.lasting)} while ${which} still rings with ${percent(slowest.left)} of its start, and an rms is taken over all of it`,
    hint: `after ${time(Math.log(STILL_RINGS) / slowest.mode.eigenvalue[0])} less than ${percent(STILL_RINGS)} of it is left`,
  });
}
