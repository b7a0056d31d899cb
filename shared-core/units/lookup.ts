import type { Unit } from "./dimension.ts";
import { type TableUnit, UNIT_TABLE } from "./table.ts";

/** Finds units that the table does not hold (see other-units.ts); undefined: there is no such unit. */
export type UnitResolver = (name: string) => Unit | undefined;

/** SI prefixes, SI brochure (2019, with the additions of 2022). `µ` is typed as U+00B5 and as U+03BC. */
export const PREFIXES: ReadonlyMap<string, number> = new Map([
  ["Q", 1e30],
  ["R", 1e27],
  ["Y", 1e24],
  ["Z", 1e21],
  ["E", 1e18],
  ["P", 1e15],
  ["T", 1e12],
  ["G", 1e9],
  ["M", 1e6],
  ["k", 1e3],
  ["h", 1e2],
  ["da", 1e1],
  ["d", 1e-1],
  ["c", 1e-2],
  ["m", 1e-3],
  ["u", 1e-6],
  ["\u00b5", 1e-6],
  ["\u03bc", 1e-6],
  ["n", 1e-9],
  ["p", 1e-12],
  ["f", 1e-15],
  ["a", 1e-18],
  ["z", 1e-21],
  ["y", 1e-24],
  ["r", 1e-27],
  ["q", 1e-30],
]);

/** Words of the grammar that would read as a prefix and a unit: `as` is no attosecond. */
const NEVER_UNITS: ReadonlySet<string> = new Set(["as", "at", "to", "and", "or", "if", "from", "pi", "e"]);

/**
 * The unit of that name: an exact name wins over prefix and name (`min` is a minute, `cd` a candela, `Pa` a
 * pascal, `ft` a foot), then SI names with a prefix, then what `other` knows.
 */
export function lookupUnit(name: string, other?: UnitResolver): Unit | undefined {
  if (NEVER_UNITS.has(name)) return undefined;
  return BY_NAME.get(name) ?? prefixed(name) ?? LEARNED.get(name) ?? other?.(name);
}

/** Adds a unit that the table does not hold. What a name means never changes: one that is known stays as it is. */
export function learnUnit(unit: Unit): void {
  if (lookupUnit(unit.name) === undefined) LEARNED.set(unit.name, unit);
}

/** All units that were added so far. */
export const learnedUnits = (): readonly Unit[] => [...LEARNED.values()];

/** Whether a name behind a number is a unit of the table; what the parser asks. */
export function isUnitName(name: string): boolean {
  return lookupUnit(name) !== undefined;
}

/** Names of the table, without prefixes, for suggestions and completion. */
export const UNIT_NAMES: readonly string[] = UNIT_TABLE.map((unit) => unit.name);

const LEARNED = new Map<string, Unit>();
const BY_NAME: ReadonlyMap<string, TableUnit> = new Map(UNIT_TABLE.map((unit) => [unit.name, unit]));

function prefixed(name: string): Unit | undefined {
  for (const length of [1, 2]) {
    const scale = PREFIXES.get(name.slice(0, length));
    const base = BY_NAME.get(name.slice(length));
    if (scale === undefined || base === undefined || base.prefixes !== true) continue;
    const { dimension, rate } = base;
    return { name, factor: scaled(scale, base.factor), dimension, rate };
  }
  return undefined;
}

/** A prefix times a factor that is a power of ten: through the decimal text, so that `mg` is exactly 1e-6. */
function scaled(scale: number, factor: number): number {
  return factor === 1 ? scale : Number((scale * factor).toPrecision(15));
}
