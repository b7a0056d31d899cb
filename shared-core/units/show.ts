import type { Dimension, Kind, Quantity } from "./dimension.ts";
import { knownKind } from "./known-kinds.ts";
import type { UnitMeaning } from "./unit-of.ts";

/** How people want numbers: as the text has them, in SI units of a fitting size, or in inches and pounds. */
export type UnitSystem = "as-written" | "si" | "inch";

export interface ShowOptions {
  /** The unit of the text; shown in it under "as-written". */
  readonly unit?: UnitMeaning;
  /** Default: as-written. */
  readonly system?: UnitSystem;
  /** Significant digits, default 4. */
  readonly digits?: number;
}

/** SI unit of a kind as text: `N*s/m`, `Hz` for a rate, `1` for a bare number. */
export function siUnit(kind: Kind): string {
  return knownKind(kind)?.si ?? unitText(kind.dimension);
}

/** A number and its unit for people: `26.5 kN/m`, `0.35`, `19.67 Hz`. */
export function formatQuantity(quantity: Quantity, options: ShowOptions = {}): string {
  const { text, factor } = unitToShow(quantity, options);
  const shown = formatNumber(quantity.value / factor, options.digits);
  return text === "1" ? shown : `${shown} ${text}`;
}

/** The unit a quantity is shown in, and how much SI (rates: Hz) one of it is. */
export function unitToShow(
  quantity: Quantity,
  { unit, system = "as-written" }: ShowOptions = {},
): { readonly text: string; readonly factor: number } {
  if (system === "as-written" && unit !== undefined) return unit;
  const known = knownKind(quantity);
  const inch = system === "inch" ? known?.inch : undefined;
  return inch ?? fittingScale(quantity) ?? { text: siUnit(quantity), factor: 1 };
}

/**
 * `digits` significant digits (default 4) without trailing zeros, always with a point; very large and small ones
 * with an exponent: `0.035`, `26500`, `1.2e-6`.
 */
export function formatNumber(value: number, digits = 4): string {
  if (Number.isNaN(value)) return "no number";
  if (!Number.isFinite(value)) return value > 0 ? "infinite" : "-infinite";
  const rounded = Number(value.toPrecision(digits));
  if (rounded === 0) return "0";
  const size = Math.abs(rounded);
  if (PLAIN_FROM <= size && size < PLAIN_TO) return String(rounded);
  return rounded.toExponential().replace("e+", "e");
}

/** Between these a number reads better without an exponent; chosen by reading. */
const PLAIN_FROM = 1e-4;
const PLAIN_TO = 1e6;

/** The largest scale that leaves at least 1, else the smallest; the SI unit for 0. */
function fittingScale(quantity: Quantity): UnitMeaning | undefined {
  const known = knownKind(quantity);
  if (known === undefined || quantity.value === 0 || !Number.isFinite(quantity.value)) return undefined;
  const size = Math.abs(quantity.value) * (1 + ROUNDING);
  return known.scales.findLast(({ factor }) => size >= factor) ?? known.scales[0];
}

/** So that 1000 N computed as 999.9999999999999 is shown as 1 kN. */
const ROUNDING = 1e-12;

const BASE_UNITS = ["kg", "m", "s", "A", "K", "mol", "cd"];

/** A dimension without a name of its own, in base units: `kg*m^2/s^3`. */
function unitText([length, mass, time, current, temperature, amount, luminous]: Dimension): string {
  const powers = [mass, length, time, current, temperature, amount, luminous];
  const part = (sign: number): readonly string[] =>
    BASE_UNITS.flatMap((unit, i) => {
      const power = powers[i] * sign;
      if (power <= 0) return [];
      return [power === 1 ? unit : `${unit}^${formatNumber(power)}`];
    });
  const [above, below] = [part(1), part(-1)];
  return [above.join("*") || "1", ...below].join("/");
}
