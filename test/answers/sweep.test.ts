import { describe, expect, it } from "vitest";
import { modalTransfer, symmetricTransfer } from "../../shared-core/answers/frequency-modal.ts";
import { steadySolution } from "../../shared-core/answers/frequency-solution.ts";
import { steadySystem } from "../../shared-core/answers/frequency-system.ts";
import { modeTable } from "../../shared-core/answers/modes.ts";
import { modalBasis } from "../../shared-core/answers/modes-basis.ts";
import { steadyModel, steadyResponse, sweepAnswer } from "../../shared-core/answers/sweep.ts";
import type { Assembly, DriveShape, QuantityRef } from "../../shared-core/mechanics/assembly.ts";
import type { SweepAsk } from "../../shared-core/model/model.ts";
import type { Outcome } from "../../shared-core/numerics/outcome.ts";
import { sketch } from "../mechanics/helpers.ts";
import { seeded, unwrap } from "../numerics/helpers.ts";
import {
  difference,
  elementOf,
  forceOn,
  motionDrive,
  motionOf,
  sine,
  withDrives,
} from "./history-helpers.ts";

const near = (found: number, expected: number, tolerance: number) =>
  expect(Math.abs(found / expected - 1), `${found} instead of ${expected}`).toBeLessThan(tolerance);

/** The printed reference values carry ten digits. */
const PRINTED = 1e-9;
const unit: DriveShape = { kind: "none" };

const modelOf = (assembly: Assembly) => {
  const basis = unwrap(modalBasis(assembly));
  return steadyModel(assembly, basis, unwrap(modeTable(basis)));
};
const responseOf = (assembly: Assembly, by: readonly number[] = [0]) =>
  unwrap(steadyResponse(unwrap(modelOf(assembly)), by));
const size = (got: Outcome<readonly [number, number]>) => Math.hypot(...unwrap(got));
/** Degrees by which the answer lags behind a drive without phase. */
const lag = (got: Outcome<readonly [number, number]>) => {
  const [re, im] = unwrap(got);
  return (-Math.atan2(im, re) * 180) / Math.PI;
};
const sweepAsk = (of: readonly QuantityRef[], more: Partial<SweepAsk> = {}): SweepAsk => ({
  kind: "sweep",
  name: "run",
  // The node only gives diagnostics their place.
  node: undefined as unknown as SweepAsk["node"],
  of,
  by: [0],
  fromHz: 1,
  toHz: 100,
  points: 200,
  spacing: "log",
  ...more,
});

