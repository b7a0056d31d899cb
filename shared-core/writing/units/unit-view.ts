import { number as shortNumber } from "../../judgement/wording.ts";
import { isFault } from "../../units/fault.ts";
import { unitOf } from "../../units/unit-of.ts";
import { writtenUnit } from "./written-unit.ts";

/** Which units people see. JSON always holds SI. */
export type UnitSystem = "as-written" | "si" | "inch";

export const UNIT_SYSTEMS: readonly UnitSystem[] = ["as-written", "si", "inch"];

/** A unit to show numbers in: an SI value divided by `factor` is the number in it. */
export interface ShownUnit {
  /** Empty for a bare number. */
  readonly text: string;
  readonly factor: number;
}

/** Chooses the unit of everything that is shown. Units are asked for by their SI text (see `siUnit`), `rad` too. */
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
      const own = system === "as-written" ? written.get(si) : undefined;
      if (own) return own;
      const inch = system === "inch" ? INCH.get(si) : undefined;
      if (inch) return shownUnit(inch);
      if (si === "rad" && system !== "si") return shownUnit("deg");
      return prefixed(si, size);
    },
  };
}

/** A number in a unit: four digits, a blank, the unit. */
export function inUnit(value: number, unit: ShownUnit): string {
  const text = shortNumber(value / unit.factor);
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

const BARE: ShownUnit = { text: "", factor: 1 };

/** A unit of our own tables by its text. */
export function shownUnit(text: string): ShownUnit {
  if (text === "1" || text === "") return BARE;
  const meaning = unitOf(writtenUnit(text));
  // A text that is no unit of the table is shown as it is, with SI numbers.
  return isFault(meaning) ? { text, factor: 1 } : { text, factor: meaning.factor };
}

const INCH: ReadonlyMap<string, string> = new Map([
  ["m", "in"],
  ["m/s", "in/s"],
  ["m/s^2", "in/s^2"],
  ["kg", "lbm"],
  ["kg*m^2", "lbm*in^2"],
  ["kg*m", "lbm*in"],
  ["N", "lbf"],
  ["N/m", "lbf/in"],
  ["N*s/m", "lbf*s/in"],
  ["N*s", "lbf*s"],
  ["N*m", "lbf*in"],
  ["N*m*s", "lbf*in*s"],
  ["N/m^3", "lbf/in^3"],
  ["W", "lbf*in/s"],
  ["Pa", "psi"],
]);

/** Units whose first factor takes a prefix, with the prefixes that the trade uses, the largest first. */
const PREFIXES: ReadonlyMap<string, readonly (readonly [number, string])[]> = new Map([
  [
    "m",
    [
      [1, "m"],
      [1e-3, "mm"],
      [1e-6, "um"],
      [1e-9, "nm"],
    ],
  ],
  [
    "m/s",
    [
      [1, "m/s"],
      [1e-3, "mm/s"],
      [1e-6, "um/s"],
    ],
  ],
  [
    "m/s^2",
    [
      [1e-2, "m/s^2"],
      [1e-3, "mm/s^2"],
    ],
  ],
  [
    "N",
    [
      [1e6, "MN"],
      [1e3, "kN"],
      [1, "N"],
      [1e-3, "mN"],
    ],
  ],
  [
    "N*m",
    [
      [1e3, "kN*m"],
      [1, "N*m"],
      [1e-3, "mN*m"],
    ],
  ],
  [
    "N/m",
    [
      [1e9, "GN/m"],
      [1e6, "MN/m"],
      [1e3, "kN/m"],
      [1, "N/m"],
    ],
  ],
  [
    "N*s/m",
    [
      [1e3, "kN*s/m"],
      [1, "N*s/m"],
    ],
  ],
  [
    "W",
    [
      [1e6, "MW"],
      [1e3, "kW"],
      [1, "W"],
      [1e-3, "mW"],
      [1e-6, "uW"],
    ],
  ],
  [
    "J",
    [
      [1e3, "kJ"],
      [1, "J"],
      [1e-3, "mJ"],
    ],
  ],
  [
    "Pa",
    [
      [1e9, "GPa"],
      [1e6, "MPa"],
      [1e3, "kPa"],
      [1, "Pa"],
    ],
  ],
  [
    "Hz",
    [
      [1e4, "kHz"],
      [1, "Hz"],
    ],
  ],
  [
    "s",
    [
      [0.1, "s"],
      [1e-3, "ms"],
      [1e-6, "us"],
    ],
  ],
  [
    "V",
    [
      [1e3, "kV"],
      [1, "V"],
      [1e-3, "mV"],
    ],
  ],
  [
    "A",
    [
      [1, "A"],
      [1e-3, "mA"],
      [1e-6, "uA"],
    ],
  ],
  [
    "C",
    [
      [1, "C"],
      [1e-3, "mC"],
      [1e-6, "uC"],
    ],
  ],
] as const);

/** A size this much below a step still takes it: 0.9999999 kN is 1 kN. */
const ROUNDING = 1 - 1e-9;

function prefixed(si: string, size: number): ShownUnit {
  const steps = PREFIXES.get(si);
  if (steps === undefined || size === 0) return shownUnit(si);
  const step = steps.find(([from]) => size >= from * ROUNDING) ?? steps[steps.length - 1];
  return shownUnit(step[1]);
}
