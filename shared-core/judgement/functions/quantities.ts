import type { QuantityRef } from "../../mechanics/assembly.ts";
import type { Kind, Quantity } from "../../units/dimension.ts";
import { dimension, kindOf, NUMBER, number, quantity, RATE } from "../../units/quantity.ts";
import { unitOf } from "../../units/unit-of.ts";

/** A time in seconds. */
export const seconds = (value: number): Quantity => quantity(value, dimension(0, 0, 1));

/** Kind of an SI unit as answers write it: names with powers joined by `*` and `/`. */
export function kindOfUnit(text: string): Kind {
  if (text === "" || text === "1" || text === "rad") return NUMBER;
  if (text === "rad/s" || text === "Hz") return RATE;
  const factors = [...text.matchAll(/([*/]?)\(?([A-Za-z]+)\)?(?:\^(-?\d+))?/g)].map(
    ([, sign, name, power]) => ({ name, power: Number(power ?? 1) * (sign === "/" ? -1 : 1) }),
  );
  const meaning = unitOf({ text, factors });
  return "kind" in meaning ? kindOf(meaning.kind.dimension) : NUMBER;
}

/** A value of a series. A turning speed is held in rad/s in answers and in Hz, as a rate, in expressions. */
export function seriesValue(ref: QuantityRef, value: number): Quantity {
  const kind = kindOfUnit(ref.unit);
  return { ...kind, value: kind.rate && ref.unit === "rad/s" ? value / (2 * Math.PI) : value };
}

/** SI value of an expression in the unit of the series. */
export function inSeriesUnit(ref: QuantityRef, value: Quantity): number {
  return value.rate && ref.unit === "rad/s" ? value.value * 2 * Math.PI : value.value;
}

export const share = number;
