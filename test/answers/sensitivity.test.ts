import { describe, expect, it } from "vitest";
import { modalBasis } from "../../shared-core/answers/modes-basis.ts";
import { frequencySensitivity } from "../../shared-core/answers/sensitivity.ts";
import { type SystemSketch, sketch } from "../mechanics/helpers.ts";
import { unwrap } from "../numerics/helpers.ts";

const basisOf = (system: SystemSketch) => unwrap(modalBasis(sketch(system)));
const sensitivityOf = (system: SystemSketch) => frequencySensitivity(basisOf(system));
const frequency = (system: SystemSketch, number: number): number => {
  const { undamped } = basisOf(system);
  return Math.sqrt(undamped.values[undamped.free + undamped.held + number - 1]) / (2 * Math.PI);
};

describe("derivatives of frequencies", () => {
  // Eigenvalue derivative d(w^2) = phi^T dK phi - w^2 phi^T dM phi; relative values to ten digits.
  it("of two masses between walls", () => {
    const masses = { a: 3, b: 2 };
    const k = [4000, 2500, 1500];
    const system: SystemSketch = {
      masses,
      joints: [
        { a: "a", stiffness: k[0] },
        { a: "b", b: "a", stiffness: k[1] },
        { a: "b", stiffness: k[2] },
      ],
    };
    const expected = [
      { k: [0.2890610513, 0.01953383694, 0.1914051117], m: [-0.2296552885, -0.2703447115] },
      { k: [0.1160022398, 0.3285674289, 0.05543033129], m: [-0.2703447115, -0.2296552885] },
    ];
    const s = sensitivityOf(system);
    expect(s.count).toBe(2);
    expected.forEach((row, i) => {
      const f = frequency(system, i + 1);
      const { stiffnesses, inertias } = s.terms(i + 1);
      row.k.forEach((value, e) => {
        expect((stiffnesses[e] * k[e]) / f).toBeCloseTo(value, 9);
      });
      row.m.forEach((value, e) => {
        expect((inertias[e] * [3, 2][e]) / f).toBeCloseTo(value, 9);
      });
      // Springs add to 1/2, masses to -1/2; along all springs together as well.
      expect(s.along(i + 1, { stiffnesses: k }) / f).toBeCloseTo(0.5, 13);
      expect(s.along(i + 1, { inertias: [3, 2] }) / f).toBeCloseTo(-0.5, 13);
    });
  });

  it("with a junction and an inerter, against differences", () => {
    const system = (k2: number, b: number): SystemSketch => ({
      masses: { a: 3, b: 2 },
      junctions: ["j"],
      joints: [
        { a: "a", stiffness: 4000 },
        { a: "a", b: "j", stiffness: k2 },
        { a: "j", b: "b", stiffness: 900, mass: 0.4 },
        { a: "b", stiffness: 100, inertance: b },
      ],
    });
    const s = sensitivityOf(system(700, 0.5));
    const step = 1e-4;
    for (const number of [1, 2]) {
      const stiff =
        (frequency(system(700 + step, 0.5), number) - frequency(system(700 - step, 0.5), number)) / 2;
      const heavy =
        (frequency(system(700, 0.5 + step), number) - frequency(system(700, 0.5 - step), number)) / 2;
      const terms = s.terms(number);
      expect(terms.stiffnesses[1] * step).toBeCloseTo(stiff, 12);
      expect(terms.inertances[3] * step).toBeCloseTo(heavy, 9);
      const [low, high] = [699, 701].map((k) => sketch(system(k, 0.5)));
      expect(s.between(number, low, high, 2)).toBeCloseTo(terms.stiffnesses[1], 12);
    }
  });

  it("parts equal roots along the change", () => {
    // Two equal oscillators tied by nothing: stiffening one moves one of the two frequencies only.
    const system: SystemSketch = {
      masses: { a: 1, b: 1 },
      joints: [
        { a: "a", stiffness: 100 },
        { a: "b", stiffness: 100 },
      ],
    };
    const s = sensitivityOf(system);
    const f = 10 / (2 * Math.PI);
    expect(s.along(1, { stiffnesses: [0, 1] })).toBeCloseTo(0, 14);
    expect(s.along(2, { stiffnesses: [0, 1] })).toBeCloseTo(f / 200, 14);
    expect(s.along(1, { stiffnesses: [-1, 1] })).toBeCloseTo(-f / 200, 14);
  });
});
