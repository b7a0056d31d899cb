import { describe, expect, it } from "vitest";
import { bracketMinimum, minimise } from "../../shared-core/numerics/minimise.ts";
import { integrate } from "../../shared-core/numerics/quadrature.ts";
import { findRoot } from "../../shared-core/numerics/roots.ts";
import { EPS, unwrap } from "./helpers.ts";

describe("findRoot", () => {
  it.each([
    ["cos x = x", (x: number) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ["a cubic", (x: number) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ["a clamped-free beam", (x: number) => Math.cos(x) * Math.cosh(x) + 1, 1, 3, 1.8751040687119611],
    ["reversed ends", (x: number) => Math.exp(x) - 2, 5, -5, Math.LN2],
    ["a root at an end", (x: number) => x - 1, 1, 4, 1],
    ["the other end", (x: number) => x - 4, 1, 4, 4],
    ["a flat triple root", (x: number) => (x - 1) ** 3, -1, 2.5, 1],
    ["a step", (x: number) => (x < 0.3 ? -1 : 1), 0, 1, 0.3],
  ])("finds %s", (name, f, lo, hi, root) => {
    const found = unwrap(findRoot(f, lo, hi));
    // A triple root is only defined to the cube root of rounding.
    expect(Math.abs(found.x - root)).toBeLessThan(name.includes("triple") ? 1e-5 : 8 * EPS * Math.abs(root));
    expect(found.evaluations).toBeLessThan(name.includes("triple") ? 200 : 70);
  });

  it("needs few evaluations on a smooth function", () => {
    expect(unwrap(findRoot((x) => Math.cos(x) - x, 0, 1)).evaluations).toBeLessThan(12);
  });

  it("fails as a value: same signs, not finite, cap", () => {
    expect(findRoot((x) => x * x + 1, -1, 1).ok).toBe(false);
    expect(findRoot(() => Number.NaN, -1, 1).ok).toBe(false);
    expect(findRoot((x) => (Math.abs(x) < 0.9 ? Number.NaN : x), -1, 1).ok).toBe(false);
    const capped = findRoot((x) => x ** 9 - 1e-3, -1, 1, { evaluations: 5 });
    expect(capped).toMatchObject({ ok: false, upTo: { evaluations: 5 } });
  });
});

describe("minimise", () => {
  it.each([
    ["a parabola", (x: number) => (x - 2) ** 2, -3, 9, 2],
    ["cos", Math.cos, 2, 5, Math.PI],
    ["x ln x", (x: number) => x * Math.log(x), 1e-3, 2, 1 / Math.E],
    ["a kink", (x: number) => Math.abs(x - 0.25), -1, 1, 0.25],
    ["the lower end", (x: number) => x, 3, 7, 3],
    ["the upper end", (x: number) => -x, 3, 7, 7],
  ])("finds the minimum of %s", (_, f, lo, hi, place) => {
    const found = unwrap(minimise(f, lo, hi));
    expect(Math.abs(found.x - place)).toBeLessThan(5e-8 * (hi - lo));
    expect(found.evaluations).toBeLessThan(100);
  });

  it("fails as a value: not finite, reversed, cap", () => {
    expect(minimise(() => Number.NaN, 0, 1).ok).toBe(false);
    expect(minimise((x) => x, 1, 0).ok).toBe(false);
    expect(minimise((x) => x, 0, Number.POSITIVE_INFINITY).ok).toBe(false);
    expect(minimise(Math.cos, 2, 5, { evaluations: 4 })).toMatchObject({
      ok: false,
      upTo: { evaluations: 4 },
    });
  });

  it("brackets a minimum from either side and stops at a limit", () => {
    for (const start of [-40, 40]) {
      const { lo, x, hi } = unwrap(bracketMinimum((t) => (t - 3) ** 2, start, 0.5, { lo: -100, hi: 100 }));
      expect(lo < 3 && 3 < hi && lo < x && x < hi).toBe(true);
    }
    expect(bracketMinimum((t) => t, 0, 1, { lo: -5, hi: 5 })).toMatchObject({ ok: false, upTo: { x: -5 } });
    expect(bracketMinimum(() => Number.NaN, 0, 1, { lo: -5, hi: 5 }).ok).toBe(false);
    expect(bracketMinimum((t) => -t, 0, 1e-300, { lo: -1, hi: 1 }, 50).ok).toBe(false);
  });
});

describe("integrate", () => {
  it("is exact for polynomials up to degree 22 without splitting", () => {
    for (let degree = 0; degree <= 22; degree++) {
      const { value, evaluations } = unwrap(integrate((x) => x ** degree, 0, 1));
      expect(Math.abs(value * (degree + 1) - 1)).toBeLessThan(64 * EPS);
      if (degree <= 13) expect(evaluations).toBe(15);
    }
  });

  it.each([
    ["sin over half a turn", Math.sin, 0, Math.PI, 2],
    ["reversed", Math.sin, Math.PI, 0, -2],
    ["a root at the end", Math.sqrt, 0, 1, 2 / 3],
    // ∫ dx / ((1 − x²)² + (2ζx)²) over (0, ∞) = π / 4ζ; the tail beyond 1e4 is 1/(3·10¹²).
    [
      "a resonance, ζ = 0.005",
      (x: number) => 1 / ((1 - x * x) ** 2 + (0.01 * x) ** 2),
      0,
      1e4,
      Math.PI / 0.02,
    ],
  ])("integrates %s", (_, f, lo, hi, truth) => {
    const { value, error } = unwrap(integrate(f, lo, hi, {}, [1]));
    expect(Math.abs(value - truth)).toBeLessThan(1e-9 * Math.abs(truth));
    expect(error).toBeLessThanOrEqual(1e-10 * Math.abs(value));
  });

  it("fails as a value: not finite, cap", () => {
    expect(integrate((x) => 1 / x, -1, 1).ok).toBe(false);
    expect(integrate(Math.sin, 0, Number.POSITIVE_INFINITY).ok).toBe(false);
    const capped = integrate((x) => Math.abs(Math.sin(1 / x)), 1e-9, 1, { intervals: 20 });
    expect(capped).toMatchObject({ ok: false, upTo: { evaluations: 15 * 39 } });
  });

  it("answers an empty interval", () => {
    expect(unwrap(integrate(Math.exp, 2, 2)).value).toBe(0);
  });
});
