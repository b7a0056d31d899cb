import { describe, expect, it } from "vitest";
import type { Mode, ModeTable } from "../../shared-core/answers/answer.ts";
import { modeTable } from "../../shared-core/answers/modes.ts";
import { modalBasis } from "../../shared-core/answers/modes-basis.ts";
import { systemMatrices } from "../../shared-core/mechanics/matrices.ts";
import { sparseTimesVector, sparseToDense } from "../../shared-core/numerics/sparse.ts";
import { type SystemSketch, sketch } from "../mechanics/helpers.ts";
import { EPS, seeded, unwrap } from "../numerics/helpers.ts";

type Chance = () => number;
const range = (n: number) => Array.from({ length: n }, (_, i) => i);
const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);

/** A random net: masses, junctions behind springs, dampers at some places, held to ground or not. */
function randomSystem(seed: number, n: number, junctions: number, grounded: boolean): SystemSketch {
  const signed = seeded(seed);
  const chance: Chance = () => (signed() + 1) / 2;
  const positive = (size: number) => size * 10 ** signed();
  const masses = Object.fromEntries(range(n).map((i) => [`m${i}`, positive(2)]));
  const places = [...Object.keys(masses), ...range(junctions).map((i) => `j${i}`)];
  const joints: SystemSketch["joints"][number][] = [];
  places.forEach((a, i) => {
    if (i > 0) joints.push({ a, b: places[Math.floor(chance() * i)], stiffness: positive(1000) });
    if (chance() < 0.5)
      joints.push({ a, b: places[Math.floor(chance() * places.length)], damping: positive(3) });
    if (chance() < 0.3)
      joints.push({ a, b: places[Math.floor(chance() * places.length)], stiffness: positive(300) });
  });
  if (grounded) joints.push({ a: "m0", stiffness: positive(1000), damping: positive(1) });
  return { masses, junctions: places.slice(n), joints: joints.filter(({ a, b }) => a !== b) };
}

function solve(system: SystemSketch) {
  const assembly = sketch(system);
  const basis = unwrap(modalBasis(assembly));
  return { assembly, basis, table: unwrap(modeTable(basis)) };
}

/** |(root^2 M + root C + K) psi| against the sum of the sizes of its parts, the shape of the row. */
function residual(assembly: ReturnType<typeof sketch>, mode: Mode): number {
  const { mass, damping, stiffness } = systemMatrices(assembly);
  const [x, y] = mode.eigenvalue;
  const shape = mode.complexShape ?? mode.shape;
  const product = (a: typeof mass) => [sparseTimesVector(a, shape.re), sparseTimesVector(a, shape.im)];
  const [m, c, k] = [mass, damping, stiffness].map(product);
  let worst = 0;
  let scale = 0;
  for (let i = 0; i < assembly.free; i++) {
    const parts = [
      [(x * x - y * y) * m[0][i] - 2 * x * y * m[1][i], (x * x - y * y) * m[1][i] + 2 * x * y * m[0][i]],
      [x * c[0][i] - y * c[1][i], x * c[1][i] + y * c[0][i]],
      [k[0][i], k[1][i]],
    ];
    worst = Math.max(worst, Math.hypot(sum(parts.map(([re]) => re)), sum(parts.map(([, im]) => im))));
    scale = Math.max(scale, sum(parts.map(([re, im]) => Math.hypot(re, im))));
  }
  return worst / scale;
}

/** Number of roots that a table stands for, pairs and both roots of overdamped modes counted twice. */
const rootCount = (table: ModeTable) =>
  sum(
    table.modes
      .filter(({ number }) => number !== 0)
      .map(({ eigenvalue, realRoots }) => (realRoots !== undefined || eigenvalue[1] !== 0 ? 2 : 1)),
  );

