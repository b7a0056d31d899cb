import type { AnswerArguments } from "../../model/model.ts";
import { fail } from "../../numerics/outcome.ts";
import type { CallNode } from "../../syntax/tree.ts";
import type { Quantity } from "../../units/dimension.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { extreme, phaseAt, placeOfExtreme, rms, valueAt } from "./answer-values.ts";
import { bandwidth } from "./bandwidth.ts";
import { below } from "./below.ts";
import {
  clearOfModes,
  dampedFrequency,
  dampingRatio,
  effectiveMass,
  naturalFrequency,
  separation,
  stabilityMargin,
} from "./mode-functions.ts";
import { sensitivity } from "./sensitivity.ts";
import { staticDeflection, staticForce } from "./statics.ts";
import { periodOf, settlingTime } from "./time-functions.ts";
import { transmissibility } from "./transmissibility.ts";

/** Reads a value from the answers of a trial. SI, rates in Hz. */
export type Reading = (trial: Trial, args: AnswerArguments, call: CallNode) => Found<Quantity>;

/** What each answer function of the language reads, by its name. */
export const READINGS: ReadonlyMap<string, Reading> = new Map<string, Reading>([
  ["natural_frequency", naturalFrequency],
  ["damped_frequency", dampedFrequency],
  ["damping_ratio", dampingRatio],
  ["effective_mass", effectiveMass],
  ["static_deflection", staticDeflection],
  ["static_force", staticForce],
  ["peak", extreme("peak")],
  ["highest", extreme("highest")],
  ["lowest", extreme("lowest")],
  ["rms", rms],
  ["peak_at", placeOfExtreme("peak")],
  ["least", extreme("least")],
  ["least_at", placeOfExtreme("least")],
  ["value", valueAt],
  ["phase", phaseAt],
  ["transmissibility", transmissibility],
  ["settling_time", settlingTime],
  ["bandwidth", bandwidth],
  ["period_of", periodOf],
  ["separation", separation],
  ["clear_of_modes", clearOfModes],
  ["below", below],
  ["stability_margin", stabilityMargin],
  ["sensitivity", sensitivity],
]);

/** The value of a call; a function that this version does not compute is a reason. */
export function readAnswer(trial: Trial, call: CallNode, args: AnswerArguments): Found<Quantity> {
  const reading = READINGS.get(call.callee.text);
  return reading === undefined
    ? fail(`${call.callee.text} is not computed by this version`)
    : reading(trial, args, call);
}
