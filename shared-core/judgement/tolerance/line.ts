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
/** Share of the value below which a change over a slope's step is rounding: the draw does not move it. */
const NOISE = 1e-10;
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
  const points: Point[] = [];
  for (const position of samples) {
    const point = withSlope(at, position);
    if ("reason" in point) return point;
    points.push(point);
  }
  let best = points[0].excess >= points[points.length - 1].excess ? points[0] : points[points.length - 1];
  let inside = false;
  const take = (point: Point): void => {
    if (!(point.excess > best.excess + point.noise)) return;
    best = point;
    inside = true;
  };
  points.slice(1, -1).forEach(take);
  for (let i = 1; i < points.length; i++) {
    const [left, right] = [points[i - 1], points[i]];
    if (!(left.rises > 0 && right.rises < 0)) continue;
    const refined = minimise((position) => numberOf(at(position)), left.position, right.position, {
      tolerance: CLOSE_ENOUGH,
      evaluations: EVALUATIONS,
    });
    const found = refined.ok ? refined.value : refined.upTo;
    if (found !== undefined) {
      take({ position: found.x, excess: -found.value, rises: 0, noise: left.noise });
    }
  }
  const positions = through.map((other, i) => (i === draw ? best.position : other));
  return { positions, excess: best.excess, inside };
}

interface Point {
  readonly position: number;
  readonly excess: number;
  /** Sign of the slope; 0 where the draw does not move it. */
  readonly rises: number;
  /** What rounding may make of the excess. */
  readonly noise: number;
}

function withSlope(at: (position: number) => Excess, position: number): Point | { readonly reason: string } {
  const here = at(position);
  if ("reason" in here) return here;
  const step = position > 0 ? -SLOPE_STEP : SLOPE_STEP;
  const beside = at(position + step);
  if ("reason" in beside) return beside;
  const change = beside.excess - here.excess;
  const noise = NOISE * Math.max(Math.abs(here.value), Math.abs(beside.value));
  const rises = Math.abs(change) <= noise ? 0 : Math.sign(change * step);
  return { position, excess: here.excess, rises, noise };
}

/** A point that cannot be computed is no largest excess; it ends the refinement with the best so far. */
const numberOf = (excess: Excess): number => ("reason" in excess ? Number.NaN : -excess.excess);
