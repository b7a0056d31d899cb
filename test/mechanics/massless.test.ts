import { describe, expect, it } from "vitest";
import { coordinateForm, formValue } from "../../shared-core/mechanics/forms.ts";
import {
  condense,
  floatingNames,
  recoverValues,
  reduceSystem,
} from "../../shared-core/mechanics/massless.ts";
import { sumTerms, systemMatrices } from "../../shared-core/mechanics/matrices.ts";
import type { SquareTerm } from "../../shared-core/mechanics/star-mesh.ts";
import { factorLu, solveLu } from "../../shared-core/numerics/dense.ts";
import { sparseToDense } from "../../shared-core/numerics/sparse.ts";
import { difference, EPS, largest, seeded, unwrap } from "../numerics/helpers.ts";
import { sketch } from "./helpers.ts";

const matrix = (terms: readonly SquareTerm[], n: number) =>
  sparseToDense(
    sumTerms(
      terms.map(({ form, value }) => ({ row: form, column: form, value })),
      n,
    ),
  );

describe("massless places", () => {
  it("leaves a system without them as it is", () => {
    const assembly = sketch({
      masses: { a: 1, b: 2 },
      joints: [{ a: "a", b: "b", stiffness: 3, damping: 1 }],
    });
    const reduced = unwrap(reduceSystem(assembly));
    expect([reduced.inertial, reduced.relaxing]).toEqual([2, 0]);
    expect(reduced.stiffness.map((t) => t.value)).toEqual([3]);
  });

  it("puts springs in series to the last digits, a billion times apart", () => {
    const stiffnesses = [1e9, 1, 3e8, 2e-1, 7e9];
    const joints = stiffnesses.map((stiffness, i) => ({
      a: i === 0 ? "m" : `j${i}`,
      b: i === 4 ? "ground" : `j${i + 1}`,
      stiffness,
    }));
    const assembly = sketch({ masses: { m: 1 }, junctions: ["j1", "j2", "j3", "j4"], joints });
    const reduced = unwrap(reduceSystem(assembly));
    expect(reduced.inertial).toBe(1);
    const k = matrix(reduced.stiffness, 1)[0];
    // Springs in series: 1/k = sum 1/k_i.
    const expected = 1 / stiffnesses.reduce((sum, s) => sum + 1 / s, 0);
    expect(Math.abs(k / expected - 1)).toBeLessThan(16 * EPS);
    // The force is the same in all of them; a stiff one's small travel is a difference of places near one.
    const q = recoverValues(reduced, [1]);
    for (const { form, stiffness } of assembly.elements) {
      expect(Math.abs(stiffness * formValue(form, q) - expected)).toBeLessThan(2 * EPS * stiffness + 1e-14);
    }
  });

  it("agrees with the Schur complement on a seeded net of junctions", () => {
    const next = seeded(5);
    const names = Array.from({ length: 9 }, (_, i) => `p${i}`);
    const joints = names.flatMap((a, i) => [
      { a, stiffness: 2 + next() },
      ...names.slice(i + 1).map((b) => ({ a, b, stiffness: 2 + next() })),
    ]);
    const assembly = sketch({ masses: { p0: 1, p1: 1, p2: 1 }, junctions: names.slice(3), joints });
    const reduced = unwrap(reduceSystem(assembly));
    expect([reduced.inertial, reduced.relaxing]).toEqual([3, 0]);
    const k = sparseToDense(systemMatrices(assembly).stiffness);
    const inner = new Float64Array(36).map((_, p) => k[(3 + Math.floor(p / 6)) * 9 + 3 + (p % 6)]);
    const side = new Float64Array(18).map((_, p) => k[(3 + Math.floor(p / 3)) * 9 + (p % 3)]);
    const x = solveLu(unwrap(factorLu(inner, 6)), side, 3);
    const schur = new Float64Array(9).map((_, p) => {
      let sum = k[Math.floor(p / 3) * 9 + (p % 3)];
      for (let z = 0; z < 6; z++) sum -= side[z * 3 + Math.floor(p / 3)] * x[z * 3 + (p % 3)];
      return sum;
    });
    expect(difference(matrix(reduced.stiffness, 3), schur)).toBeLessThan(64 * EPS * largest(k));
    // A load on a junction: displacement of the full system with the masses held.
    const load = coordinateForm(6);
    const local = reduced.compliance(load);
    const column = solveLu(unwrap(factorLu(inner, 6)), Float64Array.of(0, 0, 0, 1, 0, 0));
    expect(difference(local.subarray(3), column)).toBeLessThan(64 * EPS);
    expect(largest(local.subarray(0, 3))).toBe(0);
    const moved = reduced.load(load);
    for (let i = 0; i < 3; i++) expect(moved.factors[i]).toBeCloseTo(-x[3 * 3 + i], 13);
  });

  it("keeps the joint of a spring and a damper as a relaxing coordinate, with and without a spring beside", () => {
    const zener = sketch({
      masses: { m: 10 },
      junctions: ["j"],
      joints: [
        { a: "m", stiffness: 40000 },
        { a: "m", b: "j", stiffness: 120000 },
        { a: "j", damping: 300 },
      ],
    });
    const reduced = unwrap(reduceSystem(zener));
    expect([reduced.inertial, reduced.relaxing]).toEqual([1, 1]);
    const condensed = unwrap(condense(reduced));
    expect([...matrix(condensed.stiffness, 1)]).toEqual([40000]);
    expect([...recoverValues(condensed, [1])]).toEqual([1, 1]);
  });

  it("joins dampers in series through a place that feels no spring", () => {
    const reduced = unwrap(
      reduceSystem(
        sketch({
          masses: { m: 1 },
          junctions: ["j"],
          joints: [
            { a: "m", b: "j", damping: 6 },
            { a: "j", damping: 3 },
            { a: "m", stiffness: 9 },
          ],
        }),
      ),
    );
    expect([reduced.inertial, reduced.relaxing]).toEqual([1, 0]);
    expect(matrix(reduced.damping, 1)[0]).toBeCloseTo(2, 14);
  });

  it("finds the massless motion of two junctions tied by an inerter", () => {
    const reduced = unwrap(
      reduceSystem(
        sketch({
          masses: { m: 1 },
          junctions: ["i", "j"],
          joints: [
            { a: "m", b: "i", stiffness: 4 },
            { a: "i", b: "j", inertance: 2 },
            { a: "j", stiffness: 4 },
          ],
        }),
      ),
    );
    expect([reduced.inertial, reduced.relaxing]).toEqual([2, 0]);
  });

  it("names what floats", () => {
    const floating = sketch({
      masses: { m: 1 },
      junctions: ["i", "j", "k"],
      joints: [
        { a: "m", stiffness: 1 },
        { a: "i", b: "j", stiffness: 1 },
        { a: "k", b: "m", damping: 1 },
      ],
    });
    expect(floatingNames(floating)).toEqual(["i", "j"]);
    const outcome = reduceSystem(floating);
    expect(outcome.ok ? "" : outcome.reason).toBe("nothing holds i, j");
  });

  it("says so where springs of both signs cancel on a massless place", () => {
    const outcome = reduceSystem(
      sketch({
        masses: { m: 1 },
        junctions: ["j"],
        joints: [
          { a: "m", b: "j", stiffness: 5 },
          { a: "j", stiffness: -5 },
        ],
      }),
    );
    expect(outcome.ok ? "" : outcome.reason).toContain("joined to j");
  });
});
