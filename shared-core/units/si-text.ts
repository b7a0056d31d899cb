import type { Dimension, Kind } from "./dimension.ts";
import { isNumber } from "./quantity.ts";

/**
 * The SI unit of a kind as text, the same spelling everywhere: `N/m`, `m/s^2`, `Hz` for rates, `1` for a bare
 * number. What has no unit of its own is a product of base units: `kg*m^2/s^5`.
 */
export function siUnit(kind: Kind): string {
  if (kind.rate) return "Hz";
  if (isNumber(kind)) return "1";
  return NAMED.get(kind.dimension.join()) ?? productOfBases(kind.dimension);
}

const BASES = ["m", "kg", "s", "A", "K", "mol", "cd"] as const;

/** Length, mass, time, current: the unit by which the trade calls it. */
const NAMED: ReadonlyMap<string, string> = new Map(
  (
    [
      [[0, 1, -2, 0], "N/m"],
      [[0, 1, -1, 0], "N*s/m"],
      [[1, 1, -2, 0], "N"],
      [[1, 1, -1, 0], "N*s"],
      [[2, 1, -2, 0], "N*m"],
      [[2, 1, -1, 0], "N*m*s"],
      [[2, 1, 0, 0], "kg*m^2"],
      [[1, 1, 0, 0], "kg*m"],
      [[2, 1, -3, 0], "W"],
      [[-1, 1, -2, 0], "Pa"],
      [[-2, 1, -2, 0], "N/m^3"],
      [[-1, 1, 0, 0], "N*s^2/m^2"],
      [[0, 0, 1, 1], "C"],
      [[2, 1, -3, -1], "V"],
      [[2, 1, -3, -2], "ohm"],
      [[2, 1, -2, -2], "H"],
      [[-2, -1, 4, 2], "F"],
      [[2, 1, -4, -2], "V/C"],
      [[2, 1, -2, -1], "V*s"],
      [[1, 1, -2, -1], "N/A"],
    ] as const
  ).map(([exponents, text]) => [[...exponents, 0, 0, 0].join(), text]),
);

function productOfBases(dimension: Dimension): string {
  const factor = (sign: 1 | -1) =>
    dimension.flatMap((exponent, i) => {
      const size = exponent * sign;
      if (size <= 0) return [];
      return [size === 1 ? BASES[i] : `${BASES[i]}^${size}`];
    });
  const [above, below] = [factor(1), factor(-1)];
  if (below.length === 0) return above.join("*");
  const under = below.length === 1 ? below[0] : `(${below.join("*")})`;
  return `${above.join("*") || "1"}/${under}`;
}
