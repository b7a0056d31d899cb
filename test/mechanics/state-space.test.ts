import { describe, expect, it } from "vitest";
import type { Assembly } from "../../shared-core/mechanics/assembly.ts";
import { combineForms, coordinateForm } from "../../shared-core/mechanics/forms.ts";
import { systemMatrices } from "../../shared-core/mechanics/matrices.ts";
import { type StateInput, stateSpace } from "../../shared-core/mechanics/state-space.ts";
import { complexLuWorkspace, factorComplexLu, solveComplexLu } from "../../shared-core/numerics/dense.ts";
import { type SparseMatrix, sparseToDense } from "../../shared-core/numerics/sparse.ts";
import { EPS, unwrap } from "../numerics/helpers.ts";
import { type SystemSketch, sketch } from "./helpers.ts";

type Complex = { re: Float64Array; im: Float64Array };

function solveComplex(re: Float64Array, im: Float64Array, n: number, bRe: Float64Array, bIm: Float64Array) {
  const columns = bRe.length / n;
  const x: Complex = { re: new Float64Array(n * columns), im: new Float64Array(n * columns) };
  const lu = unwrap(factorComplexLu(re, im, n, complexLuWorkspace(n)));
  solveComplexLu(lu, bRe, bIm, columns, x.re, x.im);
  return x;
}

/** K + i w C - w^2 M applied to the inputs' own columns, straight from the full matrices. */
function directResponse(assembly: Assembly, inputs: readonly StateInput[], w: number): Complex {
  const n = assembly.free;
  const m = systemMatrices(assembly);
  const dense = (a: SparseMatrix) => sparseToDense(a);
  const [k, c, mass] = [m.stiffness, m.damping, m.mass].map(dense);
  const [ks, cs, ms] = [m.stiffnessSupport, m.dampingSupport, m.massSupport].map(dense);
  const s = assembly.supports.length;
  const bRe = new Float64Array(n * inputs.length);
  const bIm = new Float64Array(n * inputs.length);
  inputs.forEach((input, j) => {
    for (let i = 0; i < n; i++) {
      const at = i * inputs.length + j;
      if (input.kind === "support") {
        bRe[at] = -(ks[i * s + input.support] - w * w * ms[i * s + input.support]);
        bIm[at] = -w * cs[i * s + input.support];
      } else {
        const place = input.form.coordinates.indexOf(i);
        if (place >= 0) bRe[at] = input.form.factors[place];
      }
    }
  });
  const re = k.map((value, p) => value - w * w * mass[p]);
  return solveComplex(
    re,
    c.map((value) => w * value),
    n,
    bRe,
    bIm,
  );
}

function stateResponse(assembly: Assembly, inputs: readonly StateInput[], w: number): Complex {
  const s = unwrap(stateSpace(assembly, inputs));
  const { size: n, inputs: count } = s;
  const re = s.a.map((value) => -value);
  const im = new Float64Array(n * n);
  for (let i = 0; i < n; i++) im[i * n + i] = w;
  const bRe = s.b0.map((value, p) => value - w * w * s.b2[p]);
  const x = solveComplex(
    re,
    im,
    n,
    bRe,
    s.b1.map((value) => w * value),
  );
  const out: Complex = {
    re: Float64Array.from(s.displacementDirect),
    im: new Float64Array(assembly.free * count),
  };
  for (let q = 0; q < assembly.free; q++) {
    for (let j = 0; j < count; j++) {
      for (let i = 0; i < n; i++) {
        out.re[q * count + j] += s.displacement[q * n + i] * x.re[i * count + j];
        out.im[q * count + j] += s.displacement[q * n + i] * x.im[i * count + j];
      }
    }
  }
  return out;
}

