import type { Kind, Quantity } from "./dimension.ts";
import { knownKind } from "./known-kinds.ts";
import { isNumber } from "./quantity.ts";
import { formatQuantity, siUnit } from "./show.ts";

/** A kind in words and a unit a person uses: "a stiffness such as N/m", "a rate such as Hz". */
export function describeKind(kind: Kind): string {
  if (isNumber(kind)) return "a number without a unit";
  const known = knownKind(kind);
  return known ? `${known.words} such as ${known.say}` : `a quantity in ${siUnit(kind)}`;
}

/** What was found, with its value: "a mass, 3 kg". */
export function describeQuantity(quantity: Quantity): string {
  if (isNumber(quantity)) return `the number ${formatQuantity(quantity)}`;
  const known = knownKind(quantity);
  return known ? `${known.words}, ${formatQuantity(quantity)}` : formatQuantity(quantity);
}

/** Units worth offering where a number of that kind is wanted, the likeliest first. */
export function likelyUnits(kind: Kind): readonly string[] {
  const known = knownKind(kind);
  if (known !== undefined) return known.likely;
  return [siUnit(kind)];
}
