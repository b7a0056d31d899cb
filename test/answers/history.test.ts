import { describe, expect, it } from "vitest";
import type { DriveShape, PulseShape, QuantityRef } from "../../shared-core/mechanics/assembly.ts";
import { combineForms } from "../../shared-core/mechanics/forms.ts";
import { sketch } from "../mechanics/helpers.ts";
import { seeded, unwrap } from "../numerics/helpers.ts";
import {
  difference,
  elementOf,
  equationError,
  forceOn,
  historyAsk,
  motionDrive,
  motionOf,
  sine,
  solved,
  startingAt,
  withDrives,
} from "./history-helpers.ts";

const near = (found: number, expected: number, tolerance: number) =>
  expect(Math.abs(found / expected - 1), `${found} instead of ${expected}`).toBeLessThan(tolerance);

/** The printed reference values carry ten digits. */
const PRINTED = 1e-9;

describe("free response in closed form", () => {
  // Source: standard solutions with two real roots and with a double root (closed form).
  it("decays with two real roots", () => {
    const base = sketch({ masses: { m: 2 }, joints: [{ a: "m", stiffness: 50, damping: 30 }] });
    const assembly = startingAt(base, { m: [0.1, 0] });
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(2, [x]));
    near(unwrap(response.at(x, 0.1)), 0.09211332218, PRINTED);
    near(unwrap(response.at(x, 0.5)), 0.04503386952, PRINTED);
    near(unwrap(response.at(x, 1)), 0.01734046502, PRINTED);
  });

  it("follows the double root of critical damping exactly", () => {
    const base = sketch({ masses: { m: 2 }, joints: [{ a: "m", stiffness: 50, damping: 20 }] });
    const assembly = startingAt(base, { m: [0.05, 1] });
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(2, [x]));
    near(unwrap(response.at(x, 0.1)), 0.1061428654, PRINTED);
    near(unwrap(response.at(x, 0.5)), 0.05540737407, PRINTED);
    near(unwrap(response.at(x, 1)), 0.008759331099, PRINTED);
    // x = (x0 + (v0 + w x0) t) e^(-w t), w = 5: turns at 0.16 s.
    near(unwrap(response.highest(x)).at, 0.16, 1e-9);
    near(unwrap(response.highest(x)).value, 0.112332241, PRINTED);
  });

  // Source: standard underdamped solution (closed form).
  it("swings and decays", () => {
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 400, damping: 4 }] });
    const assembly = startingAt(base, { m: [0, 2] });
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(2, [x]));
    near(unwrap(response.at(x, 0.05)), 0.07627576785, PRINTED);
    near(unwrap(response.at(x, 0.2)), -0.05009243939, PRINTED);
    near(unwrap(response.at(x, 0.5)), -0.0185345707, PRINTED);
    near(unwrap(response.highest(x)).at, 0.07390188312, 1e-9);
    near(unwrap(response.highest(x)).value, 0.08626003697, PRINTED);
    const wd = 20 * Math.sqrt(1 - 0.01);
    const up = unwrap(response.crossings(x, 0, "up"));
    // Upward crossings lie a damped period apart; the start itself is none.
    up.forEach((t, k) => {
      near(t, (2 * Math.PI * (k + 1)) / wd, 1e-12);
    });
    expect(up.length).toBe(Math.floor((2 * wd) / (2 * Math.PI)));
    expect(unwrap(response.crossings(x, 0, "any")).length).toBe(Math.floor((2 * wd) / Math.PI));
    // Mean square of e^(-2 t) sin(wd t) times 2 / wd, integrated by hand.
    const a = 4;
    const b = 2 * wd;
    const whole = (t: number) =>
      0.5 * ((1 - Math.exp(-a * t)) / a) -
      0.5 * ((a - Math.exp(-a * t) * (a * Math.cos(b * t) - b * Math.sin(b * t))) / (a * a + b * b));
    near(unwrap(response.rms(x)), Math.sqrt((whole(2) * (2 / wd) ** 2) / 2), 1e-7);
    expect(unwrap(response.finalValue(x))).toBe(0);
  });

  // Source: linear negative damping (closed form).
  it("grows with negative damping", () => {
    const base = sketch({ masses: { m: 1.5 }, joints: [{ a: "m", stiffness: 600, damping: -1.2 }] });
    const assembly = startingAt(base, { m: [1e-3, 0] });
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(6, [x]));
    near(unwrap(response.at(x, 5)), 0.006372994754, PRINTED);
    expect(response.finalValue(x)).toMatchObject({ ok: false });
  });

  it("says how far a motion that runs away was followed, and keeps that part", () => {
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 1, damping: -100 }] });
    const assembly = startingAt(base, { m: [1, 0] });
    const x = motionOf(assembly, "m");
    const answer = solved(assembly, historyAsk(100, [x])).answer();
    expect(answer.ok).toBe(false);
    if (answer.ok) return;
    expect(answer.reason).toMatch(/grows beyond all bounds; it was followed until \d/);
    const values = answer.upTo?.series.get(x.text)?.values ?? new Float64Array(0);
    expect(values.length).toBeGreaterThan(20);
    expect(values.every(Number.isFinite)).toBe(true);
  });
});

