import { describe, expect, it } from "vitest";
import { normal, normalQuantile, philox, uniform } from "../../shared-core/numerics/random.ts";

const hex = (words: Uint32Array) => [...words].map((w) => w.toString(16).padStart(8, "0")).join(" ");

describe("counter-based random numbers", () => {
  // Known-answer vectors published with the generator (Salmon et al., SC11; file kat_vectors).
  it.each([
    [[0, 0, 0, 0, 0, 0], "6627e8d5 e169c58d bc57ac4c 9b00dbd8"],
    [Array(6).fill(0xffffffff), "408f276d 41c83b0e a20bc7c6 6d5451fd"],
    [
      [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344, 0xa4093822, 0x299f31d0],
      "d16cfe09 94fdcceb 5001e420 24126ea1",
    ],
  ])("gives the published block for %j", (input, expected) => {
    const out = new Uint32Array(4);
    const [a, b, c, d, e, f] = input;
    philox(a, b, c, d, e, f, out);
    expect(hex(out)).toBe(expected);
  });

  it("depends on seed, draw and sample alone, high words included", () => {
    const base = uniform(7, 3, 11);
    expect(uniform(7, 3, 11)).toBe(base);
    const others = [uniform(8, 3, 11), uniform(7, 4, 11), uniform(7, 3, 12), uniform(7, 3, 11 + 2 ** 32)];
    others.push(uniform(7 + 2 ** 32, 3, 11), uniform(-7, 3, 11), uniform(7, 11, 3));
    expect(new Set([base, ...others]).size).toBe(8);
  });

  it("has the moments of its distributions within five standard errors", () => {
    const count = 20_000;
    let [mean, square, sum, squares, cross] = [0, 0, 0, 0, 0];
    for (let s = 0; s < count; s++) {
      const u = uniform(1, 0, s);
      const z = normal(1, 1, s);
      expect(u > 0 && u < 1).toBe(true);
      mean += u / count;
      square += u ** 2 / count;
      sum += z / count;
      squares += z ** 2 / count;
      cross += (z * normal(1, 2, s)) / count;
    }
    const error = 5 / Math.sqrt(count);
    expect(Math.abs(mean - 1 / 2)).toBeLessThan(error * Math.sqrt(1 / 12));
    expect(Math.abs(square - 1 / 3)).toBeLessThan(error * Math.sqrt(1 / 5 - 1 / 9));
    expect(Math.abs(sum)).toBeLessThan(error);
    expect(Math.abs(squares - 1)).toBeLessThan(error * Math.SQRT2);
    expect(Math.abs(cross)).toBeLessThan(error);
  });

  // Source: scipy.special.ndtri (SciPy 1.17).
  it.each([
    [1e-300, -37.0470962993612],
    [1e-10, -6.361340902404056],
    [1e-3, -3.090232306167813],
    [0.05, -1.6448536269514729],
    [0.3, -0.5244005127080409],
    [0.5, 0],
    [0.925, 1.4395314709384563],
    [0.9999, 3.719016485455709],
  ])("inverts the normal distribution at %d", (p, z) => {
    expect(Math.abs(normalQuantile(p) - z)).toBeLessThanOrEqual(1e-14 * Math.max(1, Math.abs(z)));
  });

  it("says where the quantile ends", () => {
    expect([0, 1].map(normalQuantile)).toEqual([Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]);
    expect([-0.1, 1.1, Number.NaN].map(normalQuantile).every(Number.isNaN)).toBe(true);
  });
});
