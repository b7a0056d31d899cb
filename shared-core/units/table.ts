import type { Unit } from "./dimension.ts";

/** A unit that the language spells itself; `prefixes` marks the SI names, which alone take them. */
export interface TableUnit extends Unit {
  readonly prefixes?: true;
}

/**
 * The units of the language. Written by tools/make-unit-table.mjs from mathjs, with exact factors in place of
 * rounded ones; change that script, not this file. Dimension order as in dimension.ts; rates in Hz.
 */
export const UNIT_TABLE: readonly TableUnit[] = [
  { name: "m", factor: 1, dimension: [1, 0, 0, 0, 0, 0, 0], prefixes: true },
  { name: "g", factor: 0.001, dimension: [0, 1, 0, 0, 0, 0, 0], prefixes: true },
  { name: "s", factor: 1, dimension: [0, 0, 1, 0, 0, 0, 0], prefixes: true },
  { name: "A", factor: 1, dimension: [0, 0, 0, 1, 0, 0, 0], prefixes: true },
  { name: "K", factor: 1, dimension: [0, 0, 0, 0, 1, 0, 0], prefixes: true },
  { name: "mol", factor: 1, dimension: [0, 0, 0, 0, 0, 1, 0], prefixes: true },
  { name: "cd", factor: 1, dimension: [0, 0, 0, 0, 0, 0, 1], prefixes: true },
  { name: "N", factor: 1, dimension: [1, 1, -2, 0, 0, 0, 0], prefixes: true },
  { name: "Pa", factor: 1, dimension: [-1, 1, -2, 0, 0, 0, 0], prefixes: true },
  { name: "J", factor: 1, dimension: [2, 1, -2, 0, 0, 0, 0], prefixes: true },
  { name: "W", factor: 1, dimension: [2, 1, -3, 0, 0, 0, 0], prefixes: true },
  { name: "C", factor: 1, dimension: [0, 0, 1, 1, 0, 0, 0], prefixes: true },
  { name: "V", factor: 1, dimension: [2, 1, -3, -1, 0, 0, 0], prefixes: true },
  { name: "F", factor: 1, dimension: [-2, -1, 4, 2, 0, 0, 0], prefixes: true },
  { name: "H", factor: 1, dimension: [2, 1, -2, -2, 0, 0, 0], prefixes: true },
  { name: "S", factor: 1, dimension: [-2, -1, 3, 2, 0, 0, 0], prefixes: true },
  { name: "Wb", factor: 1, dimension: [2, 1, -2, -1, 0, 0, 0], prefixes: true },
  { name: "T", factor: 1, dimension: [0, 1, -2, -1, 0, 0, 0], prefixes: true },
  { name: "ohm", factor: 1, dimension: [2, 1, -3, -2, 0, 0, 0], prefixes: true },
  { name: "Ω", factor: 1, dimension: [2, 1, -3, -2, 0, 0, 0], prefixes: true },
  { name: "Ω", factor: 1, dimension: [2, 1, -3, -2, 0, 0, 0], prefixes: true },
  { name: "rad", factor: 1, dimension: [0, 0, 0, 0, 0, 0, 0], prefixes: true },
  { name: "l", factor: 0.001, dimension: [3, 0, 0, 0, 0, 0, 0], prefixes: true },
  { name: "L", factor: 0.001, dimension: [3, 0, 0, 0, 0, 0, 0], prefixes: true },
  { name: "bar", factor: 100000, dimension: [-1, 1, -2, 0, 0, 0, 0], prefixes: true },
  { name: "Hz", factor: 1, dimension: [0, 0, -1, 0, 0, 0, 0], rate: true, prefixes: true },
  { name: "t", factor: 1000, dimension: [0, 1, 0, 0, 0, 0, 0] },
  { name: "min", factor: 60, dimension: [0, 0, 1, 0, 0, 0, 0] },
  { name: "h", factor: 3600, dimension: [0, 0, 1, 0, 0, 0, 0] },
  { name: "in", factor: 0.0254, dimension: [1, 0, 0, 0, 0, 0, 0] },
  { name: "mil", factor: 0.0000254, dimension: [1, 0, 0, 0, 0, 0, 0] },
  { name: "ft", factor: 0.3048, dimension: [1, 0, 0, 0, 0, 0, 0] },
  { name: "lbf", factor: 4.4482216152605, dimension: [1, 1, -2, 0, 0, 0, 0] },
  { name: "kip", factor: 4448.2216152605, dimension: [1, 1, -2, 0, 0, 0, 0] },
  { name: "lbm", factor: 0.45359237, dimension: [0, 1, 0, 0, 0, 0, 0] },
  { name: "oz", factor: 0.028349523125, dimension: [0, 1, 0, 0, 0, 0, 0] },
  { name: "slug", factor: 14.593902937206362, dimension: [0, 1, 0, 0, 0, 0, 0] },
  { name: "psi", factor: 6894.757293168361, dimension: [-1, 1, -2, 0, 0, 0, 0] },
  { name: "gn", factor: 9.80665, dimension: [1, 0, -2, 0, 0, 0, 0] },
  { name: "rpm", factor: 0.016666666666666666, dimension: [0, 0, -1, 0, 0, 0, 0], rate: true },
  { name: "cpm", factor: 0.016666666666666666, dimension: [0, 0, -1, 0, 0, 0, 0], rate: true },
  { name: "deg", factor: 0.017453292519943295, dimension: [0, 0, 0, 0, 0, 0, 0] },
  { name: "rev", factor: 6.283185307179586, dimension: [0, 0, 0, 0, 0, 0, 0] },
  { name: "%", factor: 0.01, dimension: [0, 0, 0, 0, 0, 0, 0] },
  { name: "ppm", factor: 0.000001, dimension: [0, 0, 0, 0, 0, 0, 0] },
];