describe("steps, pulses and impulses", () => {
  // Source: second-order step response (closed form).
  it("overshoots a step", () => {
    const k = 20000;
    const w = 2 * Math.PI * 5;
    const m = k / w ** 2;
    const base = sketch({
      masses: { m },
      joints: [{ a: "m", stiffness: k, damping: 0.6 * Math.sqrt(k * m) }],
    });
    const step: DriveShape = { kind: "step", step: 100, start: 0, rise: 0 };
    const assembly = withDrives(base, forceOn(base, "m", step));
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(3, [x], { by: [0] }));
    near(unwrap(response.finalValue(x)), 0.005, 1e-12);
    near(unwrap(response.highest(x)).value, 0.006861630525, PRINTED);
    near(unwrap(response.highest(x)).at, 0.1048284837, 1e-9);
    near(unwrap(response.at(x, 0.074)), 0.005875666349, PRINTED);
  });

  const oscillator = () => {
    const k = 10 * (2 * Math.PI * 10) ** 2;
    return { k, base: sketch({ masses: { m: 10 }, joints: [{ a: "m", stiffness: k }] }) };
  };
  const pulse = (shape: PulseShape, rise = 0, fall = 0): DriveShape => ({
    kind: "pulse",
    shape,
    peak: 500,
    duration: 0.04,
    rise,
    fall,
    start: 0,
  });

  // Source: exact matrix exponential of oscillator and pulse generator, SciPy; textbook shock theory.
  it.each([
    ["rectangle", 1.902113033],
    ["half_sine", 1.373408864],
    ["rising_sawtooth", 1.051209806],
    ["triangle", 1.099733609],
    ["trapezoid", 1.590534773],
  ] as const)("peaks as it should behind a %s", (shape, expected) => {
    const { k, base } = oscillator();
    const assembly = withDrives(base, forceOn(base, "m", pulse(shape, 0.2 * 0.04, 0.3 * 0.04)));
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(0.5, [x], { by: [0] }));
    near(unwrap(response.highest(x)).value / (500 / k), expected, PRINTED);
  });

  // Duhamel's integral in closed form for u = 1 - cos and u = 1 - t/T; derived here by hand.
  it("follows a haversine and a falling sawtooth", () => {
    const { k, base } = oscillator();
    const w = 2 * Math.PI * 10;
    const x = motionOf(base, "m");
    const at = (shape: PulseShape, t: number) => {
      const assembly = withDrives(base, forceOn(base, "m", pulse(shape)));
      return unwrap(solved(assembly, historyAsk(0.5, [x], { by: [0] })).response.at(x, t)) / (500 / k);
    };
    const v = (2 * Math.PI) / 0.04;
    const t = 0.031;
    const haversine =
      0.5 * (1 - Math.cos(w * t)) - (0.5 * w * w * (Math.cos(v * t) - Math.cos(w * t))) / (w * w - v * v);
    near(at("haversine", t), haversine, 1e-11);
    near(at("falling_sawtooth", t), 1 - Math.cos(w * t) - t / 0.04 + Math.sin(w * t) / (w * 0.04), 1e-11);
  });

  // Source: w = sqrt(k (m1 + m2) / (m1 m2)), momentum of the centre of mass (closed form).
  it("carries two free masses on after an impulse", () => {
    const base = sketch({ masses: { a: 4, b: 9 }, joints: [{ a: "a", b: "b", stiffness: 3600 }] });
    const assembly = withDrives(base, forceOn(base, "a", { kind: "impulse", impulse: 2, start: 0 }));
    const travel = elementOf(assembly, "travel", "e1");
    const { response } = solved(assembly, historyAsk(10, [travel], { by: [0] }));
    near(unwrap(response.highest(travel)).value, 0.01386750491, PRINTED);
    // The centre of mass moves on at 2/13 m/s.
    for (const t of [0.1, 3, 10]) {
      const place =
        (4 * unwrap(response.at(motionOf(assembly, "a"), t)) +
          9 * unwrap(response.at(motionOf(assembly, "b"), t))) /
        13;
      near(place, (2 / 13) * t, 1e-12);
    }
    expect(response.finalValue(travel)).toMatchObject({ ok: false });
    expect(response.finalValue(motionOf(assembly, "a"))).toMatchObject({ ok: false });
  });

  it("lets a damped drive train come to one speed", () => {
    const base = sketch({
      inertias: { a: 0.5, b: 1.5 },
      joints: [{ a: "a", b: "b", stiffness: 4e3, damping: 5 }],
    });
    const assembly = withDrives(base, forceOn(base, "a", { kind: "impulse", impulse: 8, start: 0.1 }));
    const { response } = solved(assembly, historyAsk(4, [], { by: [0] }));
    // Angular momentum 8 shared by 2 kg m^2.
    near(unwrap(response.finalValue(motionOf(assembly, "b", 1))), 4, 1e-12);
    expect(Math.abs(unwrap(response.finalValue(elementOf(assembly, "travel", "e1"))))).toBeLessThan(1e-15);
    expect(response.finalValue(motionOf(assembly, "b"))).toMatchObject({ ok: false });
  });

  // Source: velocity shock, a = dv w (closed form); damped: maximum of the closed form, SciPy.
  it("answers a velocity step of the base", () => {
    const w = 2 * Math.PI * 30;
    const base = (z: number) =>
      sketch({
        masses: { m: 1 },
        supports: ["floor"],
        joints: [{ a: "m", b: "floor", stiffness: w * w, damping: 2 * z * w }],
      });
    const step: DriveShape = { kind: "step", step: 2.5, start: 0, rise: 0 };
    const peak = (z: number, of: (a: ReturnType<typeof base>) => QuantityRef) => {
      const assembly = withDrives(base(z), motionDrive(base(z), "floor", 1, step));
      const { response } = solved(assembly, historyAsk(0.5, [], { by: [0] }));
      const quantity = of(assembly);
      const [high, low] = [unwrap(response.highest(quantity)), unwrap(response.lowest(quantity))];
      return Math.max(high.value, -low.value);
    };
    near(
      peak(0, (a) => motionOf(a, "m", 2)),
      471.238898,
      PRINTED,
    );
    near(
      peak(0, (a) => difference(motionOf(a, "m"), motionOf(a, "floor"))),
      0.01326291192,
      PRINTED,
    );
    near(
      peak(0.1, (a) => motionOf(a, "m", 2)),
      414.7582511,
      PRINTED,
    );
  });

  it("takes a jump of the base through its damper as momentum", () => {
    const base = sketch({
      masses: { m: 2 },
      supports: ["floor"],
      joints: [{ a: "m", b: "floor", damping: 6 }],
    });
    const step: DriveShape = { kind: "step", step: 0.01, start: 0, rise: 0 };
    const assembly = withDrives(base, motionDrive(base, "floor", 0, step));
    const { response } = solved(assembly, historyAsk(5, [], { by: [0] }));
    // c s / m at once, then the damper draws the mass after the floor.
    near(unwrap(response.at(motionOf(assembly, "m", 1), 0)), (6 * 0.01) / 2, 1e-14);
    near(unwrap(response.at(motionOf(assembly, "m"), 1)), 0.01 * (1 - Math.exp(-3)), 1e-12);
    near(unwrap(response.finalValue(motionOf(assembly, "m"))), 0.01, 1e-12);
  });
});

