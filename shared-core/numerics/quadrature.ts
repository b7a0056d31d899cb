/**
 * Definite integral of a real function by adaptive Gauss-Kronrod quadrature.
 *
 * Method: the 7-15 point pair, always splitting the interval with the largest error estimate (Piessens et al.,
 * QUADPACK, 1983). Nodes and weights are the published ones; their exactness is tested.
 */
import { fail, type Outcome, succeed } from "./outcome.ts";

export type Integral = {
  value: number;
  /** Estimate of |value − truth|; usually far too large. */
  error: number;
  evaluations: number;
};

export type QuadratureOptions = {
  /** Wanted relative error; default 1e−10. */
  relative?: number;
  /** Wanted absolute error, in the unit of the integral; default 0. Reaching either is enough. */
  absolute?: number;
  /** Cap on intervals; default 500. */
  intervals?: number;
};

type Piece = { lo: number; hi: number; value: number; error: number };

/** Kronrod nodes on [0, 1] from the outside in; every second one, and the last, is a Gauss node too. */
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const KRONROD_WEIGHTS = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
const GAUSS_WEIGHTS = [0.1294849661688697, 0.27970539148927664, 0.3818300505051189, 0.4179591836734694];

/**
 * ∫ f from lo to hi, both finite. `breaks` are places inside where f has a kink or a narrow peak. Fails on a
 * value that is not finite, and at the cap with the best estimate in `upTo`.
 */
export function integrate(
  f: (x: number) => number,
  lo: number,
  hi: number,
  options: QuadratureOptions = {},
  breaks: readonly number[] = [],
): Outcome<Integral> {
  if (!Number.isFinite(lo) || !Number.isFinite(hi)) return fail("the interval is not finite");
  const relative = options.relative ?? 1e-10;
  const absolute = options.absolute ?? 0;
  const cap = options.intervals ?? 500;
  const [low, high] = lo <= hi ? [lo, hi] : [hi, lo];
  const inner = [...new Set(breaks)].filter((x) => low < x && x < high).sort((a, b) => a - b);
  const ends = [low, ...inner, high];
  const pieces: Piece[] = [];
  for (let i = 0; i + 1 < ends.length; i++) pieces.push(kronrod(f, ends[i], ends[i + 1]));
  for (;;) {
    let value = 0;
    let error = 0;
    let worst = 0;
    for (let i = 0; i < pieces.length; i++) {
      value += pieces[i].value;
      error += pieces[i].error;
      if (pieces[i].error > pieces[worst].error) worst = i;
    }
    if (!Number.isFinite(value)) return fail("the integrand is not finite");
    const reached = {
      value: lo <= hi ? value : -value,
      error,
      evaluations: 15 * (2 * pieces.length - ends.length + 1),
    };
    if (error <= Math.max(absolute, relative * Math.abs(value))) return succeed(reached);
    const { lo: a, hi: b } = pieces[worst];
    const middle = 0.5 * (a + b);
    if (pieces.length >= cap || !(a < middle && middle < b)) {
      return fail("the wanted accuracy was not reached within the cap", reached);
    }
    pieces[worst] = kronrod(f, a, middle);
    pieces.push(kronrod(f, middle, b));
  }
}

function kronrod(f: (x: number) => number, lo: number, hi: number): Piece {
  const centre = 0.5 * (lo + hi);
  const half = 0.5 * (hi - lo);
  const middle = f(centre);
  let fine = KRONROD_WEIGHTS[7] * middle;
  let coarse = GAUSS_WEIGHTS[3] * middle;
  let size = KRONROD_WEIGHTS[7] * Math.abs(middle);
  for (let i = 0; i < 7; i++) {
    const left = f(centre - half * NODES[i]);
    const right = f(centre + half * NODES[i]);
    fine += KRONROD_WEIGHTS[i] * (left + right);
    size += KRONROD_WEIGHTS[i] * (Math.abs(left) + Math.abs(right));
    if (i % 2 === 1) coarse += GAUSS_WEIGHTS[(i - 1) / 2] * (left + right);
  }
  // Below the rounding of the sum itself the difference of the two rules says nothing.
  const noise = 4 * Number.EPSILON * size;
  const gap = Math.abs(fine - coarse);
  return { lo, hi, value: fine * half, error: half * (gap <= noise ? 0 : gap) };
}
