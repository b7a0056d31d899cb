import type { Mode, ModeTable } from "../answers/answer.ts";
import type { Found } from "./found.ts";

/** Rounding of the eigenvalue solve: growth below this part of the root, and of the largest root, is none. */
const OWN_ROUNDING = 1e-9;
const LARGEST_ROUNDING = 1e-12;

/** Modes whose root lies in the right half-plane beyond rounding; one of each complex pair. */
export function growingModes(modes: Found<ModeTable>): readonly Mode[] {
  if (!modes.ok) return [];
  const size = (mode: Mode): number => Math.hypot(...mode.eigenvalue);
  const largest = Math.max(0, ...modes.value.modes.map(size));
  return modes.value.modes.filter((mode) => {
    const growth = Math.max(mode.eigenvalue[0], ...(mode.realRoots ?? []));
    const rounding = mode.number === 0 ? 1e-6 * largest : LARGEST_ROUNDING * largest;
    return growth > OWN_ROUNDING * size(mode) && growth > rounding;
  });
}
