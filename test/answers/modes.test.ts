import { describe, expect, it } from "vitest";
import type { Mode, ModeTable } from "../../shared-core/answers/answer.ts";
import { modeTable } from "../../shared-core/answers/modes.ts";
import { modalBasis } from "../../shared-core/answers/modes-basis.ts";
import { type SystemSketch, sketch } from "../mechanics/helpers.ts";
import { unwrap } from "../numerics/helpers.ts";

const tableOf = (system: SystemSketch): ModeTable => unwrap(modeTable(unwrap(modalBasis(sketch(system)))));
const elastic = (table: ModeTable): Mode[] =>
  table.modes.filter(({ number }) => number !== null && number > 0);
const frequencies = (table: ModeTable): number[] =>
  elastic(table).map(({ frequencyHz }) => frequencyHz ?? NaN);
const size = ({ eigenvalue: [re, im] }: Mode): number => Math.hypot(re, im);
const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

/** Relative agreement with a figure given to about ten digits. */
function agrees(found: number | null | undefined, expected: number, tolerance = 1e-9): void {
  expect(Math.abs((found ?? NaN) / expected - 1)).toBeLessThan(tolerance);
}

function chain(n: number, m: number, k: number, ends: "both" | "one" | "none"): SystemSketch {
  const name = (i: number) => `m${i + 1}`;
  const masses = Object.fromEntries(Array.from({ length: n }, (_, i) => [name(i), m]));
  const joints = Array.from({ length: n - 1 }, (_, i) => ({ a: name(i + 1), b: name(i), stiffness: k }));
  if (ends !== "none") joints.unshift({ a: name(0), b: "ground", stiffness: k });
  if (ends === "both") joints.push({ a: name(n - 1), b: "ground", stiffness: k });
  return { masses, joints };
}