describe("one mass", () => {
  // Source: standard steady-state solution (closed form).
  it("answers a harmonic force", () => {
    const base = sketch({
      masses: { m: 20 },
      joints: [
        { a: "m", stiffness: 50000 },
        { a: "m", damping: 200 },
      ],
    });
    const assembly = withDrives(
      base,
      forceOn(base, "m", { kind: "sine", amplitude: 100, phase: 0, order: 1 }),
    );
    const response = responseOf(assembly);
    const x = response.at(motionOf(assembly, "m"), 6);
    near(size(x), 0.004375402683, PRINTED);
    near(lag(x), 19.26255975, PRINTED);
    near(size(response.at(motionOf(assembly, "m", 1), 6)), 0.1649487951, PRINTED);
    near(size(response.at(motionOf(assembly, "m", 2), 6)), 6.218423075, PRINTED);
    near(unwrap(response.at(elementOf(assembly, "power", "e2"), 6))[0], 2.720810501, PRINTED);
    near(size(response.at(elementOf(assembly, "force", "e1", "e2"), 6)), 221.2435215, PRINTED);
    // The spring stores half k x^2 at the turning point.
    near(unwrap(response.at(elementOf(assembly, "energy", "e1"), 6))[0], 25000 * size(x) ** 2, 1e-12);
  });

  // Source: standard closed forms; half-power points relative to the true peak.
  it("peaks where displacement, velocity and acceleration do", () => {
    const w = 2 * Math.PI * 12;
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: w * w, damping: 0.3 * w }] });
    const response = responseOf(withDrives(base, forceOn(base, "m", unit)));
    const peak = (d: 0 | 1 | 2) => unwrap(response.peak(motionOf(base, "m", d), 1, 100));
    near(peak(0).value * w * w, 3.371478249, PRINTED);
    near(peak(0).at, 11.72689217, 1e-7);
    near(peak(1).at, 12, 1e-7);
    near(peak(2).at, 12.27946824, 1e-7);
    near(size(response.at(motionOf(base, "m"), 12)) * w * w, 3.333333333, PRINTED);
    // A band that ends before the peak has its largest value at its end.
    expect(unwrap(response.peak(motionOf(base, "m"), 1, 9))).toEqual({
      value: expect.closeTo(size(response.at(motionOf(base, "m"), 9)), 15),
      at: 9,
    });
  });

  it.each([1e-3, 1e-5, 1e-8])("does not miss a peak of damping ratio %s between coarse points", (z) => {
    const w = 2 * Math.PI * 12.3456789;
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: w * w, damping: 2 * z * w }] });
    const assembly = withDrives(base, forceOn(base, "m", unit));
    const x = motionOf(base, "m");
    const exact = 1 / (2 * z * Math.sqrt(1 - z * z) * w * w);
    near(unwrap(responseOf(assembly).peak(x, 1, 1000)).value, exact, 1e-10);
    const answer = unwrap(sweepAnswer(unwrap(modelOf(assembly)), sweepAsk([x], { points: 5, toHz: 1000 })));
    expect(answer.peaks.get(x.text)).toEqual({
      value: expect.closeTo(exact, -Math.log10(1e-9 * exact)),
      at: expect.any(Number),
    });
    const { re, im } = answer.series.get(x.text) ?? { re: [], im: [] };
    const drawn = Math.max(...Array.from(re, (v, i) => Math.hypot(v, im[i])));
    near(drawn, exact, 0.01);
  });

  // Source: hysteretic (structural) damping, standard result (closed form).
  it("lets a loss factor act as complex stiffness", () => {
    const w = 2 * Math.PI * 20;
    const base = sketch({
      masses: { m: 1e5 / w ** 2 },
      joints: [{ a: "m", stiffness: 1e5, lossFactor: 0.08 }],
    });
    const assembly = withDrives(
      base,
      forceOn(base, "m", { kind: "sine", amplitude: 50, phase: 0, order: 1 }),
    );
    const response = responseOf(assembly);
    const x = motionOf(assembly, "m");
    near(size(response.at(x, 20)), 0.00625, 1e-12);
    near(size(response.at(x, 18)), 0.00242535625, PRINTED);
    near(lag(response.at(x, 18)), 22.83365418, PRINTED);
    const peak = unwrap(response.peak(x, 1, 100));
    near(peak.value, 0.00625, 1e-12);
    near(peak.at, 20, 1e-7);
    // Power lost a cycle: half omega k eta x^2.
    near(
      unwrap(response.at(elementOf(assembly, "power", "e1"), 20))[0],
      0.5 * w * 1e5 * 0.08 * 0.00625 ** 2,
      1e-12,
    );
  });

  // Source: parameters from a public exercise (tutorsglobe.com, item 5285870); values closed form.
  it("transmits a force", () => {
    const k = 784000;
    const c = 0.4 * Math.sqrt(k * 100);
    const base = sketch({ masses: { m: 100 }, joints: [{ a: "m", stiffness: k, damping: c }] });
    const assembly = withDrives(
      base,
      forceOn(base, "m", { kind: "sine", amplitude: 400, phase: 0, order: 1 }),
    );
    const response = responseOf(assembly);
    near(size(response.at(motionOf(assembly, "m"), 50)), 4.369921277e-5, PRINTED);
    near(size(response.at(elementOf(assembly, "force", "e1"), 50)), 59.48069955, PRINTED);
  });

  // Source: standard base-excitation result; peak at r = sqrt(sqrt(1 + 8 z^2) - 1) / (2 z) (closed form).
  it.each([0, 1, 2] as const)("follows a base given as derivative %d", (derivative) => {
    const w = 2 * Math.PI * 4;
    const base = sketch({
      masses: { m: 3 },
      supports: ["floor"],
      joints: [{ a: "m", b: "floor", stiffness: 3 * w * w, damping: 3 * 0.2 * w }],
    });
    const amplitude = 0.002 * (2 * Math.PI * 11) ** derivative;
    const assembly = withDrives(
      base,
      motionDrive(base, "floor", derivative, { kind: "sine", amplitude, phase: 0, order: 1 }),
    );
    const response = responseOf(assembly);
    const x = motionOf(assembly, "m");
    const floor = motionOf(assembly, "floor");
    near(size(response.at(x, 11)), 0.0003466008528, PRINTED);
    near(size(response.at(difference(x, floor), 11)), 0.002296709932, PRINTED);
    near(size(response.at(motionOf(assembly, "m", 2), 11)), 1.655673638, PRINTED);
    near(size(response.at(motionOf(assembly, "floor", derivative), 11)), amplitude, 1e-14);
    if (derivative > 0) return;
    const peak = unwrap(response.peak(x, 1, 100));
    near(peak.value / 0.002, 5.12277358, PRINTED);
    near(peak.at, 3.961337377, 1e-7);
    near(size(response.at(x, 4 * Math.SQRT2)) / 0.002, 1, 1e-12);
  });

  // Source: D. J. Inman, Engineering Vibration, problem 5.8, quoted publicly; other values closed form.
  it("answers a rotating unbalance", () => {
    const base = sketch({
      masses: { m: 20 },
      joints: [{ a: "m", stiffness: 1000, damping: 0.02 * Math.sqrt(20000) }],
    });
    const assembly = withDrives(base, forceOn(base, "m", { kind: "unbalance", unbalance: 2.5, phase: 0 }));
    const response = responseOf(assembly);
    const x = motionOf(assembly, "m");
    near(size(response.at(x, 5)), 0.1316690255, PRINTED);
    near(size(response.at(elementOf(assembly, "force", "e1"), 5)), 132.1878119, PRINTED);
    const peak = unwrap(response.peak(x, 0.1, 50));
    near(peak.value, 6.250312523, PRINTED);
    near(60 * peak.at, 67.5304771, 1e-7);
  });
});

