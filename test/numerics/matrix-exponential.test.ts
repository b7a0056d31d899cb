import { describe, expect, it } from "vitest";
import { matrixExponential } from "../../shared-core/numerics/matrix-exponential.ts";
import { difference, EPS, largest, product, randomMatrix, unwrap } from "./helpers.ts";

describe("matrix exponential", () => {
  it.each([1e-9, 0.01, 0.2, 0.9, 2, 5, 40])("turns by %d radians", (angle) => {
    const rotation = unwrap(matrixExponential(Float64Array.of(0, -angle, angle, 0), 2));
    const exact = [Math.cos(angle), -Math.sin(angle), Math.sin(angle), Math.cos(angle)];
    expect(difference(rotation, exact)).toBeLessThan(Math.max(4, 4 * angle) * EPS);
  });

  it.each([1e-3, 0.1, 0.5, 1.5, 4, 30])("meets the closed form of a damped oscillator, step %d", (t) => {
    const [w, zeta] = [3, 0.2];
    const wd = w * Math.sqrt(1 - zeta * zeta);
    const e = unwrap(matrixExponential(Float64Array.of(0, t, -w * w * t, -2 * zeta * w * t), 2));
    const decay = Math.exp(-zeta * w * t);
    const [c, s] = [Math.cos(wd * t), Math.sin(wd * t) / wd];
    const exact = [c + zeta * w * s, s, -w * w * s, c - zeta * w * s].map((v) => v * decay);
    expect(difference(e, exact)).toBeLessThan(40 * EPS * largest(exact) * Math.max(1, w * w * t));
  });

  it("sums the finite series of a nilpotent matrix", () => {
    const e = unwrap(matrixExponential(Float64Array.of(0, 4, 2, 0, 0, 6, 0, 0, 0), 3));
    expect(difference(e, [1, 4, 14, 0, 1, 6, 0, 0, 1])).toBeLessThan(64 * EPS * 14);
  });

  it.each([5, 20])("multiplies with its inverse e^−A to one, size %i", (n) => {
    const a = randomMatrix(n, n, n);
    const forth = unwrap(matrixExponential(a, n));
    const back = unwrap(
      matrixExponential(
        a.map((v) => -v),
        n,
      ),
    );
    const one = product(forth, back, n, n, n);
    for (let i = 0; i < n; i++) one[i * n + i] -= 1;
    expect(largest(one)).toBeLessThan(n * EPS * largest(forth) * largest(back) * n);
  });

  it("fails as a value: not finite, overflow, absurd size", () => {
    expect(matrixExponential(Float64Array.of(Number.NaN), 1).ok).toBe(false);
    expect(matrixExponential(Float64Array.of(800), 1).ok).toBe(false);
    expect(matrixExponential(Float64Array.of(-1e30), 1).ok).toBe(false);
  });

  it("answers zero and nothing", () => {
    expect([...unwrap(matrixExponential(new Float64Array(4), 2))]).toEqual([1, 0, 0, 1]);
    expect(unwrap(matrixExponential(new Float64Array(0), 0)).length).toBe(0);
  });
});