describe("modes of seeded random systems", () => {
  const cases = range(24).map((seed) => [seed, 3 + (seed % 9), seed % 4, seed % 3 !== 0] as const);

  it.each(cases)("system %i: %i masses, %i junctions, held: %s", (seed, n, junctions, grounded) => {
    const { assembly, basis, table } = solve(randomSystem(seed, n, junctions, grounded));
    const { free, held, reduction } = basis.undamped;
    expect(free).toBe(grounded ? 0 : 1);
    // Every inertial coordinate has two roots, every relaxing one has one; free motions are told apart.
    expect(rootCount(table)).toBe(2 * (reduction.inertial - free) + reduction.relaxing);
    for (const mode of table.modes) {
      if (mode.number === 0) continue;
      // Couplings spread over two decades each way: a few hundred roundings times the spread.
      if (mode.eigenvalue[0] !== 0 || mode.eigenvalue[1] !== 0) {
        expect(residual(assembly, mode)).toBeLessThan(1e6 * EPS);
      }
      if (mode.number === null) continue;
      expect(Math.abs(sum(Object.values(mode.energyShare)) - 1)).toBeLessThan(1e-12);
      expect(mode.frequencyHz).toBeGreaterThan(0);
    }
    const elastic = table.modes.filter(({ number }) => number !== null && number > 0);
    expect(elastic.map(({ number }) => number)).toEqual(range(n - free - held).map((i) => i + 1));
    const f = elastic.map(({ frequencyHz }) => frequencyHz ?? NaN);
    expect([...f].sort((a, b) => a - b)).toEqual(f);
    expect(Math.abs(sum(table.modes.map(({ effectiveMass }) => effectiveMass.line ?? 0)) - 1)).toBeLessThan(
      1e-11,
    );
    expect(table.stabilityMargin).toBeGreaterThanOrEqual(-1e-10);
  });

  it.each(cases.slice(0, 8))(
    "undamped shapes of system %i are orthonormal and solve the problem",
    (...args) => {
      const { assembly, basis } = solve(randomSystem(...args));
      const { mass, stiffness } = systemMatrices(assembly);
      const { count, values } = basis.undamped;
      const largest = values[count - 1];
      for (let r = 0; r < count; r++) {
        const m = sparseTimesVector(mass, basis.shape(r));
        const k = sparseTimesVector(stiffness, basis.shape(r));
        for (let s = 0; s < count; s++) {
          const shape = basis.shape(s);
          expect(Math.abs(sum([...m.map((x, i) => x * shape[i])]) - (r === s ? 1 : 0))).toBeLessThan(1e-11);
          const energy = sum([...k.map((x, i) => x * shape[i])]) - (r === s ? values[r] : 0);
          expect(Math.abs(energy)).toBeLessThan(1e-11 * largest);
        }
      }
    },
  );
});

describe("damped chains", () => {
  function chain(n: number, seed: number, held: "spring" | "damper" | "none"): SystemSketch {
    const next = seeded(seed);
    const joints: SystemSketch["joints"][number][] = range(n - 1).map((i) => ({
      a: `m${i + 1}`,
      b: `m${i}`,
      stiffness: 1000 * (2 + next()),
      damping: 2 + next(),
    }));
    if (held === "spring") joints.unshift({ a: "m0", stiffness: 1000, damping: 1 });
    if (held === "damper") joints.unshift({ a: "m0", damping: 2 });
    return { masses: Object.fromEntries(range(n).map((i) => [`m${i}`, 2 + next()])), joints };
  }

  it.each(["spring", "damper", "none"] as const)("of 40 masses, held by a %s", (held) => {
    const { assembly, table, basis } = solve(chain(40, 3, held));
    const { free } = basis.undamped;
    expect([free, basis.undamped.held]).toEqual([held === "none" ? 1 : 0, held === "damper" ? 1 : 0]);
    expect(rootCount(table)).toBe(2 * (40 - free));
    for (const mode of table.modes) {
      if (mode.number !== 0 && mode.eigenvalue[1] !== 0) {
        expect(residual(assembly, mode)).toBeLessThan(1e4 * EPS);
      }
    }
    // The roots add up to -trace(M^-1 C).
    const { mass, damping } = systemMatrices(assembly);
    const [m, c] = [mass, damping].map(sparseToDense);
    const trace = sum(range(40).map((i) => c[i * 41] / m[i * 41]));
    const roots = table.modes.map(({ eigenvalue, realRoots }) =>
      realRoots === undefined ? eigenvalue[0] * (eigenvalue[1] !== 0 ? 2 : 1) : sum([...realRoots]),
    );
    expect(Math.abs(sum(roots) / trace + 1)).toBeLessThan(1e-12);
  });

  it("agree with the dense way, which modal damping of nothing takes", () => {
    const fast = solve(chain(40, 8, "spring")).table.modes;
    const dense = solve({ ...chain(40, 8, "spring"), modalDamping: 1e-300 }).table.modes;
    fast.forEach(({ eigenvalue, dampingRatio, complexShape }, i) => {
      const other = dense[i];
      const size = Math.hypot(...eigenvalue);
      expect(Math.abs(eigenvalue[0] - other.eigenvalue[0])).toBeLessThan(1e-12 * size);
      expect(Math.abs(eigenvalue[1] - other.eigenvalue[1])).toBeLessThan(1e-12 * size);
      expect(Math.abs((dampingRatio ?? NaN) / (other.dampingRatio ?? NaN) - 1)).toBeLessThan(1e-10);
      complexShape?.re.forEach((x, k) => {
        expect(Math.abs(x - (other.complexShape?.re[k] ?? NaN))).toBeLessThan(1e-9);
      });
    });
  });
});