describe("several masses", () => {
  const twoMasses = () =>
    sketch({
      masses: { a: 5, b: 3 },
      joints: [
        { a: "a", stiffness: 4000 },
        { a: "a", b: "b", stiffness: 2000 },
        { a: "b", stiffness: 1000 },
      ],
    });

  // Source: two-mass textbook formulas (closed form).
  it("has receptances, an anti-resonance and no peak over an undamped mode", () => {
    const base = twoMasses();
    const assembly = withDrives(base, forceOn(base, "a", unit));
    const response = responseOf(assembly);
    const [a, b] = [motionOf(base, "a"), motionOf(base, "b")];
    const middle = (3.81311088 + 6.417697127) / 2;
    near(unwrap(response.at(a, middle))[0], 2.428204018e-5, 1e-6);
    near(unwrap(response.at(b, middle))[0], -0.0004898650341, 1e-6);
    near(unwrap(response.at(a, 0))[0], 0.0002142857143, PRINTED);
    const least = unwrap(response.least(a, 1, 20));
    near(least.at, 5.03292121, PRINTED);
    expect(least.value).toBeLessThan(1e-17);
    expect(response.peak(a, 1, 20)).toEqual({
      ok: false,
      reason: "not damped: mode 1 at 3.8131 Hz has no damping",
    });
    const inside = unwrap(response.peak(a, 4, 6));
    expect(inside.at).toBe(4);
    const answer = unwrap(sweepAnswer(unwrap(modelOf(assembly)), sweepAsk([a, b], { toHz: 20, points: 30 })));
    expect(answer.peaks.get(a.text)).toMatchObject({ reason: expect.stringMatching(/^not damped/) });
    // The axis holds the anti-resonance to a thousandth of the neighbouring values.
    const { re } = answer.series.get(a.text) ?? { re: new Float64Array(0) };
    expect(Math.min(...Array.from(re, Math.abs))).toBeLessThan(1e-6);
  });

  // Source: Frahm absorber, r^4 - r^2 (1 + f^2 (1 + mu)) + f^2 = 0 (closed form).
  it("stands still where an undamped absorber is tuned", () => {
    const k = (2 * Math.PI * 10) ** 2;
    const base = sketch({
      masses: { p: 1, absorber: 0.2 },
      joints: [
        { a: "p", stiffness: k },
        { a: "absorber", b: "p", stiffness: 0.2 * k },
      ],
    });
    const response = responseOf(withDrives(base, forceOn(base, "p", unit)));
    expect(unwrap(response.least(motionOf(base, "p"), 8.5, 12)).at).toBeCloseTo(10, 12);
    near(size(response.at(motionOf(base, "absorber"), 10)) * k, 5, 1e-12);
  });

  // Source: Den Hartog, Mechanical Vibrations; peaks by numerical scan.
  it("finds both peaks of a tuned damper", () => {
    const w = 2 * Math.PI * 2;
    const base = sketch({
      masses: { p: 1000, t: 50 },
      joints: [
        { a: "p", stiffness: 1000 * w * w },
        { a: "t", b: "p", stiffness: 7161.617706, damping: 159.9287532 },
      ],
    });
    const response = responseOf(withDrives(base, forceOn(base, "p", unit)));
    const x = motionOf(base, "p");
    const k = 1000 * w * w;
    near(unwrap(response.peak(x, 0.5, 2)).value * k, 6.407492262, 1e-7);
    near(unwrap(response.peak(x, 2, 8)).value * k, 6.40844317, 1e-7);
    for (const f of [0.8964619547, 1.049341636]) near(size(response.at(x, 2 * f)) * k, 6.403124237, 1e-8);
  });

  // Source: untuned viscous damper (Houdaille), peak 1 + 2/mu at sqrt(2/(2 + mu)) (closed form).
  it("peaks flat with a ring held by a film alone", () => {
    const w = 2 * Math.PI * 30;
    const base = sketch({
      inertias: { disc: 0.4, ring: 0.4 },
      joints: [
        { a: "disc", stiffness: 0.4 * w * w },
        { a: "ring", b: "disc", damping: 43.53118474 },
      ],
    });
    const response = responseOf(withDrives(base, forceOn(base, "disc", unit)));
    const peak = unwrap(response.peak(motionOf(base, "disc"), 5, 100));
    near(peak.value * 0.4 * w * w, 3, 1e-9);
    near(peak.at / 30, 0.8164965809, 1e-6);
  });

  // Source: elastically coupled viscous damper, T = 1 + 2/N at r = sqrt(2 (1 + N)/(2 + N)) (closed form).
  it("takes the joint of a spring and a damper without inertia exactly", () => {
    const mount = (c: number) => {
      const base = sketch({
        masses: { m: 10 },
        junctions: ["j"],
        supports: ["floor"],
        joints: [
          { a: "m", b: "floor", stiffness: 40000 },
          { a: "m", b: "j", stiffness: 120000 },
          { a: "j", b: "floor", damping: c },
        ],
      });
      return withDrives(base, motionDrive(base, "floor", 0, unit));
    };
    const x = motionOf(mount(750), "m");
    const f = Math.sqrt(4000) / (2 * Math.PI);
    const best = unwrap(responseOf(mount(750)).peak(x, 1, 100));
    near(best.value, 1.666666667, PRINTED);
    near(best.at / f, 1.264911064, 1e-6);
    near(size(responseOf(mount(300)).at(x, 10 * f)), 0.03533326267, PRINTED);
  });

  // Source: w = sqrt(k/(m + b)); zero at sqrt(k/b) (closed form).
  it("passes an inerter's forces on", () => {
    const base = sketch({
      masses: { m: 5 },
      supports: ["floor"],
      joints: [
        { a: "m", b: "floor", stiffness: 8000 },
        { a: "m", b: "floor", inertance: 1 },
      ],
    });
    const response = responseOf(withDrives(base, motionDrive(base, "floor", 0, unit)));
    const x = motionOf(base, "m");
    near(unwrap(response.least(x, 7, 100)).at, 14.23525087, PRINTED);
    near(size(response.at(x, 2 * 5.811516831)), 0.1111111111, 1e-8);
    near(size(response.at(x, 5.811516831e6)), 1 / 6, PRINTED);
  });

  it("passes by an undamped mode that the force does not excite", () => {
    const base = sketch({
      masses: { a: 2, b: 2 },
      joints: [
        { a: "a", stiffness: 1000, damping: 3 },
        { a: "b", stiffness: 1000, damping: 3 },
        { a: "a", b: "b", stiffness: 500 },
      ],
    });
    // The other way round: the damper between the masses leaves the mode in which they go together undamped.
    const free = sketch({
      masses: { a: 2, b: 2 },
      joints: [
        { a: "a", stiffness: 1000 },
        { a: "b", stiffness: 1000 },
        { a: "a", b: "b", stiffness: 500, damping: 4 },
      ],
    });
    const f = Math.sqrt(500) / (2 * Math.PI);
    const both = (a: Assembly, sign: number) =>
      withDrives(a, forceOn(a, "a", sine(1, 4)), forceOn(a, "b", sine(sign, 4)));
    const against = responseOf(both(free, -1), [0, 1]);
    const x = motionOf(free, "a");
    // Moving apart, the masses feel 1000 + 2 * 500 N/m and twice the damper each: closed form.
    const apart = (hz: number) => {
      const w = 2 * Math.PI * hz;
      return 1 / Math.hypot(2000 - 2 * w * w, 8 * w);
    };
    near(size(against.at(x, f)), apart(f), 1e-9);
    const r = 8 / (2 * Math.sqrt(2000 * 2));
    near(unwrap(against.peak(x, 0.5, 20)).value, 1 / (2000 * 2 * r * Math.sqrt(1 - r * r)), 1e-9);
    const together = responseOf(both(free, 1), [0, 1]);
    expect(together.peak(x, 0.5, 20)).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/^not damped: mode 1/),
    });
    expect(together.at(x, f)).toMatchObject({ ok: false });
    // Travel between the masses does not see it either; rounding near the pole is left.
    expect(unwrap(together.peak(elementOf(free, "travel", "e3"), 0.5, 20)).value).toBeLessThan(1e-10);
    expect(responseOf(both(base, 1), [0, 1]).peak(x, 0.5, 20).ok).toBe(true);
  });

  it("has no steady response where a mode grows, and says which", () => {
    const base = sketch({ masses: { m: 1.5 }, joints: [{ a: "m", stiffness: 600, damping: -1.2 }] });
    const made = modelOf(withDrives(base, forceOn(base, "m", unit)));
    expect(made).toEqual({ ok: false, reason: "mode 1 grows at 0.4 1/s, so there is no steady response" });
  });

  it("says that a free body has no place at 0 Hz", () => {
    const base = sketch({ masses: { a: 1, b: 2 }, joints: [{ a: "a", b: "b", stiffness: 100, damping: 1 }] });
    const response = responseOf(withDrives(base, forceOn(base, "a", unit)));
    const x = motionOf(base, "a");
    expect(response.at(x, 0)).toMatchObject({ ok: false });
    expect(response.peak(x, 0, 10)).toMatchObject({ ok: false });
    expect(response.peak(x, 0.5, 10).ok).toBe(true);
    near(size(response.at(motionOf(base, "a", 2), 1e-4)), 1 / 3, 1e-6);
  });
});

