/** The largest excess along one draw, the others held: five samples with their slopes, refined between them. */
import type { Expectation } from "../../model/model.ts";
import { minimise } from "../../numerics/minimise.ts";
import type { Excess, Explorer, Positions } from "./explorer.ts";

export interface LineFound {
  readonly positions: Positions;
  readonly excess: number;
  /** True when the largest excess lies inside the band, not at an end of it. */
  readonly inside: boolean;
}

/** Offset for a slope, small against the distance of samples, large against rounding. */
const SLOPE_STEP = 1e-3;
/** Refinement of an interior extreme: a thousandth of the band is closer than any tolerance is known. */
const CLOSE_ENOUGH = 2e-3;
/** Cap on evaluations of one refinement. */
const EVALUATIONS = 16;

/** `samples` are positions in ascending order, ends of the band included. */
export function largestAlong(
  explorer: Explorer,
  expectation: Expectation,
  through: Positions,
  draw: number,
  samples: readonly number[],
): LineFound | { readonly reason: string } {
  const at = (position: number): Excess =>
    explorer.excess(
      expectation,
      through.map((other, i) => (i === draw ? position : other)),
    );
  const points: { readonly position: number; readonly excess: number; readonly rises: number }[] = [];
  for (const position of samples) {
    const here = at(position);
    if ("reason" in here) return here;
    const step = position > 0 ? -SLOPE_STEP : SLOPE_STEP;
    const beside = at(position + step);
    if ("reason" in beside) return beside;
    points.push({ position, excess: here.excess, rises: Math.sign((beside.excess - here.excess) * step) });
  }
  let best = points.reduce((most, point) => (point.excess > most.excess ? point : most));
  let inside = false;
  for (let i = 1; i < points.length; i++) {
    if (!(points[i - 1].rises > 0 && points[i].rises < 0)) continue;
    const refined = minimise(
      (position) => numberOf(at(position)),
      points[i - 1].position,
      points[i].position,
      {
        tolerance: CLOSE_ENOUGH,
        evaluations: EVALUATIONS,
      },
    );
    const found = refined.ok ? refined.value : refined.upTo;
    if (found !== undefined && -found.value > best.excess) {
      best = { position: found.x, excess: -found.value, rises: 0 };
      inside = true;
    }
  }
  const positions = through.map((other, i) => (i === draw ? best.position : other));
  return { positions, excess: best.excess, inside: inside || Math.abs(best.position) < 1 };
}

/** A point that cannot be computed is no largest excess; it ends the refinement with the best so far. */
const numberOf = (excess: Excess): number => ("reason" in excess ? Number.NaN : -excess.excess);
