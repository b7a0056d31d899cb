import type { Part } from "./plot-layout.ts";

/** No zoom shows less than this share of the whole. */
const LEAST = 1e-5;

/** Zooms by `factor` (below 1: closer) about a share of the shown part. */
export function zoomed([from, to]: Part, about: number, factor: number): Part {
  const size = Math.min(1, Math.max(LEAST, (to - from) * factor));
  const middle = from + about * (to - from);
  return inside(middle - about * size, size);
}

/** Moves the shown part by a share of itself. */
export function panned([from, to]: Part, by: number): Part {
  return inside(from + by * (to - from), to - from);
}

/** The part between two shares of the shown part, in any order; undefined when it is too narrow to be meant. */
export function between([from, to]: Part, a: number, b: number): Part | undefined {
  const [low, high] = [Math.max(0, Math.min(a, b)), Math.min(1, Math.max(a, b))];
  const size = (high - low) * (to - from);
  return size < LEAST ? undefined : [from + low * (to - from), from + high * (to - from)];
}

export const WHOLE: Part = [0, 1];
export const isWhole = ([from, to]: Part): boolean => from <= 0 && to >= 1;

function inside(from: number, size: number): Part {
  const start = Math.max(0, Math.min(1 - size, from));
  return [start, Math.min(1, start + size)];
}