describe("drives together", () => {
  const base = () =>
    sketch({
      masses: { a: 3, b: 2 },
      joints: [
        { a: "a", stiffness: 900, damping: 9 },
        { a: "a", b: "b", stiffness: 300, damping: 5 },
      ],
    });

  it("adds the phasors of drives at one rate, each with its phase", () => {
    const a = base();
    const alone = (shape: DriveShape, name: string) =>
      unwrap(responseOf(withDrives(a, forceOn(a, name, shape))).at(motionOf(a, "b"), 3));
    const one = alone(sine(5, 2, 0.7), "a");
    const two = alone(sine(2, 2, -1.1), "b");
    const both = withDrives(a, forceOn(a, "a", sine(5, 2, 0.7)), forceOn(a, "b", sine(2, 2, -1.1)));
    const sum = unwrap(responseOf(both, [0, 1]).at(motionOf(a, "b"), 3));
    expect(sum[0]).toBeCloseTo(one[0] + two[0], 14);
    expect(sum[1]).toBeCloseTo(one[1] + two[1], 14);
  });

  it("keeps the written ratio of two rates, and adds their magnitudes", () => {
    const a = base();
    const x = motionOf(a, "b");
    const alone = (shape: DriveShape, name: string, hz: number) =>
      size(responseOf(withDrives(a, forceOn(a, name, shape))).at(x, hz));
    const drives = withDrives(
      a,
      forceOn(a, "a", sine(5, 2), { writtenHz: 2 }),
      forceOn(a, "b", { kind: "unbalance", unbalance: 0.1, phase: 0.4 }, { writtenHz: 5 }),
    );
    const got = unwrap(responseOf(drives, [0, 1]).at(x, 3));
    expect(got[1]).toBe(0);
    near(
      got[0],
      alone(sine(5, 2), "a", 3) + alone({ kind: "unbalance", unbalance: 0.1, phase: 0.4 }, "b", 7.5),
      1e-12,
    );
    // Peaks of both lie on the axis, the second's at 2/5 of its own frequency.
    const [low] = [unwrap(responseOf(drives, [0, 1]).peak(x, 0.2, 20))];
    expect(low.value).toBeGreaterThanOrEqual(got[0]);
    const power = elementOf(a, "power", "e1");
    const parts = [
      unwrap(responseOf(withDrives(a, forceOn(a, "a", sine(5, 2)))).at(power, 3))[0],
      unwrap(
        responseOf(withDrives(a, forceOn(a, "b", { kind: "unbalance", unbalance: 0.1, phase: 0.4 }))).at(
          power,
          7.5,
        ),
      )[0],
    ];
    near(unwrap(responseOf(drives, [0, 1]).at(power, 3))[0], parts[0] + parts[1], 1e-12);
  });

  it("refuses drives that are not steady, by name", () => {
    const a = base();
    const pulse = withDrives(a, forceOn(a, "a", { kind: "step", step: 1, start: 0, rise: 0 }));
    expect(() => responseOf(pulse)).toThrow(/force f_a is no steady drive/);
    expect(() => responseOf(a, [])).toThrow(/no drive acts in it/);
  });
});

