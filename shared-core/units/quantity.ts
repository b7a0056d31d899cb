import type { Dimension, Kind, Quantity } from "./dimension.ts";

/** Length, mass, time, current, temperature, amount, luminous intensity. */
export function dimension(length = 0, mass = 0, time = 0, current = 0): Dimension {
  return [length, mass, time, current, 0, 0, 0];
}

export const NO_DIMENSION: Dimension = dimension();
export const PER_TIME: Dimension = dimension(0, 0, -1);

/** Kind of a bare number. */
export const NUMBER: Kind = { dimension: NO_DIMENSION, rate: false };
/** Kind of a rate, held in Hz. */
export const RATE: Kind = { dimension: PER_TIME, rate: true };

/** A bare number. */
export const number = (value: number): Quantity => ({ ...NUMBER, value });
/** A rate of `hertz` cycles a second. */
export const rate = (hertz: number): Quantity => ({ ...RATE, value: hertz });
/** A plain quantity in SI. */
export const quantity = (value: number, of: Dimension): Quantity => ({ value, dimension: of, rate: false });
/** A plain kind. */
export const kindOf = (of: Dimension): Kind => ({ dimension: of, rate: false });

/**
 * Exponents agree to 1e-9: powers such as 1/3 are held in floating point, and no unit has exponents that
 * differ by so little.
 */
const EXPONENT_ROUNDING = 1e-9;

export function sameDimension(a: Dimension, b: Dimension): boolean {
  for (let i = 0; i < a.length; i++) {
    if (!(Math.abs(a[i] - b[i]) < EXPONENT_ROUNDING)) return false;
  }
  return true;
}

export function sameKind(a: Kind, b: Kind): boolean {
  return a.rate === b.rate && sameDimension(a.dimension, b.dimension);
}

/** True for a bare number (angles and shares are numbers). */
export function isNumber(kind: Kind): boolean {
  return !kind.rate && sameDimension(kind.dimension, NO_DIMENSION);
}

/** True for a plain 1/s, which is no rate. */
export function isPlainPerTime(kind: Kind): boolean {
  return !kind.rate && sameDimension(kind.dimension, PER_TIME);
}

export function multiplyDimensions(a: Dimension, b: Dimension): Dimension {
  return combine((i) => a[i] + b[i]);
}

export function divideDimensions(a: Dimension, b: Dimension): Dimension {
  return combine((i) => a[i] - b[i]);
}

export function powerOfDimension(a: Dimension, exponent: number): Dimension {
  return combine((i) => a[i] * exponent);
}

/** Clears rounding from exponents such as 3 * (1/3), and the sign of zero. */
function combine(exponentAt: (index: number) => number): Dimension {
  const exact = (exponent: number): number => {
    const whole = Math.round(exponent);
    return (Math.abs(exponent - whole) < EXPONENT_ROUNDING ? whole : exponent) + 0;
  };
  return [0, 1, 2, 3, 4, 5, 6].map((i) => exact(exponentAt(i))) as unknown as Dimension;
}
