/**
 * Minimum of a real function of one variable, and how to bracket one.
 *
 * Method: Brent, Algorithms for Minimization without Derivatives, 1973, ch. 5 (`localmin`): golden section with
 * parabolic steps. A minimum is located to about √ε of its scale, no better: f is flat there.
 */
import { fail, type Outcome, succeed } from "./outcome.ts";

export type Minimum = { x: number; value: number; evaluations: number };

export type MinimiseOptions = {
  /** Absolute tolerance in the unit of x; default 1e−8 of the interval. */
  tolerance?: number;
  /** Cap on evaluations; default 200. */
  evaluations?: number;
};

/** (3 − √5) / 2, the smaller part of the golden section. */
const GOLDEN = (3 - Math.sqrt(5)) / 2;

/**
 * A local minimum within [lo, hi]; an end counts where f falls towards it. Fails on a value that is not finite
 * and at the cap, with the best point so far in `upTo`.
 */
export function minimise(
  f: (x: number) => number,
  lo: number,
  hi: number,
  options: MinimiseOptions = {},
): Outcome<Minimum> {
  if (!(lo <= hi) || !Number.isFinite(lo) || !Number.isFinite(hi))
    return fail("the interval is not finite or is reversed");
  const tolerance = options.tolerance ?? 1e-8 * (hi - lo);
  const cap = options.evaluations ?? 200;
  let [a, b] = [lo, hi];
  let x = a + GOLDEN * (b - a);
  let [w, v] = [x, x];
  let fx = f(x);
  let [fw, fv] = [fx, fx];
  let used = 1;
  let step = 0;
  let before = 0;
  for (;;) {
    if (!Number.isFinite(fx)) return fail(`the function is not finite at ${x}`);
    const middle = 0.5 * (a + b);
    const close = 4 * Number.EPSILON * Math.abs(x) + tolerance;
    if (Math.abs(x - middle) <= 2 * close - 0.5 * (b - a))
      return succeed({ x, value: fx, evaluations: used });
    if (used >= cap)
      return fail("the minimum was not closed in within the cap", { x, value: fx, evaluations: used });
    const parabola = Math.abs(before) > close ? parabolicStep(x, w, v, fx, fw, fv) : Number.NaN;
    const inside = a < x + parabola && x + parabola < b && Math.abs(parabola) < Math.abs(0.5 * before);
    before = inside ? step : x < middle ? b - x : a - x;
    step = inside ? parabola : GOLDEN * before;
    if (inside && (x + step - a < 2 * close || b - x - step < 2 * close)) step = x < middle ? close : -close;
    const u = x + (Math.abs(step) >= close ? step : step > 0 ? close : -close);
    const fu = f(u);
    used++;
    if (!Number.isFinite(fu))
      return fail(`the function is not finite at ${u}`, { x, value: fx, evaluations: used });
    if (fu <= fx) {
      if (u < x) b = x;
      else a = x;
      [v, fv, w, fw, x, fx] = [w, fw, x, fx, u, fu];
    } else {
      if (u < x) a = u;
      else b = u;
      if (fu <= fw || w === x) [v, fv, w, fw] = [w, fw, u, fu];
      else if (fu <= fv || v === x || v === w) [v, fv] = [u, fu];
    }
  }
}

/** Step from x to the vertex of the parabola through x, w and v. */
function parabolicStep(x: number, w: number, v: number, fx: number, fw: number, fv: number): number {
  const r = (x - w) * (fx - fv);
  const q = (x - v) * (fx - fw);
  return ((x - v) * q - (x - w) * r) / (-2 * (q - r));
}

/** Three points a < x < b (or reversed) with f(x) no larger than at either end. */
export type Bracket = { lo: number; x: number; hi: number; evaluations: number };

/**
 * Walks downhill from `start` by steps growing with the golden ratio until f rises again. `limits` are not left:
 * f falling all the way to a limit is a failure with that end in `upTo.x`.
 */
export function bracketMinimum(
  f: (x: number) => number,
  start: number,
  step: number,
  limits: { lo: number; hi: number },
  cap = 100,
): Outcome<Bracket> {
  const clamp = (x: number) => Math.min(limits.hi, Math.max(limits.lo, x));
  let a = clamp(start);
  let x = clamp(start + step);
  let fa = f(a);
  let fx = f(x);
  let used = 2;
  if (fx > fa) [a, x, fa, fx] = [x, a, fx, fa];
  let stride = x - a;
  while (used < cap) {
    if (!Number.isFinite(fx) || !Number.isFinite(fa)) return fail(`the function is not finite near ${x}`);
    stride *= 1 / (1 - GOLDEN);
    const b = clamp(x + stride);
    if (b === x) return fail("the function falls to the limit", { lo: a, x, hi: b, evaluations: used });
    const fb = f(b);
    used++;
    if (fb >= fx) return succeed({ lo: Math.min(a, b), x, hi: Math.max(a, b), evaluations: used });
    [a, x, fa, fx] = [x, b, fx, fb];
  }
  return fail("no rise was met within the cap", { lo: a, x, hi: x, evaluations: used });
}