describe("routes", () => {
  /** A chain with junctions, ground springs and dashpots by chance. */
  function chain(n: number, seed: number, more: Parameters<typeof sketch>[0]["joints"] = []): Assembly {
    const next = seeded(seed);
    const masses: Record<string, number> = {};
    const joints = Array.from({ length: n }, (_, i) => {
      masses[`m${i}`] = 1.5 + next();
      return {
        a: `m${i}`,
        b: i === 0 ? "ground" : `m${i - 1}`,
        stiffness: 1e4 * (1.5 + next()),
        damping: 5 * (1 + next()),
      };
    });
    const base = sketch({ masses, joints: [...joints, ...more], supports: ["floor"] });
    return withDrives(base, forceOn(base, "m0", unit));
  }

  /** Every two of seven masses joined, three of them damped so that modes couple; two forces. */
  function mesh(seed: number): Assembly {
    const next = seeded(seed);
    const names = ["a", "b", "c", "d", "e", "f", "g"];
    const masses = Object.fromEntries(names.map((name) => [name, 2 + next()]));
    const joints = names.flatMap((a, i) => [
      ...names
        .slice(i + 1)
        .map((b) => ({ a, b, stiffness: 500 * (1.2 + next()), damping: i < 3 ? 2 + next() : 0 })),
      { a, stiffness: 300 * (1.5 + next()), damping: i === 0 ? 30 : 0 },
    ]);
    const base = sketch({ masses, joints, modalDamping: 0.01 });
    return withDrives(base, forceOn(base, "c", sine(2, 1, 0.3)), forceOn(base, "f", sine(5, 1)));
  }

  it.each([1, 2, 3])("band and dense agree (seed %d)", (seed) => {
    const assembly = chain(30, seed, [{ a: "m3", b: "m5", stiffness: 3e3, lossFactor: 0.2 }]);
    const banded = steadySystem(assembly);
    expect(banded.route).toBe("band");
    const dense = steadySystem(assembly, undefined, "dense");
    const [one, two] = [banded, dense].map((system) => unwrap(steadySolution(assembly, system, [0])));
    for (const hz of [0.1, 3, 11.1, 25, 80]) {
      const [a] = unwrap(one.at(hz));
      const [b] = unwrap(two.at(hz));
      const scale = Math.max(...a.xRe.map(Math.abs), ...a.xIm.map(Math.abs));
      a.xRe.forEach((v, i) => {
        expect(Math.abs(v - b.xRe[i]) + Math.abs(a.xIm[i] - b.xIm[i])).toBeLessThan(1e-12 * scale);
      });
    }
  });

  it.each([4, 5, 6])("superposition agrees with the factorisation (seed %d)", (seed) => {
    const next = seeded(seed);
    const names = ["a", "b", "c", "d", "e", "f", "g"];
    const masses = Object.fromEntries(names.map((name) => [name, 2 + next()]));
    const joints = names.flatMap((a, i) => [
      ...names
        .slice(i + 1)
        .map((b) => ({ a, b, stiffness: 500 * (1.2 + next()), damping: i < 3 ? 2 + next() : 0 })),
      { a, b: "floor", stiffness: 300 * (1.5 + next()), damping: i === 0 ? 30 : 0 },
    ]);
    const base = sketch({
      masses,
      junctions: ["j"],
      supports: ["floor"],
      joints: [...joints, { a: "j", b: "a", stiffness: 200 }, { a: "j", b: "g", damping: 7 }],
      modalDamping: 0.01,
    });
    const assembly = withDrives(
      base,
      forceOn(base, "c", sine(2, 1, 0.3)),
      motionDrive(base, "floor", 2, sine(1, 1)),
    );
    const basis = unwrap(modalBasis(assembly));
    const transfer = unwrap(modalTransfer(assembly, basis, [0, 1]));
    const model = unwrap(modelOf(assembly));
    const plain = unwrap(steadySolution(assembly, model.system, [0, 1]));
    const quick = unwrap(steadySolution(assembly, model.system, [0, 1], () => [{ transfer, checkHz: [] }]));
    for (const hz of [0.3, 2, 4.4, 9, 40]) {
      const exact = unwrap(plain.at(hz)).map(({ xRe, xIm }) => [...xRe, ...xIm]);
      const fast = unwrap(quick.quick(hz)).map(({ xRe, xIm }) => [...xRe, ...xIm]);
      const scale = Math.max(...exact[0].map(Math.abs));
      exact[0].forEach((v, i) => {
        expect(Math.abs(v - fast[0][i])).toBeLessThan(1e-11 * scale);
      });
    }
  });

  it.each([7, 8, 9])(
    "superposition of the mode table's own roots agrees with the factorisation (seed %d)",
    (seed) => {
      const assembly = mesh(seed);
      const basis = unwrap(modalBasis(assembly));
      const transfer = symmetricTransfer(assembly, basis, [0, 1]);
      expect(transfer).toBeDefined();
      if (transfer === undefined) return;
      const model = unwrap(modelOf(assembly));
      const plain = unwrap(steadySolution(assembly, model.system, [0, 1]));
      const quick = unwrap(steadySolution(assembly, model.system, [0, 1], () => [{ transfer, checkHz: [] }]));
      for (const hz of [0.3, 2, 4.4, 9, 40]) {
        const [exact] = unwrap(plain.at(hz)).map(({ xRe, xIm }) => [...xRe, ...xIm]);
        const [fast] = unwrap(quick.quick(hz)).map(({ xRe, xIm }) => [...xRe, ...xIm]);
        const scale = Math.max(...exact.map(Math.abs));
        exact.forEach((v, i) => {
          expect(Math.abs(v - fast[i])).toBeLessThan(1e-11 * scale);
        });
      }
    },
  );

  it("has no superposition of its own where something floats, relaxes, or a support moves", () => {
    const free = sketch({ masses: { a: 1, b: 2 }, joints: [{ a: "a", b: "b", stiffness: 100, damping: 1 }] });
    const relaxing = sketch({
      masses: { a: 1 },
      junctions: ["j"],
      joints: [
        { a: "a", stiffness: 50 },
        { a: "a", b: "j", stiffness: 100 },
        { a: "j", damping: 1 },
      ],
    });
    for (const base of [free, relaxing]) {
      const assembly = withDrives(base, forceOn(base, "a", unit));
      expect(symmetricTransfer(assembly, unwrap(modalBasis(assembly)), [0])).toBeUndefined();
    }
    const stood = sketch({
      masses: { a: 1 },
      supports: ["floor"],
      joints: [{ a: "a", b: "floor", stiffness: 9 }],
    });
    const moved = withDrives(stood, motionDrive(stood, "floor", 0, unit));
    expect(symmetricTransfer(moved, unwrap(modalBasis(moved)), [0])).toBeUndefined();
  });

  // Many points at a time against one by one; both are exact, so that only rounding may part them.
  it.each(["chain", "mesh", "shaken chain"] as const)(
    "stored points of a %s are those of single values",
    (kind) => {
      const base = kind === "mesh" ? mesh(11) : chain(9, 12, [{ a: "m8", b: "floor", stiffness: 2e4 }]);
      const assembly =
        kind === "shaken chain" ? withDrives(base, motionDrive(base, "floor", 2, sine(3, 1, 0.4))) : base;
      const response = responseOf(assembly);
      const [first, last] = [assembly.coordinates[0].name, assembly.coordinates[6].name];
      const plain = [motionOf(assembly, first), motionOf(assembly, last, 1), motionOf(assembly, last, 2)];
      for (const of of [plain, [...plain, elementOf(assembly, "force", assembly.elements[1].name)]]) {
        const answer = unwrap(sweepAnswer(unwrap(modelOf(assembly)), sweepAsk(of, { points: 150 })));
        for (const ref of of) {
          const series = answer.series.get(ref.text);
          const scale = Math.max(...(series?.re ?? []).map(Math.abs), ...(series?.im ?? []).map(Math.abs));
          answer.frequencyHz.forEach((f, i) => {
            const [re, im] = unwrap(response.at(ref, f));
            const off = Math.hypot((series?.re[i] ?? Number.NaN) - re, (series?.im[i] ?? Number.NaN) - im);
            expect(off).toBeLessThan(1e-11 * scale);
          });
        }
      }
    },
  );

  it("says why a stored point has no value, beside the series that lacks it", () => {
    const base = sketch({
      masses: { a: 1, b: 1 },
      joints: [
        { a: "a", stiffness: (2 * Math.PI * 4) ** 2 },
        { a: "b", stiffness: (2 * Math.PI * 9) ** 2, damping: 5 },
      ],
    });
    const assembly = withDrives(base, forceOn(base, "a", unit));
    const [a, b] = [motionOf(assembly, "a"), motionOf(assembly, "b")];
    const ask = sweepAsk([a, b], { fromHz: 4, toHz: 8, spacing: "even", points: 5 });
    const answer = unwrap(sweepAnswer(unwrap(modelOf(assembly)), ask));
    expect(answer.frequencyHz[0]).toBe(4);
    expect(answer.series.get(a.text)?.re[0]).toBeNaN();
    expect(answer.series.get(a.text)?.reason).toBe("not damped: mode 1 at 4 Hz has no damping");
    expect(answer.series.get(b.text)?.re.every(Number.isFinite)).toBe(true);
    expect(answer.series.get(b.text)).not.toHaveProperty("reason");
  });

  it("solves a long chain in time that grows with its length only", () => {
    // Work, not time: the band of a chain is two wide whatever its length.
    expect(steadySystem(chain(400, 9)).route).toBe("band");
    const assembly = chain(60, 10);
    const of = assembly.coordinates.map((c) => motionOf(assembly, c.name));
    const answer = unwrap(sweepAnswer(unwrap(modelOf(assembly)), sweepAsk(of, { points: 400, toHz: 40 })));
    expect(answer.series.size).toBe(60);
    const response = responseOf(assembly);
    for (const i of [0, 17, 59]) {
      const own = unwrap(response.peak(of[i], 1, 40));
      const found = answer.peaks.get(of[i].text);
      expect(found && "value" in found ? found.value / own.value : 0).toBeCloseTo(1, 9);
    }
  });
});

