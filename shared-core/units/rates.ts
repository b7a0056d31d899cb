import { describeKind, describeQuantity } from "./describe.ts";
import type { Kind, Quantity } from "./dimension.ts";
import type { Fault } from "./fault.ts";
import {
  divideDimensions,
  isNumber,
  isPlainPerTime,
  multiplyDimensions,
  number,
  PER_TIME,
  powerOfDimension,
  quantity,
  rate,
  sameKind,
} from "./quantity.ts";
import { formatQuantity } from "./show.ts";
import type { UnitMeaning } from "./unit-of.ts";

/**
 * Arithmetic that keeps rates apart from plain 1/s, row by row as the table of the language has it. A result
 * is a quantity or a fault; a rate is in Hz throughout.
 */
export type Result = Quantity | Fault;

/** `a + b`: like with like; the number 0 fits any kind. */
export function add(a: Quantity, b: Quantity): Result {
  return compare(a, b) ?? { ...leading(a, b), value: a.value + b.value };
}

/** `a - b`: like with like; the number 0 fits any kind. */
export function subtract(a: Quantity, b: Quantity): Result {
  return compare(a, b) ?? { ...leading(a, b), value: a.value - b.value };
}

export function negate(a: Quantity): Quantity {
  return { ...a, value: -a.value };
}

/** `a * b`: a rate times a number is a rate; times anything else it is ambiguous. */
export function multiply(a: Quantity, b: Quantity): Result {
  if (a.rate && isNumber(b)) return rate(a.value * b.value);
  if (b.rate && isNumber(a)) return rate(a.value * b.value);
  if (a.rate || b.rate) return mixture(a.rate ? a : b, a.rate ? b : a);
  return quantity(a.value * b.value, multiplyDimensions(a.dimension, b.dimension));
}

/** `a / b`: rate / number is a rate, rate / rate a number, number / rate the time of that many cycles. */
export function divide(a: Quantity, b: Quantity): Result {
  if (a.rate && b.rate) return number(a.value / b.value);
  if (a.rate && isNumber(b)) return rate(a.value / b.value);
  if (a.rate || (b.rate && !isNumber(a))) return mixture(a.rate ? a : b, a.rate ? b : a);
  return quantity(a.value / b.value, divideDimensions(a.dimension, b.dimension));
}

/** `a ^ b`: the exponent is a number; a rate has no power but the first. */
export function power(a: Quantity, b: Quantity): Result {
  if (!isNumber(b)) return mismatch(`an exponent is a number, found ${describeQuantity(b)}`);
  if (a.rate) return b.value === 1 ? a : mixture(a);
  return quantity(a.value ** b.value, powerOfDimension(a.dimension, b.value));
}

/** Whether two quantities may be added or compared; undefined: they may. */
export function compare(a: Quantity, b: Quantity): Fault | undefined {
  if (sameKind(a, b) || isZero(a) || isZero(b)) return undefined;
  const plain = [a, b].find(isPlainPerTime);
  if (plain !== undefined && (a.rate || b.rate)) return plainForRate(plain);
  return mismatch(`expected ${describeKind(a)}, found ${describeQuantity(b)}`);
}

/** Whether what was found may stand where a kind is wanted; undefined: it may. */
export function fits(found: Quantity, wanted: Kind): Fault | undefined {
  if (sameKind(found, wanted) || isZero(found)) return undefined;
  if (wanted.rate && isPlainPerTime(found)) return plainForRate(found);
  if (found.rate && isPlainPerTime(wanted)) return rateForPlain(found);
  return mismatch(`expected ${describeKind(wanted)}, found ${describeQuantity(found)}`);
}

/** The angular rate of a rate, a plain 1/s: what `2 * pi * rate` and `RATE as rad/s` in a product mean. */
export function angular(of: Quantity): Quantity {
  return quantity(2 * Math.PI * of.value, PER_TIME);
}

/** The angle of `rate * t` inside sin and cos: one cycle a turn, in every spelling of the rate. */
export function cycleAngle(of: Quantity, time: Quantity): Quantity {
  return number(2 * Math.PI * of.value * time.value);
}

/**
 * `EXPR as UNIT`: gives a bare number its unit, a plain 1/s its meaning as rad/s or as Hz, and leaves what is of
 * the unit's kind as it is.
 */
export function statedAs(value: Quantity, unit: UnitMeaning): Result {
  if (sameKind(value, unit.kind)) return value;
  if (isNumber(value)) return { ...unit.kind, value: value.value * unit.factor };
  if (unit.kind.rate && isPlainPerTime(value)) {
    const turning = unit.factor === RADIAN_PER_SECOND;
    return turning || unit.factor === 1 ? rate(value.value * unit.factor) : plainForRate(value);
  }
  return fits(value, unit.kind) ?? { ...unit.kind, value: value.value };
}

/** `pi` times a rate without the 2 that would make it angular. */
export function piWithoutTwo(of: Quantity): Fault {
  return {
    code: "ambiguous-rate",
    message: `pi times a rate, ${formatQuantity(of)}, is neither cycles nor radians`,
    hint: "the angular rate is `2 * pi * rate`, or `rate as rad/s`",
    replace: [" as rad/s"],
  };
}

/** Cycles a second in 1 rad/s. */
const RADIAN_PER_SECOND = 1 / (2 * Math.PI);

const isZero = (a: Quantity): boolean => a.value === 0 && isNumber(a);

/** Kind of a sum: that of the term that is not the bare number 0. */
const leading = (a: Quantity, b: Quantity): Quantity => (isZero(a) ? b : a);

const mismatch = (message: string): Fault => ({ code: "unit-mismatch", message });

function mixture(of: Quantity, other?: Quantity): Fault {
  const shown = formatQuantity(of);
  const withWhat = other ? ` with ${describeQuantity(other)}` : "";
  return {
    code: "ambiguous-rate",
    message: `a rate, ${shown}, in a product${withWhat} leaves open whether it counts cycles or radians`,
    hint: "the angular rate is `rate as rad/s`; only that multiplies into other quantities",
    replace: [" as rad/s"],
  };
}

function plainForRate(plain: Quantity): Fault {
  const shown = formatQuantity(plain);
  return {
    code: "ambiguous-rate",
    message: `expected a rate such as Hz, found ${shown}, which may count radians or cycles`,
    hint: "`as rad/s` where it comes from sqrt(k/m), `as Hz` where it counts cycles",
    replace: [" as rad/s", " as Hz"],
  };
}

function rateForPlain(of: Quantity): Fault {
  return {
    code: "ambiguous-rate",
    message: `expected a plain 1/s, found a rate, ${formatQuantity(of)}`,
    hint: "a decay rate is written in 1/s; the angular rate is `2 * pi * rate`",
    replace: [],
  };
}