describe("closed forms", () => {
  // w_j = 2 sqrt(k/m) sin(j pi/(2(n+1))), 2 sqrt(k/m) sin((2j-1)pi/(2(2n+1))), 2 sqrt(k/m) sin(j pi/(2n)).
  it.each([3, 10, 40, 75])("equal chains of %i masses, held at both ends, one and none", (n) => {
    const w = 2 * Math.sqrt(5000 / 2);
    const hz = (angle: number) => (w * Math.sin(angle)) / (2 * Math.PI);
    const both = frequencies(tableOf(chain(n, 2, 5000, "both")));
    const one = frequencies(tableOf(chain(n, 2, 5000, "one")));
    const none = tableOf(chain(n, 2, 5000, "none"));
    expect([both.length, one.length, none.modes.length]).toEqual([n, n, n]);
    for (let j = 1; j <= n; j++) {
      agrees(both[j - 1], hz((j * Math.PI) / (2 * (n + 1))), 1e-13);
      agrees(one[j - 1], hz(((2 * j - 1) * Math.PI) / (2 * (2 * n + 1))), 1e-13);
      if (j < n) agrees(frequencies(none)[j - 1], hz((j * Math.PI) / (2 * n)), 1e-13);
    }
    expect(none.modes[0].number).toBe(0);
    expect(none.modes[0].frequencyHz).toBe(0);
    expect(Math.max(...none.modes[0].shape.re)).toBeCloseTo(Math.min(...none.modes[0].shape.re), 12);
  });

  it("chains as in the worked figures", () => {
    // Same formulas, figures to ten digits for m = 2 kg, k = 5000 N/m.
    [6.09059599, 11.25395395, 14.70399944].forEach((f, i) => {
      agrees(frequencies(tableOf(chain(3, 2, 5000, "both")))[i], f);
    });
    [4.918158215, 12.87590537].forEach((f, i) => {
      agrees(frequencies(tableOf(chain(2, 2, 5000, "one")))[i], f);
    });
  });

  it("two free masses", () => {
    // w = sqrt(k (m1+m2)/(m1 m2)).
    const table = tableOf({ masses: { a: 4, b: 9 }, joints: [{ a: "b", b: "a", stiffness: 3600 }] });
    expect(table.modes.map(({ number }) => number)).toEqual([0, 1]);
    agrees(table.modes[1].frequencyHz, 5.738413081);
    const { re } = table.modes[1].shape;
    agrees(re[1] / re[0], -4 / 9, 1e-13);
  });

  it("bounce and pitch of a half car", () => {
    // Two-degree bounce-pitch model; heave and pitch stand as two coordinates, springs as bound ones.
    const table = tableOf({
      masses: { z: 1200 },
      inertias: { p: 1600 },
      binds: { front: { z: 1, p: -1.3 }, rear: { z: 1, p: 1.5 } },
      joints: [
        { a: "front", stiffness: 36000 },
        { a: "rear", stiffness: 40000 },
      ],
    });
    const [first, second] = elastic(table);
    agrees(first.frequencyHz, 1.239321501);
    agrees(second.frequencyHz, 1.567274047);
    agrees(Math.abs(first.shape.re[0] / first.shape.re[1]), 4.077502594);
    agrees(Math.abs(second.shape.re[0] / second.shape.re[1]), 0.3269975438);
  });

  it("an inerter beside a spring", () => {
    // w = sqrt(k/(m+b)).
    const table = tableOf({ masses: { m: 5 }, joints: [{ a: "m", stiffness: 8000, inertance: 1 }] });
    agrees(table.modes[0].frequencyHz, 5.811516831);
    // The base loads the mass alone: m^2/(m+b) of m.
    agrees(table.modes[0].effectiveMass.line, 5 / 6, 1e-13);
  });

  it("two discs on a shaft", () => {
    // w = sqrt(kt (I1+I2)/(I1 I2)); values in lbf in s^2 and lbf in/rad, whose ratio is one of 1/s^2.
    const table = tableOf({
      inertias: { a: 12, b: 30 },
      joints: [{ a: "a", b: "b", stiffness: 142890.3104 }],
    });
    expect(table.modes[0].number).toBe(0);
    agrees(table.modes[1].frequencyHz, 20.54919987);
    // The node is at L I2/(I1+I2) from disc 1: 28.57142857 in of 40 in.
    const { re } = table.modes[1].shape;
    agrees((40 * re[0]) / (re[0] - re[1]), 28.57142857);
  });

  it("three rotors in line", () => {
    // Parameters from a public textbook exercise, values in closed form.
    const table = tableOf({
      inertias: { a: 0.3, b: 0.6, c: 0.18 },
      joints: [
        { a: "a", b: "b", stiffness: 132001.8693 },
        { a: "b", b: "c", stiffness: 198002.804 },
      ],
    });
    const [first, second] = elastic(table);
    agrees(first.frequencyHz, 120.6944392);
    agrees(second.frequencyHz, 195.892625);
    agrees(first.shape.re[1] / first.shape.re[0], -0.3069995318, 1e-8);
    agrees(first.shape.re[2] / first.shape.re[0], -0.6433348939, 1e-8);
    agrees(second.shape.re[1] / second.shape.re[0], -2.443000468, 1e-8);
    agrees(second.shape.re[2] / second.shape.re[0], 6.476668227, 1e-8);
  });

  it.each([
    ["massless", {}, [28.41484088]],
    ["with inertia", { g1: 0.02, g2: 0.3 }, [28.26161836, 142.4385912]],
  ] as const)("geared shafts, gears %s", (_, gears, expected) => {
    // Equivalent inertia and stiffness divide by the square of the speed ratio.
    const table = tableOf({
      inertias: { d1: 0.5, d2: 4, ...gears },
      turningJunctions: ["g1"],
      binds: { g2: { g1: -1 / 3 } },
      joints: [
        { a: "d1", b: "g1", stiffness: 30000 },
        { a: "g2", b: "d2", stiffness: 90000 },
      ],
    });
    expect(table.modes.map(({ number }) => number)).toEqual([0, ...expected.map((_, i) => i + 1)]);
    frequencies(table).forEach((f, i) => {
      agrees(f, expected[i]);
    });
  });

  it("repeated roots of three equal unconnected oscillators and of a ring", () => {
    const apart = tableOf({
      masses: { a: 2, b: 2, c: 2 },
      joints: ["a", "b", "c"].map((a) => ({ a, stiffness: 50 })),
    });
    for (const f of frequencies(apart)) agrees(f, 5 / (2 * Math.PI), 1e-14);
    const names = ["a", "b", "c", "d", "e", "f"];
    const ring = tableOf({
      masses: Object.fromEntries(names.map((n) => [n, 1])),
      joints: names.map((a, i) => ({ a, b: names[(i + 1) % 6], stiffness: 9 })),
    });
    // w = 2 sqrt(k/m) sin(pi j / n), twice each but for j = n/2.
    const expected = [1, 1, 2, 2, 3].map((j) => (6 * Math.sin((Math.PI * j) / 6)) / (2 * Math.PI));
    expect(ring.modes[0].number).toBe(0);
    frequencies(ring).forEach((f, i) => {
      agrees(f, expected[i], 1e-13);
    });
  });
});