describe("axis of a stored sweep", () => {
  const assembly = () => {
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 4e3, damping: 1 }] });
    return withDrives(base, forceOn(base, "m", unit));
  };

  it.each(["log", "even"] as const)("keeps every point of %s spacing exactly", (spacing) => {
    const a = assembly();
    const x = motionOf(a, "m");
    const ask = sweepAsk([x], { spacing, points: 37, fromHz: 2, toHz: 40 });
    const { frequencyHz, series } = unwrap(sweepAnswer(unwrap(modelOf(a)), ask));
    const kept = new Set(frequencyHz);
    for (let i = 0; i < 37; i++) {
      const f = spacing === "log" ? 2 * 20 ** (i / 36) : 2 + (38 * i) / 36;
      expect(kept.has(i === 36 ? 40 : f)).toBe(true);
    }
    for (let i = 1; i < frequencyHz.length; i++) expect(frequencyHz[i]).toBeGreaterThan(frequencyHz[i - 1]);
    expect(frequencyHz.length).toBeGreaterThan(37 + 4);
    const response = responseOf(a);
    const { re, im } = series.get(x.text) ?? { re: [], im: [] };
    frequencyHz.forEach((f, i) => {
      const [r, j] = unwrap(response.at(x, f));
      expect(re[i]).toBeCloseTo(r, 14);
      expect(im[i]).toBeCloseTo(j, 14);
    });
  });

  it("refuses axes that are none", () => {
    const a = assembly();
    const run = (more: Partial<SweepAsk>) =>
      sweepAnswer(unwrap(modelOf(a)), sweepAsk([motionOf(a, "m")], more));
    expect(run({ fromHz: 0 })).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/log spacing cannot start at 0 Hz/),
    });
    expect(run({ fromHz: 5, toHz: 2 })).toMatchObject({ ok: false });
    expect(unwrap(run({ fromHz: 0, spacing: "even" })).frequencyHz[0]).toBe(0);
    expect(unwrap(run({ fromHz: 5, toHz: 5 })).frequencyHz).toEqual(Float64Array.of(5));
  });
});
