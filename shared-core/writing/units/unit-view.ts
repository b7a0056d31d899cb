import { kindOfUnit } from "../../judgement/unit-text.ts";
import { formatNumber, siUnit, type UnitSystem, unitToShow } from "../../units/show.ts";

/** A unit to show numbers in: an SI value divided by `factor` is the number in it. */
export interface ShownUnit {
  /** Empty for a bare number. */
  readonly text: string;
  readonly factor: number;
}

/** Chooses the unit of everything that is shown. Units are asked for by the SI text that answers carry. */
export interface UnitView {
  /** A unit for numbers as large as `size` in SI; all numbers of one column or axis share it. */
  unitFor(si: string, size: number): ShownUnit;
}

/**
 * The view of one file.
 * @param written units that the file itself uses, by SI text; only looked at for "as-written"
 */
export function unitView(system: UnitSystem, written: ReadonlyMap<string, ShownUnit> = new Map()): UnitView {
  return {
    unitFor(si, size) {
      if (si === "rad") return system === "si" ? { text: "rad", factor: 1 } : DEGREE;
      // Values of a turning rate are in rad/s, those of any other rate in Hz.
      if (si === "rad/s") return { text: si, factor: 1 };
      const kind = kindOfUnit(si);
      const own = system === "as-written" ? written.get(siUnit(kind)) : undefined;
      if (own) return own;
      const { text, factor } = unitToShow({ ...kind, value: size }, { system });
      return { text: text === "1" ? "" : text, factor };
    },
  };
}

const DEGREE: ShownUnit = { text: "deg", factor: Math.PI / 180 };

/** A number in a unit: four digits, a blank, the unit. */
export function inUnit(value: number, unit: ShownUnit): string {
  const text = formatNumber(value / unit.factor);
  return unit.text === "" ? text : `${text} ${unit.text}`;
}

/** The largest finite size in a list; 0 when there is none. */
export function largest(values: Iterable<number | null | undefined>): number {
  let most = 0;
  for (const value of values) {
    const size = Math.abs(value ?? 0);
    if (Number.isFinite(size) && size > most) most = size;
  }
  return most;
}