describe("damped roots", () => {
  it("of a damper between two masses only", () => {
    // Computed by SciPy: scipy.linalg eigenvalues of the state matrix.
    const table = tableOf({
      masses: { a: 2, b: 1 },
      joints: [
        { a: "a", stiffness: 800 },
        { a: "b", b: "a", stiffness: 400, damping: 6 },
      ],
    });
    const [first, second] = elastic(table);
    agrees(size(first) / (2 * Math.PI), 2.26576743);
    agrees(first.dampedFrequencyHz, 2.264420657);
    agrees(first.dampingRatio, 0.03447387299);
    agrees(size(second) / (2 * Math.PI), 4.471826291);
    agrees(second.dampedFrequencyHz, 4.426067642);
    agrees(second.dampingRatio, 0.1426905751);
    agrees(table.stabilityMargin, -first.eigenvalue[0], 1e-12);
    expect(first.complexShape).toBeDefined();
  });

  it("of a mount whose damper hangs on a spring", () => {
    // Cubic polynomial of the elastically coupled viscous damper.
    const table = tableOf({
      masses: { m: 10 },
      junctions: ["j"],
      joints: [
        { a: "m", stiffness: 40000 },
        { a: "m", b: "j", stiffness: 120000 },
        { a: "j", damping: 300 },
      ],
    });
    expect(table.modes.map(({ number }) => number)).toEqual([1, null]);
    const [pair, real] = table.modes;
    agrees(size(pair) / (2 * Math.PI), 10.48929862);
    agrees(pair.dampingRatio, 0.2400710181);
    agrees(real.eigenvalue[0], -368.3556596);
    expect([real.eigenvalue[1], real.frequencyHz, real.modalMass]).toEqual([0, null, null]);
    agrees(pair.frequencyHz, Math.sqrt(4000) / (2 * Math.PI), 1e-14);
  });

  it("of a mass held by a spring behind a damper", () => {
    // m s^2 + (m k/c) s + k = 0 beside the zero root.
    const table = tableOf({
      masses: { m: 4 },
      junctions: ["j"],
      joints: [
        { a: "m", b: "j", stiffness: 10000 },
        { a: "j", damping: 150 },
      ],
    });
    expect(table.modes.map(({ number }) => number)).toEqual([null, null]);
    const [zero, pair] = table.modes;
    expect(zero.eigenvalue).toEqual([0, 0]);
    agrees(size(pair), 50, 1e-13);
    agrees(2 * pair.eigenvalue[0], -200 / 3, 1e-13);
    agrees(pair.dampingRatio, 2 / 3, 1e-13);
    // The damper replaced by a spring of twice the stiffness: springs in series.
    const stiff = tableOf({
      masses: { m: 4 },
      junctions: ["j"],
      joints: [
        { a: "m", b: "j", stiffness: 10000 },
        { a: "j", stiffness: 20000 },
      ],
    });
    agrees(stiff.modes[0].frequencyHz, 6.497473344);
  });

  it("of a rotor that a damper alone holds: no free mode, roots 0 and -c/J", () => {
    const table = tableOf({ inertias: { r: 2 }, joints: [{ a: "r", damping: 3 }] });
    expect(table.modes.map(({ number }) => number)).toEqual([null, null]);
    expect(table.modes[0].eigenvalue).toEqual([0, 0]);
    agrees(table.modes[1].eigenvalue[0], -1.5, 1e-15);
  });

  it("of an overdamped mass, both roots and a ratio above one", () => {
    // s = -zeta w +- w sqrt(zeta^2 - 1) with w = 10 1/s, zeta = 2.6.
    const table = tableOf({ masses: { m: 3 }, joints: [{ a: "m", stiffness: 300, damping: 156 }] });
    const [mode] = table.modes;
    expect(mode.dampedFrequencyHz).toBe(0);
    agrees(mode.dampingRatio, 2.6, 1e-14);
    expect(mode.realRoots?.map((s) => Math.round(s * 1e12) / 1e12)).toEqual([-50, -2]);
    expect(mode.eigenvalue[0]).toBeCloseTo(-2, 12);
    const coupled = tableOf({
      masses: { m: 3, n: 1 },
      joints: [
        { a: "m", stiffness: 300, damping: 156 },
        { a: "n", b: "m", stiffness: 4 },
      ],
    });
    expect(coupled.modes.map(({ number }) => number)).toEqual([1, 2]);
    expect(coupled.modes[1].realRoots?.every((s) => s < 0)).toBe(true);
    expect(coupled.modes[1].dampingRatio).toBeGreaterThan(1);
    expect(coupled.modes[0].realRoots).toBeUndefined();
  });

  it("of proportional, modal and structural damping", () => {
    // zeta = alpha/(2 w) + beta w/2 + modal + eta/2 (one mass).
    const w = 20;
    const table = tableOf({
      masses: { m: 1 },
      modalDamping: 0.01,
      massDamping: 0.3,
      stiffnessDamping: 0.001,
      joints: [{ a: "m", stiffness: w * w, lossFactor: 0.05 }],
    });
    agrees(table.modes[0].dampingRatio, 0.3 / (2 * w) + (0.001 * w) / 2 + 0.01 + 0.025, 1e-14);
    expect(table.modes[0].complexShape).toBeUndefined();
  });

  it("adds half the loss factors by energy share", () => {
    const system: SystemSketch = {
      masses: { a: 2, b: 1 },
      joints: [
        { name: "k1", a: "a", stiffness: 800, lossFactor: 0.1 },
        { name: "k2", a: "b", b: "a", stiffness: 400, lossFactor: 0.02 },
      ],
    };
    for (const mode of elastic(tableOf(system))) {
      agrees(mode.dampingRatio, (0.1 * mode.energyShare.k1 + 0.02 * mode.energyShare.k2) / 2, 1e-12);
    }
  });

  it("of a negative damper: a growing root", () => {
    const table = tableOf({ masses: { m: 2 }, joints: [{ a: "m", stiffness: 800, damping: -4 }] });
    agrees(table.modes[0].eigenvalue[0], 1, 1e-14);
    agrees(table.stabilityMargin, -1, 1e-14);
  });

  it("of what topples: a frequency of zero and one root on each side", () => {
    const table = tableOf({
      masses: { a: 1, b: 1 },
      joints: [
        { a: "a", stiffness: -9 },
        { a: "b", stiffness: 16 },
      ],
    });
    expect(frequencies(table)[0]).toBe(0);
    expect(table.modes[0].realRoots).toEqual([-3, 3]);
    expect(table.modes[0].dampingRatio).toBeNull();
    expect(table.stabilityMargin).toBeCloseTo(-3, 13);
    agrees(frequencies(table)[1], 4 / (2 * Math.PI), 1e-14);
  });
});

