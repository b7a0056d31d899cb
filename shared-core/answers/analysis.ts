import type { LinearForm, QuantityRef } from "../mechanics/assembly.ts";
import type { HistoryAsk, Instance, SweepAsk } from "../model/model.ts";
import type { Outcome } from "../numerics/outcome.ts";
import type { HistoryAnswer, ModeTable, Peak, SweepAnswer } from "./answer.ts";
import type { FrequencySensitivity } from "./sensitivity.ts";

/** A steady response that can be asked at any frequency, exactly. */
export interface FrequencyResponse {
  /** Complex amplitude [re, im] of the quantity at that very frequency; power: mean over a cycle, im = 0. */
  at(quantity: QuantityRef, frequencyHz: number): Outcome<readonly [number, number]>;
  /** Largest magnitude between two frequencies, found between samples too. Fails with reason where it is unbounded. */
  peak(quantity: QuantityRef, fromHz: number, toHz: number): Outcome<Peak>;
  /** Smallest magnitude, anti-resonances found between samples too. */
  least(quantity: QuantityRef, fromHz: number, toHz: number): Outcome<Peak>;
}

/** A response in time that can be asked at any instant of the ask. */
export interface TimeResponse {
  at(quantity: QuantityRef, time: number): Outcome<number>;
  highest(quantity: QuantityRef): Outcome<Peak>;
  lowest(quantity: QuantityRef): Outcome<Peak>;
  /** Root of the mean square over the whole answer. */
  rms(quantity: QuantityRef): Outcome<number>;
  /** Where it settles when every drive has ended or stands still; fails when it does not. */
  finalValue(quantity: QuantityRef): Outcome<number>;
  /** Instants at which the quantity passes a level upwards / in any direction, ascending. */
  crossings(quantity: QuantityRef, level: number, direction: "up" | "any"): Outcome<Float64Array>;
}

/** Static quantities under gravity, preloads. */
export interface StaticResponse {
  /**
   * Size of travel (m, rad) and force (N, N*m) of element `index` when gravity acts on every mass in its positive
   * direction; `pull` is that force with its sign, positive where it pulls the ends together.
   */
  element(index: number): Outcome<{ readonly travel: number; readonly force: number; readonly pull: number }>;
}

/**
 * Everything that can be asked of one instance. Pure: the same instance gives the same answers; what has been
 * computed is kept for the life of the object. Made by `analyse` in analysis-of.ts.
 */
export interface Analysis {
  readonly instance: Instance;
  modes(): Outcome<ModeTable>;
  /** Derivative of each elastic mode's frequency (Hz) by the stiffness and inertia terms. */
  sensitivity(): Outcome<FrequencySensitivity>;
  frequencyResponse(by: readonly number[]): Outcome<FrequencyResponse>;
  sweep(ask: SweepAsk): Outcome<SweepAnswer>;
  timeResponse(ask: HistoryAsk): Outcome<TimeResponse>;
  history(ask: HistoryAsk): Outcome<HistoryAnswer>;
  statics(): Outcome<StaticResponse>;
  /** Participation of a direction given by a form: does a force along it excite the mode at this index of the table? 0 to 1. */
  excites(form: LinearForm, modeIndex: number): number;
}
