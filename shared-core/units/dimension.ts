/**
 * Exponents of the base dimensions, in this order: length, mass, time, current, temperature, amount, luminous
 * intensity. Angles count as numbers: N*m and N*m/rad are the same stiffness.
 */
export type Dimension = readonly [number, number, number, number, number, number, number];

/**
 * What kind of number an expression is. A rate (Hz, rpm, rad/s ...) is a kind of its own, held in Hz
 * whatever its spelling; `dimension` is then 1/time.
 */
export interface Kind {
  readonly dimension: Dimension;
  readonly rate: boolean;
}

/** A number with its kind: SI value, rates in Hz. */
export interface Quantity extends Kind {
  readonly value: number;
}

/** A unit of the table. `factor` turns a number in the unit into SI (rates: into Hz). */
export interface Unit {
  readonly name: string;
  readonly factor: number;
  readonly dimension: Dimension;
  /** A spelling of a rate: Hz, rpm, cpm, rev/s, rad/s, deg/s. */
  readonly rate?: boolean;
}