describe("shares", () => {
  it("effective masses of a three-storey model", () => {
    // Computed by SciPy: m_eff = (phi^T M 1)^2/(phi^T M phi).
    const table = tableOf(chain(3, 1000, 6e5, "one"));
    const shares = table.modes.map(({ effectiveMass }) => effectiveMass.line);
    agrees(table.modes[0].frequencyHz, 1.734988604);
    [0.9140794932, 0.07487697754, 0.01104352921].forEach((share, i) => {
      agrees(shares[i], share);
    });
    agrees(sum(shares), 1, 1e-13);
    agrees(table.modes[0].participation.line, 1.220410935);
  });

  it("effective masses add up to one a direction, springs with mass and junctions included", () => {
    const table = tableOf({
      masses: { a: 3, b: 5 },
      inertias: { r: 2, s: 4 },
      junctions: ["j"],
      joints: [
        { a: "a", stiffness: 50, mass: 2 },
        { a: "a", b: "j", stiffness: 70 },
        { a: "j", b: "b", stiffness: 30 },
        { a: "r", b: "s", stiffness: 10 },
      ],
    });
    agrees(sum(table.modes.map(({ effectiveMass }) => effectiveMass.line)), 1, 1e-12);
    agrees(sum(table.modes.map(({ effectiveMass }) => effectiveMass.turn)), 1, 1e-12);
    for (const { energyShare } of elastic(table)) agrees(sum(Object.values(energyShare)), 1, 1e-12);
    expect(table.modes[0].energyShare).toEqual({});
  });

  it("scales shapes to a largest entry of one, and gives that shape's modal mass", () => {
    const table = tableOf({ masses: { a: 4, b: 9 }, joints: [{ a: "b", b: "a", stiffness: 3600 }] });
    expect(table.modes[1].shape.re[0]).toBe(1);
    agrees(table.modes[1].modalMass, 4 + 9 * (4 / 9) ** 2, 1e-13);
  });
});