describe("steady drives from t = 0", () => {
  it("rises along a straight line at an undamped resonance", () => {
    const w = 2 * Math.PI * 3;
    const base = sketch({ masses: { m: 2 }, joints: [{ a: "m", stiffness: 2 * w * w }] });
    const assembly = withDrives(base, forceOn(base, "m", sine(10, 3)));
    const x = motionOf(assembly, "m");
    const { response } = solved(assembly, historyAsk(20, [x], { by: [0] }));
    // x = F t sin(w t) / (2 m w), closed form of x'' + w^2 x = (F/m) cos(w t).
    for (const t of [0.3, 7.77, 19.95]) {
      near(unwrap(response.at(x, t)), (10 * t * Math.sin(w * t)) / (4 * w), 1e-10);
    }
    near(unwrap(response.highest(x)).value, (10 * 19.75) / (4 * w), 1e-4);
  });

  it("comes to the steady state of a damped model, drives at two rates", () => {
    const base = sketch({
      masses: { a: 3, b: 1 },
      joints: [
        { a: "a", stiffness: 900, damping: 9 },
        { a: "a", b: "b", stiffness: 300, damping: 5 },
      ],
    });
    const assembly = withDrives(base, forceOn(base, "a", sine(5, 2, 0.4)), forceOn(base, "b", sine(3, 3.7)));
    const run = solved(assembly, historyAsk(60, [], { by: [0, 1] }));
    for (const t of [0.01, 1.234, 59.9]) {
      const f = [5 * Math.cos(4 * Math.PI * t + 0.4), 3 * Math.cos(7.4 * Math.PI * t)];
      expect(equationError(assembly, run, t, Float64Array.from(f))).toBeLessThan(1e-11);
    }
  });

  it("balances its energy: work of the force is heat and what is stored", () => {
    const base = sketch({
      masses: { m: 3 },
      joints: [
        { a: "m", stiffness: 800 },
        { a: "m", damping: 7 },
      ],
    });
    const assembly = withDrives(base, forceOn(base, "m", sine(20, 2.3)));
    const { response } = solved(assembly, historyAsk(4, [], { by: [0] }));
    const v = motionOf(assembly, "m", 1);
    const heat = elementOf(assembly, "power", "e2");
    const stored = elementOf(assembly, "energy", "e1");
    // Simpson's rule on 8,000 points: error far below the tolerance.
    const n = 8000;
    let balance = 0;
    let size = 0;
    for (let i = 0; i <= n; i++) {
      const t = (4 * i) / n;
      const weight = ((i === 0 || i === n ? 1 : i % 2 ? 4 : 2) * 4) / (3 * n);
      const work = 20 * Math.cos(2 * Math.PI * 2.3 * t) * unwrap(response.at(v, t));
      balance += weight * (work - unwrap(response.at(heat, t)));
      size += weight * Math.abs(work);
    }
    const end = 1.5 * unwrap(response.at(v, 4)) ** 2 + unwrap(response.at(stored, 4));
    expect(Math.abs(balance - end)).toBeLessThan(1e-9 * size);
  });
});

