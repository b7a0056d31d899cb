import type { UnitMeaning } from "../units/unit-of.ts";

/**
 * SI value of a number in a unit. A unit that is a whole part of the SI one divides, so that 4.5 mm is the double
 * nearest to 0.0045 and not its neighbour.
 */
export function inSI(value: number, { factor }: Pick<UnitMeaning, "factor">): number {
  const parts = 1 / factor;
  return factor < 1 && Number.isInteger(parts) ? value / parts : value * factor;
}
