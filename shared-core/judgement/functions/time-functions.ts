/** Functions of a history: when it settles, how often it swings. */

import type { TimeResponse } from "../../answers/analysis.ts";
import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { AnswerArguments, HistoryAsk } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { CallNode, Expression } from "../../syntax/tree.ts";
import type { Quantity } from "../../units/dimension.ts";
import { isNumber } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { kindOfUnit } from "../unit-text.ts";
import { inUnit, time } from "../wording.ts";
import { inTime } from "./answer-values.ts";
import { historyOf, numberOf, seriesOf } from "./arguments.ts";
import { inSeriesUnit, seconds } from "./quantities.ts";
import { swings } from "./swing.ts";

/** Last time the history leaves the band around its final equilibrium; 0 when it never does. */
export function settlingTime(trial: Trial, args: AnswerArguments, call: CallNode): Found<Quantity> {
  const read = readHistory(trial, args);
  if (!read.ok) return read;
  const { ask, quantity, response } = read.value;
  const band = numberOf(args, "band");
  if (!band.ok) return band;
  const final = response.finalValue(quantity);
  if (!final.ok) return final;
  const high = response.highest(quantity);
  const low = response.lowest(quantity);
  if (!high.ok) return high;
  if (!low.ok) return low;
  const deviation = Math.max(high.value.value - final.value, final.value - low.value.value, 0);
  const half = isShare(call, band.value, quantity)
    ? band.value.value * deviation
    : inSeriesUnit(quantity, band.value);
  if (!(half > 0)) return fail("the band must be wider than nothing");
  if (deviation <= half) return succeed(seconds(0));
  const end = response.at(quantity, ask.lasting);
  if (!end.ok) return end;
  if (Math.abs(end.value - final.value) > half) {
    return notSettled(trial, ask, quantity, Math.abs(end.value - final.value), half);
  }
  const last = lastCrossing(response, quantity, final.value, half);
  return last.ok ? succeed(seconds(last.value)) : last;
}

/** Mean time between upward crossings of the final equilibrium; where it has none, of zero or the middle of the swing. */
export function periodOf(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const read = readHistory(trial, args);
  if (!read.ok) return read;
  const { ask, quantity, response } = read.value;
  const swinging = swings(response, trial.instance.assembly, quantity, ask.lasting);
  if (!swinging.ok) return swinging;
  const level = swingLevel(response, quantity);
  if (!level.ok) return level;
  const crossings = response.crossings(quantity, level.value, "up");
  if (!crossings.ok) return fail(crossings.reason);
  const { length } = crossings.value;
  if (length < 2) return fail(`\`${quantity.text}\` swings through less than one cycle in \`${ask.name}\``);
  return succeed(seconds((crossings.value[length - 1] - crossings.value[0]) / (length - 1)));
}

interface ReadHistory {
  readonly ask: HistoryAsk;
  readonly quantity: QuantityRef;
  readonly response: TimeResponse;
}

function readHistory(trial: Trial, args: AnswerArguments): Found<ReadHistory> {
  const ask = historyOf(args);
  if (!ask.ok) return ask;
  const series = seriesOf(args);
  if (!series.ok) return series;
  const response = inTime(trial, ask.value);
  if (!response.ok) return response;
  return succeed({ ask: ask.value, quantity: series.value.quantity, response: response.value });
}

/** A bare number is a share of the largest deviation, unless the series is an angle and the band has its unit. */
function isShare(call: CallNode, band: Quantity, quantity: QuantityRef): boolean {
  if (!isNumber(band)) return false;
  if (!isNumber(kindOfUnit(quantity.unit))) return true;
  const written = call.positional[2] ?? call.named.find(({ name }) => name.text === "band")?.value;
  return written === undefined || !hasAngleUnit(written);
}

function hasAngleUnit(expression: Expression): boolean {
  switch (expression.kind) {
    case "number":
      return expression.unit !== undefined && /^(m|u|µ)?(rad|deg|rev)$/.test(expression.unit.text);
    case "parenthesis":
      return hasAngleUnit(expression.inner);
    case "unary":
      return hasAngleUnit(expression.operand);
    case "binary":
      return hasAngleUnit(expression.left) || hasAngleUnit(expression.right);
    case "as":
      return /^(m|u|µ)?(rad|deg|rev)$/.test(expression.unit.text);
    default:
      return false;
  }
}

function lastCrossing(
  response: TimeResponse,
  quantity: QuantityRef,
  final: number,
  half: number,
): Found<number> {
  let last = 0;
  for (const level of [final + half, final - half]) {
    const crossings = response.crossings(quantity, level, "any");
    if (!crossings.ok) return fail(crossings.reason);
    last = Math.max(last, crossings.value[crossings.value.length - 1] ?? 0);
  }
  return succeed(last);
}

function notSettled(
  trial: Trial,
  ask: HistoryAsk,
  quantity: QuantityRef,
  away: number,
  half: number,
): Found<Quantity> {
  const message = `\`${ask.name}\` ends after ${time(ask.lasting)} with \`${quantity.text}\` still ${inUnit(away, quantity.unit)} from where it settles, outside its band of ${inUnit(half, quantity.unit)}`;
  trial.remark({ code: "not-settled", ask, message, hint: "let it last longer" });
  return fail(message);
}

function swingLevel(response: TimeResponse, quantity: QuantityRef): Found<number> {
  const final = response.finalValue(quantity);
  if (final.ok) return final;
  const high = response.highest(quantity);
  const low = response.lowest(quantity);
  if (!high.ok) return high;
  if (!low.ok) return low;
  const straddles = low.value.value < 0 && high.value.value > 0;
  return succeed(straddles ? 0 : (high.value.value + low.value.value) / 2);
}
