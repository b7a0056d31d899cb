import { isFault } from "../../shared-core/units/fault.ts";
import type { UnitResolver } from "../../shared-core/units/lookup.ts";
import { type UnitFault, type UnitMeaning, unitOf } from "../../shared-core/units/unit-of.ts";

/** A unit given factor by factor: `written("N", 1, "m", -1)`. */
export function written(...parts: readonly (string | number)[]): Parameters<typeof unitOf>[0] {
  const factors = [];
  for (let i = 0; i < parts.length; i += 2)
    factors.push({ name: String(parts[i]), power: Number(parts[i + 1]) });
  return { text: factors.map(({ name, power }) => `${name}^${power}`).join("*"), factors };
}

export function meaning(parts: readonly (string | number)[], other?: UnitResolver): UnitMeaning {
  const found = unitOf(written(...parts), other);
  if (isFault(found)) throw new Error(found.message);
  return found;
}

export function fault(...parts: readonly (string | number)[]): UnitFault {
  const found = unitOf(written(...parts));
  if (!isFault(found)) throw new Error(`${found.text} was taken`);
  return found;
}
