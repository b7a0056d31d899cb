import fc from "fast-check";
import { expect, it } from "vitest";
import { between, panned, WHOLE, zoomed } from "../../client/sheet/plot-zoom.ts";
import { firstFrom, nearestTo, Pyramid } from "../../client/sheet/pyramid.ts";

const samples = fc.array(fc.oneof(fc.double({ noDefaultInfinity: true }), fc.constant(Number.NaN)), {
  maxLength: 3000,
  size: "max",
});

it("a pyramid finds the extremes of every stretch", () => {
  fc.assert(
    fc.property(samples, fc.nat(), fc.nat(), (values, a, b) => {
      const [from, to] = [a % (values.length + 1), b % (values.length + 1)].sort((x, y) => x - y);
      const out = new Float64Array(2);
      new Pyramid(values).extremes(from, to, out);
      const wanted = values.slice(from, to).filter((value) => !Number.isNaN(value));
      // Zeros of both signs are one value here.
      expect([...out].map((value) => value + 0)).toEqual([
        wanted.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY) + 0,
        wanted.reduce((most, value) => Math.max(most, value), Number.NEGATIVE_INFINITY) + 0,
      ]);
    }),
    { seed: 4, numRuns: 150 },
  );
});

it("a place is found among ascending values", () => {
  fc.assert(
    fc.property(
      fc.array(fc.double({ noNaN: true, noDefaultInfinity: true }), { minLength: 1 }),
      fc.double({ noNaN: true, min: -1e6, max: 1e6 }),
      (list, x) => {
        const values = [...list].sort((a, b) => a - b);
        expect(firstFrom(values, x)).toBe(values.filter((value) => value < x).length);
        const distance = Math.abs(values[nearestTo(values, x)] - x);
        for (const value of values) expect(distance).toBeLessThanOrEqual(Math.abs(value - x));
      },
    ),
    { seed: 4, numRuns: 150 },
  );
});

const share = fc.double({ min: 0, max: 1, noNaN: true });

it("no zoom leaves the axis", () => {
  fc.assert(
    fc.property(
      share,
      fc.double({ min: 0.01, max: 100, noNaN: true }),
      fc.double({ min: -3, max: 3, noNaN: true }),
      (about, factor, by) => {
        for (const [from, to] of [zoomed(WHOLE, about, factor), panned(zoomed(WHOLE, about, 0.3), by)]) {
          expect(0 <= from && from < to && to <= 1).toBe(true);
        }
      },
    ),
    { seed: 4 },
  );
});

it("a zoom keeps what is under the pointer, and a frame becomes the whole", () => {
  const [from, to] = zoomed([0.2, 0.6], 0.25, 0.5);
  expect(from + 0.25 * (to - from)).toBeCloseTo(0.3, 12);
  expect(to - from).toBeCloseTo(0.2, 12);
  expect(between([0.2, 0.6], 0.75, 0.25)).toEqual([expect.closeTo(0.3, 12), expect.closeTo(0.5, 12)]);
  expect(between(WHOLE, 0.5, 0.5)).toBeUndefined();
});