describe("hard cases", () => {
  it("keeps the digits of soft frequencies beside a spring a million million times stiffer", () => {
    // 60-digit eigenvalues (mpmath eigsy) of k = 1, 1e12, 1 N/m between unit masses, one end held.
    const table = tableOf({
      masses: { a: 1, b: 1, c: 1 },
      joints: [
        { a: "a", stiffness: 1 },
        { a: "a", b: "b", stiffness: 1e12 },
        { a: "b", b: "c", stiffness: 1 },
      ],
    });
    [0.0861340345203053, 0.2079459543208701, 225079.0790393328].forEach((f, i) => {
      agrees(frequencies(table)[i], f, 1e-14);
    });
  });

  it("counts free motions by the forms, however soft the springs beside", () => {
    const table = tableOf({
      masses: { a: 1, b: 1, c: 1, d: 1 },
      joints: [
        { a: "a", b: "b", stiffness: 1e9 },
        { a: "b", b: "c", stiffness: 1e-3 },
        { a: "c", b: "d", stiffness: 1e9 },
      ],
    });
    expect(table.modes.map(({ number }) => number)).toEqual([0, 1, 2, 3]);
    agrees(frequencies(table)[0], Math.sqrt(1e-3) / (2 * Math.PI), 1e-9);
  });

  it("says why there are no modes", () => {
    const reason = (system: SystemSketch) => {
      const outcome = modalBasis(sketch(system));
      return outcome.ok ? "" : outcome.reason;
    };
    expect(reason({ joints: [] })).toBe("nothing in it can move");
    expect(reason({ junctions: ["j"], joints: [{ a: "j", stiffness: 1 }] })).toBe(
      "nothing in it has an inertia",
    );
    expect(reason({ masses: { m: 1 }, junctions: ["j"], joints: [] })).toBe("nothing holds j");
  });
});
