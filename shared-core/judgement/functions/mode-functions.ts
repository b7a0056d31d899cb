/** Functions of the mode table: frequencies, damping, effective mass, distance from drives, decay. */

import type { Mode } from "../../answers/answer.ts";
import { isSteady } from "../../answers/drive-phasor.ts";
import type { AnswerArguments } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { number, PER_TIME, quantity, rate } from "../../units/quantity.ts";
import { excitedModes, separationFrom } from "../drives.ts";
import type { Found } from "../found.ts";
import { elasticModes } from "../shapes.ts";
import type { Trial } from "../trial.ts";
import { list, number as say } from "../wording.ts";
import { argument, numberOf } from "./arguments.ts";

export function naturalFrequency(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const mode = swingingModeOf(trial, args);
  return mode.ok ? succeed(rate(mode.value.frequencyHz)) : mode;
}

export function dampedFrequency(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const mode = modeOf(trial, args);
  return mode.ok ? succeed(rate(mode.value.dampedFrequencyHz)) : mode;
}

export function dampingRatio(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const mode = modeOf(trial, args);
  if (!mode.ok) return mode;
  const { dampingRatio: ratio } = mode.value;
  return ratio === null ? fail(`mode ${mode.value.number} has no damping ratio`) : succeed(number(ratio));
}

export function effectiveMass(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const mode = modeOf(trial, args);
  if (!mode.ok) return mode;
  const shares = mode.value.effectiveMass;
  const directions = Object.keys(shares);
  const word = args.direction?.is === "word" ? args.direction.word : undefined;
  if (word !== undefined) {
    if (word in shares) return succeed(number(shares[word]));
    return fail(`nothing moves along ${word}: the directions here are ${list(directions)}`);
  }
  if (directions.length === 1) return succeed(number(shares[directions[0]]));
  return directions.length === 0
    ? fail("no mass moves")
    : fail(`the model moves along ${list(directions)}: say which, as effective_mass(1, ${directions[0]})`);
}

/** Distance of a rate from a mode, as a share of the mode's frequency. */
export function separation(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const mode = swingingModeOf(trial, args);
  if (!mode.ok) return mode;
  const at = numberOf(args, "rate");
  return at.ok ? succeed(number(Math.abs(at.value.value / mode.value.frequencyHz - 1))) : at;
}

/**
 * Least separation of an elastic mode that the drive can excite from a rate or range times each order. The
 * drives meant are those that run at that rate or in that range; where none does, all steady drives.
 */
export function clearOfModes(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const table = trial.modes();
  if (!table.ok) return table;
  const band = bandOf(args);
  if (!band.ok) return band;
  const orders = args.orders?.is === "list" ? args.orders.values : [1];
  const { assembly } = trial.instance;
  const steady = assembly.drives.filter(isSteady);
  const meant = steady.filter((drive) => runsThere(drive.bandHz, band.value, orders));
  const modes = excitedModes(trial.analysis, assembly, table.value, meant.length > 0 ? meant : steady);
  if (modes.length === 0) return fail("no drive excites an elastic mode");
  let least = Number.POSITIVE_INFINITY;
  for (const mode of modes) {
    for (const order of orders) {
      const [low, high] = band.value;
      least = Math.min(least, separationFrom([order * low, order * high], mode.frequencyHz ?? 0));
    }
  }
  return succeed(number(least));
}

export function stabilityMargin(trial: Trial): Found<Quantity> {
  const table = trial.modes();
  return table.ok ? succeed(quantity(table.value.stabilityMargin, PER_TIME)) : table;
}

function modeOf(trial: Trial, args: AnswerArguments): Found<Mode & { frequencyHz: number }> {
  const wanted = numberOf(args, "mode");
  if (!wanted.ok) return wanted;
  const n = wanted.value.value;
  if (!Number.isInteger(n) || n < 1) return fail(`modes are counted 1, 2, 3 …, and ${say(n)} is none`);
  const table = trial.modes();
  if (!table.ok) return table;
  const elastic = elasticModes(table.value);
  const mode = elastic.find((candidate) => candidate.number === n);
  if (mode !== undefined) return succeed(mode);
  const count = elastic.length === 1 ? "one elastic mode" : `${elastic.length} elastic modes`;
  return fail(`there is no mode ${n}: the model has ${elastic.length === 0 ? "no elastic mode" : count}`);
}

/** A mode that has a natural frequency: one that does not return to rest is 0 Hz in the table, and below every limit. */
function swingingModeOf(trial: Trial, args: AnswerArguments): Found<Mode & { frequencyHz: number }> {
  const mode = modeOf(trial, args);
  if (!mode.ok || mode.value.frequencyHz > 0) return mode;
  return fail(`mode ${mode.value.number} does not return to rest, so it has no natural frequency`);
}

function bandOf(args: AnswerArguments): Found<readonly [number, number]> {
  const found = argument(args, "rate", "number", "range");
  if (!found.ok) return found;
  if (found.value.is === "number") {
    const { value } = found.value.quantity;
    return succeed([value, value]);
  }
  const { from, to } = found.value;
  return succeed([Math.min(from.value, to.value), Math.max(from.value, to.value)]);
}

/** Relative difference below which two written rates are the same. */
const SAME_RATE = 1e-9;

function runsThere(
  drive: readonly [number, number] | undefined,
  band: readonly [number, number],
  orders: readonly number[],
): boolean {
  if (drive === undefined) return false;
  const same = (a: number, b: number): boolean => Math.abs(a - b) <= SAME_RATE * Math.max(a, b);
  return [1, ...orders].some((order) => same(drive[0], order * band[0]) && same(drive[1], order * band[1]));
}
