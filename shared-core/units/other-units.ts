import type { Dimension, Unit } from "./dimension.ts";
import type { UnitResolver } from "./lookup.ts";

/**
 * Loads mathjs, which knows the units that the table does not hold, and gives a resolver over it with a cache of
 * its own. It takes some 100 ms, so call it once, when a name was not found in the table.
 */
export async function loadOtherUnits(): Promise<UnitResolver> {
  const { create, createUnitDependencies, unitDependencies } = await import("./mathjs.ts");
  const math = create({ unitDependencies, createUnitDependencies });
  const cache = new Map<string, Unit | undefined>();
  return (name) => {
    if (!cache.has(name)) cache.set(name, ask(name));
    return cache.get(name);
  };

  function ask(name: string): Unit | undefined {
    if (!/^[A-Za-z][A-Za-z0-9]*$/.test(name) || REFUSED.has(name)) return undefined;
    try {
      return toUnit(name, math.unit(1, name) as unknown as ForeignUnit);
    } catch {
      return undefined;
    }
  }
}

/** What is read of a unit of mathjs. */
interface ForeignUnit {
  readonly units: readonly {
    readonly unit: { readonly name: string; readonly offset: number; readonly value: number };
    readonly prefix: { readonly name: string };
  }[];
  readonly dimensions: readonly number[];
  toSI(): { readonly value: number | null };
}

/** Names that mean different things to different people (pound, ton), or no unit of a model. */
const REFUSED: ReadonlySet<string> = new Set([
  ...["lb", "lbs", "ton", "tons", "cycle", "cycles", "B", "b"],
  ...["drop", "gtt", "gtts", "stick", "sticks", "minim", "minims"],
]);

function toUnit(name: string, found: ForeignUnit): Unit | undefined {
  if (found.units.length !== 1) return undefined;
  const { unit, prefix } = found.units[0];
  const [mass, length, time, current, temperature, luminous, amount, angle, bit] = found.dimensions;
  const factor = found.toSI().value;
  if (bit !== 0 || unit.offset !== 0 || factor === null) return undefined;
  if (prefix.name !== "" && !takesPrefix(unit.name)) return undefined;
  const dimension: Dimension = [length, mass, time, current, temperature, amount, luminous];
  const rate = unit.name === "hertz" && angle === 0;
  return rate ? { name, factor, dimension, rate } : { name, factor, dimension };
}

/** Long spellings of SI names: prefixes go with SI names only. */
const SI_NAMES: ReadonlySet<string> = new Set(
  (
    "meter gram second ampere kelvin mole candela newton pascal joule watt coulomb volt farad henry siemens weber " +
    "tesla ohm hertz radian litre liter"
  ).split(" "),
);
const takesPrefix = (name: string): boolean => SI_NAMES.has(name) || SI_NAMES.has(name.replace(/s$/, ""));