describe("starts", () => {
  it("stays where gravity, preloads and standing loads hold it", () => {
    const base = sketch({
      masses: { a: 3, b: 2 },
      weights: { a: 1, b: -1 },
      joints: [
        { a: "a", stiffness: 500, preload: 4 },
        { a: "a", b: "b", stiffness: 200, damping: 3 },
      ],
    });
    const assembly = withDrives(base, forceOn(base, "b", { kind: "step", step: 7, start: -1, rise: 0 }));
    const { response } = solved(assembly, historyAsk(5, [], { by: [0], start: "at_rest" }));
    const g = 9.80665;
    const a = (3 * g - 2 * g + 7 - 4) / 500;
    for (const t of [0, 2.5, 5]) {
      near(unwrap(response.at(motionOf(assembly, "a"), t)), a, 1e-12);
      near(unwrap(response.at(motionOf(assembly, "b"), t)), a + (7 - 2 * g) / 200, 1e-12);
      near(unwrap(response.at(elementOf(assembly, "force", "e1"), t)), 500 * a + 4, 1e-12);
    }
  });

  it("drops from the written place under gravity", () => {
    const base = sketch({ masses: { m: 3 }, weights: { m: 1 }, joints: [{ a: "m", stiffness: 500 }] });
    const x = motionOf(base, "m");
    const { response } = solved(base, historyAsk(2, [x]));
    near(unwrap(response.highest(x)).value, (2 * 3 * 9.80665) / 500, 1e-12);
  });

  it("falls freely where nothing holds it, and has no equilibrium there", () => {
    const base = sketch({ masses: { m: 3, n: 1 }, weights: { m: 1 }, joints: [{ a: "n", stiffness: 5 }] });
    const { response } = solved(base, historyAsk(2, []));
    near(unwrap(response.at(motionOf(base, "m"), 1.5)), 0.5 * 9.80665 * 2.25, 1e-12);
    expect(() => solved(base, historyAsk(2, [], { start: "at_rest" }))).toThrow(/no equilibrium/);
  });
});

