import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { Quantity } from "../../units/dimension.ts";
import { dimension, quantity } from "../../units/quantity.ts";
import { kindOfUnit } from "../unit-text.ts";

/** A time in seconds. */
export const seconds = (value: number): Quantity => quantity(value, dimension(0, 0, 1));

/** A value of a series. A turning speed is held in rad/s in answers and in Hz, as a rate, in expressions. */
export function seriesValue(ref: QuantityRef, value: number): Quantity {
  const kind = kindOfUnit(ref.unit);
  return { ...kind, value: kind.rate && ref.unit === "rad/s" ? value / (2 * Math.PI) : value };
}

/** SI value of an expression in the unit of the series. */
export function inSeriesUnit(ref: QuantityRef, value: Quantity): number {
  return value.rate && ref.unit === "rad/s" ? value.value * 2 * Math.PI : value.value;
}
