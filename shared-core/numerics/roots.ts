/**
 * A root of a real function in an interval with a change of sign.
 *
 * Method: Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4 (`zero`): bisection, secant and
 * inverse quadratic steps; never slower than about three bisections for two.
 */
import { fail, type Outcome, succeed } from "./outcome.ts";

export type Root = {
  x: number;
  /** f(x) */
  residual: number;
  evaluations: number;
};

export type RootOptions = {
  /** Absolute width, in the unit of x, below which the bracket counts as closed; default 0: rounding only. */
  tolerance?: number;
  /** Cap on evaluations; default 200. */
  evaluations?: number;
};

/** Fails without a change of sign over [lo, hi], on a value that is not finite, and at the cap (`upTo` set). */
export function findRoot(
  f: (x: number) => number,
  lo: number,
  hi: number,
  options: RootOptions = {},
): Outcome<Root> {
  const tolerance = options.tolerance ?? 0;
  const cap = options.evaluations ?? 200;
  let a = lo;
  let b = hi;
  let fa = f(a);
  let fb = f(b);
  let used = 2;
  if (!Number.isFinite(fa) || !Number.isFinite(fb))
    return fail("the function is not finite at an end of the interval");
  if (Math.sign(fa) === Math.sign(fb) && fa !== 0) {
    return fail("the function has the same sign at both ends of the interval");
  }
  let c = a;
  let fc = fa;
  let step = b - a;
  let before = step;
  for (;;) {
    // b is the best point so far, c lies on the other side of the root.
    if (Math.sign(fb) === Math.sign(fc)) {
      c = a;
      fc = fa;
      before = step = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b;
      b = c;
      c = a;
      fa = fb;
      fb = fc;
      fc = fa;
    }
    const close = 2 * Number.EPSILON * Math.abs(b) + 0.5 * tolerance;
    const half = 0.5 * (c - b);
    if (Math.abs(half) <= close || fb === 0) return succeed({ x: b, residual: fb, evaluations: used });
    if (used >= cap)
      return fail("the root was not closed in within the cap", { x: b, residual: fb, evaluations: used });
    const trial =
      Math.abs(before) >= close && Math.abs(fa) > Math.abs(fb) ? interpolate(a, b, c, fa, fb, fc) : half;
    const safe =
      trial * half > 0 &&
      Math.abs(trial) < Math.min(1.5 * Math.abs(half) - 0.5 * close, Math.abs(0.5 * before));
    before = safe ? step : half;
    step = safe ? trial : half;
    a = b;
    fa = fb;
    b += Math.abs(step) > close ? step : half > 0 ? close : -close;
    fb = f(b);
    used++;
    if (!Number.isFinite(fb))
      return fail(`the function is not finite at ${b}`, { x: a, residual: fa, evaluations: used });
  }
}

/** Step from b by the secant through a and b, or the inverse parabola through all three. */
function interpolate(a: number, b: number, c: number, fa: number, fb: number, fc: number): number {
  const s = fb / fa;
  if (a === c) return ((b - c) * s) / (1 - s);
  const q = fa / fc;
  const r = fb / fc;
  return (s * ((c - b) * q * (q - r) - (b - a) * (r - 1))) / -((q - 1) * (r - 1) * (s - 1));
}