describe("places without inertia, supports and damping of every kind", () => {
  const model = () =>
    sketch({
      masses: { a: 4, b: 1.5 },
      junctions: ["j", "k", "l"],
      supports: ["floor", "wall"],
      joints: [
        { a: "a", b: "floor", stiffness: 4e3, damping: 20 },
        { a: "a", b: "j", stiffness: 2e3 },
        { a: "j", b: "b", damping: 50 },
        { a: "b", b: "k", stiffness: 900 },
        { a: "k", b: "wall", stiffness: 700 },
        { a: "b", b: "l", damping: 8 },
        { a: "l", b: "floor", damping: 9 },
        { a: "a", b: "wall", inertance: 0.7 },
      ],
      massDamping: 0.3,
      stiffnessDamping: 2e-4,
    });

  it("satisfies the equations of motion of every coordinate", () => {
    const base = model();
    const next = seeded(12);
    const times = Float64Array.from({ length: 400 }, (_, i) => i * 0.01);
    const values = times.map(() => 3 * next());
    const pulse: DriveShape = {
      kind: "pulse",
      shape: "half_sine",
      peak: 30,
      duration: 0.3,
      rise: 0,
      fall: 0,
      start: 0.5,
    };
    const assembly = withDrives(
      base,
      forceOn(base, "k", { kind: "record", samples: { times, values } }),
      motionDrive(base, "floor", 2, pulse),
      motionDrive(base, "wall", 1, sine(0.2, 1.3)),
      forceOn(base, "a", { kind: "step", step: 5, start: 1, rise: 0.25 }),
    );
    const run = solved(assembly, historyAsk(3.9, [], { by: [0, 1, 2, 3] }));
    for (const t of [0.003, 0.61, 0.999, 1.2, 3.8765]) {
      const i = Math.floor(t / 0.01);
      const f = new Float64Array(5);
      const share = (t - times[i]) / (times[i + 1] - times[i]);
      f[3] = values[i] + share * (values[i + 1] - values[i]);
      f[0] = t < 1 ? 0 : 5 * Math.min(1, (t - 1) / 0.25);
      f[1] = 0;
      // Free coordinates stand in the order a, b, j, k, l.
      expect(equationError(assembly, run, t, f)).toBeLessThan(1e-9);
    }
    // The junction between a spring and a damper has not moved at the start, nor has anything else.
    expect(unwrap(run.response.at(motionOf(assembly, "j"), 0))).toBe(0);
    expect(unwrap(run.response.at(motionOf(assembly, "floor", 2), 0.65))).toBeCloseTo(30, 9);
  });

  // A loss factor stands as the modal damping of the mode; base motion is damped by motion relative to the base.
  it("damps relative motion by loss factors and modal damping, as a damper would", () => {
    const w = 2 * Math.PI * 4;
    const joints = [{ a: "m", b: "floor", stiffness: 2 * w * w }];
    const viscous = sketch({
      masses: { m: 2 },
      supports: ["floor"],
      joints: [{ ...joints[0], damping: 2 * 0.06 * w * 2 }],
    });
    const lossy = sketch({
      masses: { m: 2 },
      supports: ["floor"],
      joints: [{ ...joints[0], lossFactor: 0.08 }],
      modalDamping: 0.02,
    });
    const drive = (a: typeof lossy) => withDrives(a, motionDrive(a, "floor", 0, sine(0.01, 3, -Math.PI / 2)));
    const [one, two] = [drive(viscous), drive(lossy)];
    const x = motionOf(one, "m");
    const [ra, rb] = [one, two].map((a) => solved(a, historyAsk(5, [x], { by: [0] })).response);
    for (const t of [0.02, 1.7, 5]) near(unwrap(rb.at(x, t)), unwrap(ra.at(x, t)), 1e-11);
  });

  it("moves bound coordinates and sums with their masters", () => {
    const base = sketch({
      inertias: { wheel: 2, pinion: 0.1 },
      binds: { pinion: { wheel: -3 } },
      joints: [{ a: "pinion", stiffness: 50 }],
    });
    const assembly = withDrives(base, forceOn(base, "wheel", { kind: "step", step: 1, start: 0, rise: 0 }));
    const { response } = solved(assembly, historyAsk(3, [], { by: [0] }));
    // One coordinate: (2 + 9 * 0.1) q'' + 9 * 50 q = 1.
    const w = Math.sqrt(450 / 2.9);
    near(unwrap(response.at(motionOf(assembly, "pinion"), 0.7)), (-3 * (1 - Math.cos(w * 0.7))) / 450, 1e-12);
    const both = combineForms([assembly.coordinates[0].form], [1]);
    expect(both.coordinates).toEqual([0]);
  });
});

