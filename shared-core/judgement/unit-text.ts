import type { Kind } from "../units/dimension.ts";
import { kindOf, NUMBER, RATE } from "../units/quantity.ts";
import { unitOf } from "../units/unit-of.ts";

/** Kind of an SI unit as answers write it: names with powers joined by `*` and `/`. */
export function kindOfUnit(text: string): Kind {
  const known = KNOWN.get(text);
  if (known !== undefined) return known;
  const flat = text.replace(/\/\(([^)]*)\)/g, (_, below: string) => `/${below.replaceAll("*", "/")}`);
  const factors = [...flat.matchAll(/([*/]?)([A-Za-z]+)(?:\^(-?\d+))?/g)].map(([, sign, name, power]) => ({
    name,
    power: Number(power ?? 1) * (sign === "/" ? -1 : 1),
  }));
  const meaning = unitOf({ text, factors });
  const kind = "kind" in meaning ? kindOf(meaning.kind.dimension) : NUMBER;
  KNOWN.set(text, kind);
  return kind;
}

/** A turning speed is in rad/s in answers and a rate; the few units of a model are read once. */
const KNOWN = new Map<string, Kind>([
  ["", NUMBER],
  ["1", NUMBER],
  ["rad", NUMBER],
  ["rad/s", RATE],
  ["Hz", RATE],
]);
