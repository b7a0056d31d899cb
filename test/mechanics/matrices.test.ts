import { describe, expect, it } from "vitest";
import { coordinateForm, supportForm } from "../../shared-core/mechanics/forms.ts";
import { systemMatrices } from "../../shared-core/mechanics/matrices.ts";
import { sparseTimesVector, sparseToDense as toDense } from "../../shared-core/numerics/sparse.ts";
import { sketch } from "./helpers.ts";

describe("matrices of an assembly", () => {
  it("sums springs, dampers, proportional damping and supports", () => {
    const m = systemMatrices(
      sketch({
        masses: { a: 2, b: 3 },
        supports: ["floor"],
        joints: [
          { a: "a", b: "floor", stiffness: 100, lossFactor: 0.1, damping: 7 },
          { a: "b", b: "a", stiffness: 40, count: 2 },
        ],
        massDamping: 0.5,
        stiffnessDamping: 0.01,
      }),
    );
    expect([...toDense(m.mass)]).toEqual([2, 0, 0, 3]);
    expect([...toDense(m.stiffness)]).toEqual([180, -80, -80, 80]);
    expect([...toDense(m.damping)]).toEqual([1 + 7 + 1 + 0.8, -0.8, -0.8, 1.5 + 0.8]);
    expect([...toDense(m.hysteretic)]).toEqual([10, 0, 0, 0]);
    expect([...toDense(m.stiffnessSupport)]).toEqual([-100, 0]);
    expect([...toDense(m.dampingSupport)]).toEqual([-8, 0]);
    expect([...toDense(m.hystereticSupport)]).toEqual([-10, 0]);
    expect([...sparseTimesVector(m.stiffness, Float64Array.of(1, 1))]).toEqual([100, 0]);
  });

  it("shares a spring's own mass as m/6 [2 1; 1 2] and inertance as b [1 -1; -1 1]", () => {
    const m = systemMatrices(
      sketch({
        masses: { a: 1, b: 1 },
        joints: [{ a: "a", b: "b", stiffness: 1, mass: 6, inertance: 4 }],
      }),
    );
    expect([...toDense(m.mass)].map((x) => Math.round(x * 1e12) / 1e12)).toEqual([7, -3, -3, 7]);
  });

  it("puts a bound coordinate's terms through its bind", () => {
    const m = systemMatrices(
      sketch({
        inertias: { wheel: 4, pinion: 0.3 },
        binds: { pinion: { wheel: -3.2 } },
        joints: [{ a: "pinion", stiffness: 10 }],
      }),
    );
    expect(toDense(m.mass)[0]).toBeCloseTo(4 + 0.3 * 3.2 ** 2, 12);
    expect(toDense(m.stiffness)[0]).toBeCloseTo(10 * 3.2 ** 2, 12);
  });

  it("adds extra terms with their own rows and columns", () => {
    const assembly = sketch({ masses: { a: 1, b: 1 }, supports: ["floor"], joints: [] });
    const m = systemMatrices({
      ...assembly,
      extras: [
        {
          owner: "loop",
          matrix: "stiffness",
          row: coordinateForm(1),
          column: coordinateForm(0),
          value: -5,
        },
        { owner: "loop", matrix: "damping", row: coordinateForm(1), column: supportForm(0), value: 2 },
      ],
    });
    expect([...toDense(m.stiffness)]).toEqual([0, 0, -5, 0]);
    expect([...toDense(m.dampingSupport)]).toEqual([0, 2]);
  });

  it("gives gravity its masses, half a spring's own at each end", () => {
    const { coordinates } = sketch({
      masses: { a: 5 },
      junctions: ["j"],
      joints: [{ a: "a", b: "j", stiffness: 1, mass: 2 }],
    });
    expect(coordinates.map((c) => c.gravityMass)).toEqual([6, 1]);
  });
});
