import type { Expectation } from "../model/model.ts";
import type { Quantity } from "../units/dimension.ts";
import type { Found } from "./found.ts";
import type { Trial } from "./trial.ts";

/** Both sides of a comparison with numbers put in. SI, rates in Hz. */
export interface Sides {
  readonly value: Quantity;
  readonly limit: Quantity;
  /** How far the value is beyond the limit, in the unit of both; at most 0 when it holds. */
  readonly excess: number;
  readonly holds: boolean;
}

/** A value equal to its limit but for rounding holds where equality does. */
const ROUNDING = 1e-12;

export function sidesOf(trial: Trial, expectation: Expectation): Found<Sides> {
  const value = trial.evaluate(expectation.left);
  if (!value.ok) return value;
  const limit = trial.evaluate(expectation.right);
  if (!limit.ok) return limit;
  if (!Number.isFinite(value.value.value)) return { ok: false, reason: "the value is not finite" };
  if (!Number.isFinite(limit.value.value)) return { ok: false, reason: "the limit is not finite" };
  return { ok: true, value: compare(expectation, value.value, limit.value) };
}

function compare({ operator }: Expectation, value: Quantity, limit: Quantity): Sides {
  const upper = operator === "<=" || operator === "<";
  const excess = upper ? value.value - limit.value : limit.value - value.value;
  const strict = operator === "<" || operator === ">";
  const rounding = ROUNDING * Math.max(Math.abs(value.value), Math.abs(limit.value));
  return { value, limit, excess, holds: strict ? excess < 0 : excess <= rounding };
}

/** Share of the limit that is left; negative when it fails; null where the limit is zero. */
export function marginOf({ limit, excess }: Sides): number | null {
  if (limit.value === 0) return null;
  const margin = -excess / Math.abs(limit.value);
  return margin === 0 ? 0 : margin;
}
