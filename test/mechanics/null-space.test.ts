import { describe, expect, it } from "vitest";
import type { LinearForm } from "../../shared-core/mechanics/assembly.ts";
import { combineForms, coordinateForm, formValue } from "../../shared-core/mechanics/forms.ts";
import { nullSpace } from "../../shared-core/mechanics/null-space.ts";
import { seeded } from "../numerics/helpers.ts";

const form = (entries: Record<number, number>): LinearForm =>
  combineForms(
    Object.keys(entries).map((i) => coordinateForm(Number(i))),
    Object.values(entries),
  );
const range = (n: number) => Array.from({ length: n }, (_, i) => i);

describe("null space of forms", () => {
  it("finds one motion a free chain and none where a wall holds it", () => {
    const chain = range(4).map((i) => form({ [i]: 1, [i + 1]: -1 }));
    const { free, vectors } = nullSpace(chain, range(5), 5);
    expect(free).toHaveLength(1);
    expect(vectors[0].by).toEqual([1, 1, 1, 1, 1]);
    expect(nullSpace([...chain, form({ 2: 1 })], range(5), 5).free).toEqual([]);
  });

  it("follows ratios and finds a loop of gears that does not close", () => {
    const gears = [form({ 0: 1, 1: -3 }), form({ 1: 1, 2: -0.1 }), form({ 0: 1, 2: -0.3 })];
    const { vectors } = nullSpace(gears, range(3), 3);
    expect(vectors).toHaveLength(1);
    for (const gear of gears) expect(formValue(gear, dense(vectors[0], 3))).toBeCloseTo(0, 14);
    expect(nullSpace([...gears, form({ 0: 1, 2: -0.31 })], range(3), 3).free).toEqual([]);
  });

  it("keeps coordinates outside the subset still", () => {
    expect(nullSpace([form({ 0: 1, 1: -1 })], [1], 2).free).toEqual([]);
    expect(nullSpace([form({ 0: 1 })], [1], 2).free).toEqual([1]);
  });

  it("agrees with the known rank of seeded wide forms over mixed scales", () => {
    const next = seeded(11);
    for (const [n, rank] of [
      [6, 3],
      [12, 11],
      [20, 20],
      [9, 0],
    ]) {
      const scale = range(n).map(() => 10 ** (3 * next()));
      const generators = range(rank).map(() => range(n).map((j) => next() * scale[j]));
      // Twice as many forms as the rank, mixed from the same generators.
      const forms = range(2 * rank).map(() => {
        const mix = range(rank).map(next);
        return form(
          Object.fromEntries(range(n).map((j) => [j, sum(mix.map((c, k) => c * generators[k][j]))])),
        );
      });
      const { vectors } = nullSpace(forms, range(n), n);
      expect(vectors).toHaveLength(n - rank);
      for (const vector of vectors) {
        for (const f of forms) {
          const x = dense(vector, n);
          const size = sum(f.coordinates.map((i, k) => Math.abs(f.factors[k] * x[i])));
          expect(Math.abs(formValue(f, x))).toBeLessThan(1e-10 * (size + 1e-300));
        }
      }
    }
  });
});

const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);

function dense(vector: { at: readonly number[]; by: readonly number[] }, n: number): Float64Array {
  const out = new Float64Array(n);
  vector.at.forEach((i, k) => {
    out[i] = vector.by[k];
  });
  return out;
}