const systems: Record<string, SystemSketch> = {
  "masses only": {
    masses: { a: 2, b: 3 },
    supports: ["floor"],
    massDamping: 0.4,
    joints: [
      { a: "a", b: "floor", stiffness: 900, damping: 4, mass: 0.5 },
      { a: "a", b: "b", stiffness: 500, damping: 1, inertance: 0.3 },
    ],
  },
  "a branch of a spring and a damper, loads on its joint": {
    masses: { a: 2 },
    junctions: ["j"],
    supports: ["floor"],
    joints: [
      { a: "a", b: "floor", stiffness: 900 },
      { a: "a", b: "j", stiffness: 2700 },
      { a: "j", b: "floor", damping: 30 },
    ],
  },
  "junctions in a row behind springs, and one between dampers": {
    masses: { a: 2, b: 1 },
    junctions: ["i", "j", "k"],
    supports: ["floor"],
    stiffnessDamping: 0,
    joints: [
      { a: "a", b: "i", stiffness: 900 },
      { a: "i", b: "j", stiffness: 400 },
      { a: "j", b: "b", stiffness: 700 },
      { a: "j", b: "floor", stiffness: 100 },
      { a: "a", b: "k", damping: 9 },
      { a: "k", b: "floor", damping: 5 },
    ],
  },
  "stiffness damping on massless places": {
    masses: { a: 2 },
    junctions: ["i"],
    supports: ["floor"],
    stiffnessDamping: 0.002,
    joints: [
      { a: "a", b: "i", stiffness: 900 },
      { a: "i", b: "floor", stiffness: 400 },
    ],
  },
  "two junctions tied by a damper that turn into one relaxing and one stiff motion": {
    masses: { a: 2 },
    junctions: ["i", "j"],
    supports: ["floor"],
    joints: [
      { a: "a", b: "i", stiffness: 900 },
      { a: "i", b: "j", damping: 20 },
      { a: "j", b: "floor", stiffness: 300 },
      { a: "i", b: "floor", stiffness: 150 },
    ],
  },
  "an inerter between massless places": {
    masses: { a: 1 },
    junctions: ["i", "j"],
    supports: ["floor"],
    joints: [
      { a: "a", b: "i", stiffness: 400, damping: 2 },
      { a: "i", b: "j", inertance: 2 },
      { a: "j", b: "floor", stiffness: 300 },
    ],
  },
};

describe("first-order equations", () => {
  it.each(Object.keys(systems))("answer as the full matrices do: %s", (name) => {
    const assembly = sketch(systems[name]);
    const inputs: StateInput[] = [
      { kind: "support", support: 0 },
      ...assembly.coordinates.map(({ form }): StateInput => ({ kind: "load", form })),
      { kind: "load", form: combineForms([coordinateForm(0), coordinateForm(1 % assembly.free)], [1, -2]) },
    ];
    for (const w of [0.7, 21, 400]) {
      const expected = directResponse(assembly, inputs, w);
      const found = stateResponse(assembly, inputs, w);
      const scale = Math.max(...expected.re.map(Math.abs), ...expected.im.map(Math.abs));
      expected.re.forEach((value, p) => {
        // A few hundred roundings at a condition below a thousand.
        expect(Math.abs(found.re[p] - value)).toBeLessThan(1e5 * EPS * scale);
        expect(Math.abs(found.im[p] - expected.im[p])).toBeLessThan(1e5 * EPS * scale);
      });
    }
  });

  it.each(Object.keys(systems))("start where the coordinates are said to be: %s", (name) => {
    const assembly = sketch(systems[name]);
    const s = unwrap(stateSpace(assembly, []));
    // Masses displaced; places without inertia follow in equilibrium with them, which the full equations give.
    const y = new Float64Array(s.size).map((_, i) => 1 + i);
    const q = new Float64Array(assembly.free).map((_, i) => {
      let sum = 0;
      for (let j = 0; j < s.size; j++) sum += s.displacement[i * s.size + j] * y[j];
      return sum;
    });
    const v = new Float64Array(assembly.free);
    const back = s.stateOf(q, v);
    for (let i = 0; i < s.size; i++) {
      const moves = s.reduction.inertial <= i && i < 2 * s.reduction.inertial;
      expect(back[i]).toBeCloseTo(moves ? 0 : y[i], 11);
    }
  });
});
