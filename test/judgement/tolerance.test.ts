import { describe, expect, test } from "vitest";
import { finish } from "../../shared-core/judgement/steps.ts";
import { Explorer } from "../../shared-core/judgement/tolerance/explorer.ts";
import { shareOfDraws } from "../../shared-core/judgement/tolerance/share.ts";
import { type WorstFound, worstCases } from "../../shared-core/judgement/tolerance/worst-case.ts";
import { atMost, fakeDraws, fakeTrial } from "./fake-trial.ts";

const never = () => false;

function worst(f: (positions: readonly number[]) => number, count: number): WorstFound & { trials: number } {
  const explorer = new Explorer(fakeTrial(f, 0, fakeDraws(count)), fakeDraws(count));
  const [found] = finish(worstCases(explorer, [atMost("worst_case")]), never);
  if (found === "cancelled" || "reason" in found) throw new Error("nothing was found");
  return { ...found, trials: explorer.count };
}

describe("worst case over bands", () => {
  test("of a sum lies in a corner and is proven", () => {
    const found = worst(([a, b, c]) => a - 2 * b + 3 * c, 3);
    expect(found.positions).toEqual([1, -1, 1]);
    expect(found.excess).toBeCloseTo(6, 12);
    expect(found.proven).toBe(true);
  });

  test("of two draws that only harm together is found among the corners", () => {
    const found = worst(([a, b]) => a * b * 5 - a - b, 2);
    expect(found.positions).toEqual([-1, -1]);
    expect(found.excess).toBeCloseTo(7, 12);
  });

  test("inside the band is found and called searched", () => {
    const found = worst(([a, b]) => 1 / ((a - 0.3) ** 2 + 0.01) + b, 2);
    expect(found.positions[0]).toBeCloseTo(0.3, 2);
    expect(found.positions[1]).toBe(1);
    expect(found.excess).toBeCloseTo(101, 0);
    expect(found.proven).toBe(false);
  });

  test("of a resonance between the last samples of a band is found by its slopes", () => {
    const found = worst(([a]) => 1 / Math.hypot(1 - (1 + 0.1 * (a - 0.87)) ** 2, 0.01), 1);
    expect(found.positions[0]).toBeCloseTo(0.87, 2);
    expect(found.excess).toBeGreaterThan(99);
  });

  test("inside for two draws at once is climbed to", () => {
    const found = worst(([a, b]) => -((a - 0.4) ** 2) - (b + 0.2) ** 2 + 0.5 * (a - 0.4) * (b + 0.2), 2);
    expect(found.excess).toBeGreaterThan(-1e-3);
    expect(found.proven).toBe(false);
  });

  test("of twenty draws follows the slopes, visits few points and is called searched", () => {
    const found = worst((all) => all.reduce((sum, s, i) => sum + (i % 2 ? -1 : 1) * (i + 1) * s, 0), 20);
    expect(found.excess).toBeCloseTo(210, 9);
    expect(found.proven).toBe(false);
    expect(found.trials).toBeLessThan(500);
  });

  test("of hundreds of draws ends, with the worst it has seen", () => {
    const found = worst((all) => all.reduce((sum, s) => sum + s, 0), 600);
    expect(found.trials).toBeLessThan(5100);
    expect(found.excess).toBeCloseTo(600, 6);
    expect(found.proven).toBe(false);
  });

  test("says why when a corner cannot be computed", () => {
    const explorer = new Explorer(
      fakeTrial(([a]) => (a > 0.9 ? Number.NaN : a), 0, fakeDraws(1)),
      fakeDraws(1),
    );
    expect(finish(worstCases(explorer, [atMost("worst_case")]), never)).toEqual([
      { reason: "no value here" },
    ]);
  });

  test("ends when cancelled", () => {
    const explorer = new Explorer(
      fakeTrial(([a]) => a, 0, fakeDraws(1)),
      fakeDraws(1),
    );
    expect(finish(worstCases(explorer, [atMost("worst_case")]), () => true)).toEqual(["cancelled"]);
  });
});

describe("share of draws", () => {
  const shareOf = (limit: number, wanted: number, draws: ReturnType<typeof fakeDraws>) => {
    const explorer = new Explorer(
      fakeTrial(([a]) => a, limit, draws),
      draws,
    );
    const found = finish(shareOfDraws(explorer, atMost({ share: wanted }), wanted), never);
    if (found === "cancelled" || "reason" in found) throw new Error("nothing was drawn");
    return found;
  };

  // Closed forms; the bounds are four standard errors of the share, sqrt(p (1 - p) / samples).
  test("of a uniform band", () => {
    const found = shareOf(0.6, 0.99, fakeDraws(1));
    expect(found.samples).toBe(2000);
    expect(Math.abs(found.share - 0.8)).toBeLessThan(4 * Math.sqrt((0.8 * 0.2) / 2000));
  });

  test("of a normal band of three standard deviations", () => {
    const found = shareOf(1 / 3, 0.99, fakeDraws(1, "normal"));
    expect(Math.abs(found.share - 0.8413447)).toBeLessThan(4 * Math.sqrt((0.841 * 0.159) / 2000));
  });

  test("of four drawn apart: their mean varies half as much", () => {
    const found = shareOf(1 / 6, 0.99, fakeDraws(1, "normal", 4));
    expect(Math.abs(found.share - 0.8413447)).toBeLessThan(4 * Math.sqrt((0.841 * 0.159) / 2000));
  });

  test("gives the value that the wanted share does not exceed", () => {
    const found = shareOf(0.6, 0.9, fakeDraws(1));
    expect(Math.abs(found.worst - 0.8)).toBeLessThan(0.08);
  });

  test("is the same every time", () => {
    expect(shareOf(0.6, 0.99, fakeDraws(1))).toEqual(shareOf(0.6, 0.99, fakeDraws(1)));
  });
});