describe("chirps and laws", () => {
  const base = () => sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 400, damping: 2 }] });

  it("is a steady sine when it does not change its rate", () => {
    const a = base();
    const x = motionOf(a, "m");
    const run = (shape: DriveShape) =>
      solved(withDrives(a, forceOn(a, "m", shape)), historyAsk(6, [x], { by: [0] })).response;
    const chirp = run({ kind: "chirp", fromHz: 4, toHz: 4, amplitude: 3, lasting: 10, phase: 0.3 });
    const law = run({
      kind: "law",
      law: { at: (t) => 3 * Math.cos(8 * Math.PI * t + 0.3), kinks: [], fastestHz: 0 },
    });
    const exact = run(sine(3, 4, 0.3));
    for (const t of [0.5, 2.222, 6]) {
      near(unwrap(chirp.at(x, t)), unwrap(exact.at(x, t)), 1e-9);
      near(unwrap(law.at(x, t)), unwrap(exact.at(x, t)), 1e-9);
    }
    near(unwrap(chirp.highest(x)).value, unwrap(exact.highest(x)).value, 1e-9);
  });

  it("satisfies the equation of motion through a run-up", () => {
    const a = base();
    const assembly = withDrives(
      a,
      forceOn(a, "m", { kind: "chirp", fromHz: 1, toHz: 9, unbalance: 0.02, lasting: 8, phase: 0 }),
    );
    const run = solved(assembly, historyAsk(12, [motionOf(a, "m")], { by: [0] }));
    for (const t of [0.7, 3.3, 7.99, 11]) {
      const hz = t < 8 ? 1 + t : 9;
      const turns = t < 8 ? t + (t * t) / 2 : 40 + 9 * (t - 8);
      const f = 0.02 * (2 * Math.PI * hz) ** 2 * Math.cos(2 * Math.PI * turns);
      expect(equationError(assembly, run, t, Float64Array.of(f))).toBeLessThan(1e-8);
    }
  });

  it("meets jumps of a law that were not announced", () => {
    const a = base();
    const x = motionOf(a, "m");
    const run = (shape: DriveShape) =>
      solved(withDrives(a, forceOn(a, "m", shape)), historyAsk(3, [x], { by: [0] })).response;
    const law = run({ kind: "law", law: { at: (t) => (t < Math.SQRT1_2 ? 0 : 2), kinks: [], fastestHz: 0 } });
    const step = run({ kind: "step", step: 2, start: Math.SQRT1_2, rise: 0 });
    for (const t of [0.9, 2.5]) near(unwrap(law.at(x, t)), unwrap(step.at(x, t)), 1e-9);
  });

  it("names the drive and the time where a law has no value", () => {
    const a = base();
    const assembly = withDrives(
      a,
      forceOn(a, "m", { kind: "law", law: { at: (t) => Math.sqrt(1 - t), kinks: [], fastestHz: 0 } }),
    );
    expect(() => solved(assembly, historyAsk(2, [], { by: [0] }))).toThrow(
      /force f_m: it has no finite value at t = 1\.0/,
    );
  });
});

describe("stored answers", () => {
  it("stands at multiples of the step and holds the exact values", () => {
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 400, damping: 4 }] });
    const assembly = startingAt(base, { m: [0, 2] });
    const x = motionOf(assembly, "m");
    const run = solved(assembly, historyAsk(1, [x], { step: 0.05 }));
    const { timeS, series, peaks } = unwrap(run.answer());
    expect(timeS.length).toBe(21);
    timeS.forEach((t, i) => {
      expect(t).toBeCloseTo(0.05 * i, 14);
      expect(series.get(x.text)?.values[i]).toBeCloseTo(unwrap(run.response.at(x, t)), 14);
    });
    near(peaks.get(x.text)?.value ?? 0, 0.08626003697, PRINTED);
  });

  it("finds peaks that a coarse step would step over, and holds the value after a jump", () => {
    const base = sketch({
      masses: { m: 1 },
      joints: [{ a: "m", stiffness: (2 * Math.PI * 50) ** 2, damping: 3 }],
    });
    const assembly = withDrives(base, forceOn(base, "m", { kind: "step", step: 6, start: 0.5, rise: 0 }));
    const x = motionOf(assembly, "m", 2);
    const { series, peaks } = unwrap(solved(assembly, historyAsk(2, [x], { by: [0], step: 0.5 })).answer());
    expect(series.get(x.text)?.values[1]).toBeCloseTo(6, 12);
    expect(peaks.get(x.text)).toEqual({ value: expect.closeTo(6, 12), at: expect.closeTo(0.5, 12) });
    const place = motionOf(assembly, "m");
    const w = 2 * Math.PI * 50;
    const z = 3 / (2 * w);
    const over = 1 + Math.exp((-Math.PI * z) / Math.sqrt(1 - z * z));
    const found = unwrap(solved(assembly, historyAsk(2, [place], { by: [0], step: 0.5 })).answer());
    near(found.peaks.get(place.text)?.value ?? 0, (6 / (w * w)) * over, 1e-11);
  });

  it("refuses what makes no answer, with the numbers", () => {
    const base = sketch({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 400 }] });
    const x = motionOf(base, "m");
    expect(solved(base, historyAsk(10, [x], { step: 1e-9 })).answer()).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/a step of 1e-9 s over 10 s makes/),
    });
    expect(() => solved(base, historyAsk(0, [x]))).toThrow(/duration above zero/);
    const none = withDrives(base, forceOn(base, "m", { kind: "none" }));
    expect(() => solved(none, historyAsk(1, [x], { by: [0] }))).toThrow(
      /force f_m: it says nothing about time/,
    );
  });
});
