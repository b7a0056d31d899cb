import { describe, expect, it } from "vitest";
import { driveSignal } from "../../shared-core/answers/drive-history.ts";
import { driveGroups, drivePhasor } from "../../shared-core/answers/drive-phasor.ts";
import { recordSignal } from "../../shared-core/answers/drive-record.ts";
import {
  integrated,
  laterSignal,
  type Signal,
  signalDerivatives,
  signalFrom,
} from "../../shared-core/answers/drive-signal.ts";
import { smoothSignal } from "../../shared-core/answers/drive-smooth.ts";
import type { DriveInfo, DriveShape, PulseShape } from "../../shared-core/mechanics/assembly.ts";
import { groundForm } from "../../shared-core/mechanics/forms.ts";
import { unwrap } from "../numerics/helpers.ts";

const drive = (shape: DriveShape, more: Partial<DriveInfo> = {}): DriveInfo => ({
  name: "d",
  keyword: "force",
  on: { kind: "form", form: groundForm },
  derivative: 0,
  shape,
  unit: "N",
  ...more,
});
const motion = (shape: DriveShape, derivative: 0 | 1 | 2) =>
  drive(shape, { keyword: "motion", on: { kind: "support", support: 0 }, derivative });
const options = { lasting: 10, tolerance: 1e-10, finer: 1 };
const signalOf = (d: DriveInfo): Signal => unwrap(driveSignal(d, options)).signal;

/** Derivative `order` at a time, from the piece that holds there. */
function valueAt(signal: Signal, time: number, order = 0): number {
  let piece = 0;
  while (piece + 1 < signal.starts.length && signal.starts[piece + 1] <= time) piece++;
  const out = new Float64Array(5);
  signalDerivatives(signal, piece, time - signal.starts[piece], out);
  return out[order];
}

describe("a signal with its clock set back", () => {
  const whole = signalFrom(
    [
      { start: 0, polynomial: [1, 2, -3], sine: [0.5, -0.2] },
      { start: 1, polynomial: [4, 0, 0, 2], sine: [1, 1] },
      { start: 3, polynomial: [-1] },
    ],
    7,
    [
      { time: 2, size: 5 },
      { time: 4, size: 6 },
    ],
  );

  it.each([0, 0.4, 1, 2, 3.5])("is the same %j s later", (by) => {
    const later = laterSignal(whole, by, Number.POSITIVE_INFINITY, 1e-12);
    for (const t of [0, 0.3, 0.9, 1.7, 4]) {
      for (const order of [0, 1, 2])
        expect(valueAt(later, t, order)).toBeCloseTo(valueAt(whole, by + t, order), 10);
    }
    expect(later.impulses.map(({ time }) => time + by)).toEqual([2, 4].filter((time) => time > by));
  });

  it("leaves out what begins beyond an end", () => {
    expect([...laterSignal(whole, 0.5, 2, 1e-12).starts]).toEqual([0, 0.5]);
    expect([...laterSignal(whole, 3.5, 3.6, 1e-12).starts]).toEqual([0]);
  });
});

describe("pulses", () => {
  const at = (shape: PulseShape, time: number) =>
    valueAt(
      signalOf(drive({ kind: "pulse", shape, peak: 6, duration: 2, rise: 0.5, fall: 1, start: 1 })),
      time,
    );

  // Definitions of the shapes, evaluated by hand at a quarter, the middle and nine tenths of the base.
  it.each([
    ["half_sine", 6 * Math.SQRT1_2, 6, 6 * Math.sin(0.9 * Math.PI)],
    ["haversine", 3, 6, 3 * (1 - Math.cos(1.8 * Math.PI))],
    ["triangle", 3, 6, 1.2],
    ["rectangle", 6, 6, 6],
    ["rising_sawtooth", 1.5, 3, 5.4],
    ["falling_sawtooth", 4.5, 3, 0.6],
    ["trapezoid", 6, 6, 1.2],
  ] as const)("%s", (shape, quarter, middle, late) => {
    expect(at(shape, 1.5)).toBeCloseTo(quarter, 13);
    expect(at(shape, 2)).toBeCloseTo(middle, 13);
    expect(at(shape, 2.8)).toBeCloseTo(late, 12);
    expect(at(shape, 0.99)).toBe(0);
    expect(at(shape, 3)).toBe(0);
  });

  it("refuses durations that make no pulse", () => {
    const bad = (more: object) =>
      driveSignal(
        drive({
          kind: "pulse",
          shape: "trapezoid",
          peak: 1,
          duration: 2,
          rise: 0,
          fall: 0,
          start: 0,
          ...more,
        }),
        options,
      );
    expect(bad({ duration: 0 })).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/above zero, found 0 s/),
    });
    expect(bad({ rise: 1.5, fall: 1 })).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/1.5 s and 1 s in 2 s/),
    });
  });

  it("is cut at t = 0 where it begins before", () => {
    const signal = signalOf(
      drive({ kind: "pulse", shape: "half_sine", peak: 6, duration: 2, rise: 0, fall: 0, start: -0.5 }),
    );
    expect(signal.starts[0]).toBe(0);
    expect(valueAt(signal, 0)).toBeCloseTo(6 * Math.SQRT1_2, 13);
    expect(valueAt(signal, 1.5)).toBe(0);
  });
});

describe("motions from their derivatives", () => {
  it("integrates an acceleration twice from rest", () => {
    const a = signalOf(
      motion({ kind: "pulse", shape: "half_sine", peak: 8, duration: 0.5, rise: 0, fall: 0, start: 1 }, 2),
    );
    const w = Math.PI / 0.5;
    expect(valueAt(a, 0.9)).toBe(0);
    expect(valueAt(a, 1.3, 2)).toBeCloseTo(8 * Math.sin(w * 0.3), 12);
    expect(valueAt(a, 1.3, 1)).toBeCloseTo((8 / w) * (1 - Math.cos(w * 0.3)), 12);
    expect(valueAt(a, 1.3)).toBeCloseTo((8 / w) * (0.3 - Math.sin(w * 0.3) / w), 12);
    // Afterwards it coasts at 2 a T / pi.
    expect(valueAt(a, 4, 1)).toBeCloseTo((2 * 8 * 0.5) / Math.PI, 12);
    expect(valueAt(a, 4)).toBeCloseTo((8 / w) * 0.5 + ((2 * 8 * 0.5) / Math.PI) * 2.5, 11);
  });

  it("turns an impulse into a step when integrated", () => {
    const step = integrated(signalFrom([{ start: 0, polynomial: [0] }], 0, [{ time: 2, size: 3 }]));
    expect(valueAt(step, 1.99)).toBe(0);
    expect(valueAt(step, 2)).toBe(3);
    expect(step.jumps[1]).toBe(0);
  });

  it("holds a measured displacement at its end, and lets an acceleration end", () => {
    const samples = { times: Float64Array.of(0, 1, 2), values: Float64Array.of(0, 4, 2) };
    const place = signalOf(motion({ kind: "record", samples }, 0));
    expect(valueAt(place, 5)).toBe(2);
    const push = signalOf(motion({ kind: "record", samples }, 2));
    expect(valueAt(push, 5, 2)).toBe(0);
    expect(valueAt(push, 5, 1)).toBeCloseTo(5, 13);
    expect(valueAt(push, 0.5, 2)).toBe(2);
  });

  it("refuses an impulse of a motion", () => {
    expect(driveSignal(motion({ kind: "impulse", impulse: 1, start: 0 }, 1), options)).toMatchObject({
      ok: false,
      reason: "motion d: an impulse is momentum given to a mass; write a sudden change of motion as a step",
    });
  });
});

describe("records", () => {
  it("is linear between samples, zero before them, and knows where it jumps", () => {
    const signal = unwrap(
      recordSignal({ times: Float64Array.of(1, 2, 4), values: Float64Array.of(3, 5, 1) }, "zero"),
    );
    expect([0.5, 1, 1.5, 3, 4, 9].map((t) => valueAt(signal, t))).toEqual([0, 3, 4, 3, 0, 0]);
    expect(Array.from(signal.jumps)).toEqual([0, 0, 1, 0]);
  });

  it("takes the line through t = 0 from samples before it", () => {
    const signal = unwrap(
      recordSignal({ times: Float64Array.of(-3, -1, 1), values: Float64Array.of(9, 2, 6) }, "zero"),
    );
    expect(valueAt(signal, 0)).toBe(4);
    expect(valueAt(signal, 0.5)).toBe(5);
  });

  it("refuses samples that are none", () => {
    const bad = (times: number[], values: number[]) =>
      recordSignal({ times: Float64Array.from(times), values: Float64Array.from(values) }, "zero");
    expect(bad([], [])).toMatchObject({ ok: false });
    expect(bad([0, 1, 1], [1, 2, 3])).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/sample 3 is at 1 s/),
    });
    expect(bad([0, 1], [1, Number.NaN])).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/sample 2/),
    });
  });
});

describe("interpolated drives", () => {
  it("gains eight orders in two halvings of its pieces: the order of the interpolation", () => {
    // Error of fixed pieces, measured by forbidding any halving.
    const f = (t: number) => Math.sin(t);
    const errorOf = (pieces: number) => {
      const made = unwrap(
        smoothSignal(f, { lasting: 2 * 256, kinks: [], fastestHz: 0, tolerance: 1, finer: pieces / 256 }),
      );
      return made.error;
    };
    const [coarse, fine] = [errorOf(256), errorOf(512)];
    // Halving once divides the error by about 2^8.
    expect(coarse / fine).toBeGreaterThan(2 ** 7.3);
    expect(coarse / fine).toBeLessThan(2 ** 8.7);
  });

  it("meets its tolerance at every instant", () => {
    const f = (t: number) => Math.exp(-0.3 * t) * Math.cos(40 * t * t);
    const { signal, error } = unwrap(
      smoothSignal(f, { lasting: 3, kinks: [], fastestHz: 0, tolerance: 1e-10, finer: 1 }),
    );
    expect(error).toBeLessThan(1e-10);
    for (let t = 0; t < 3; t += 0.00137) expect(Math.abs(valueAt(signal, t) - f(t))).toBeLessThan(2e-10);
  });

  it("says when a function changes too fast to be followed", () => {
    const noise = (t: number) => Math.sin(1e12 * t);
    expect(
      smoothSignal(noise, { lasting: 1, kinks: [], fastestHz: 0, tolerance: 1e-10, finer: 1 }),
    ).toMatchObject({
      ok: false,
      reason: expect.stringMatching(/changes too fast/),
    });
  });

  it("lets a run-up stay at its final rate", () => {
    const signal = signalOf(drive({ kind: "chirp", fromHz: 2, toHz: 5, amplitude: 3, lasting: 4, phase: 0 }));
    expect(valueAt(signal, 1)).toBeCloseTo(3 * Math.cos(2 * Math.PI * (2 + 0.375)), 9);
    expect(valueAt(signal, 6.1)).toBeCloseTo(3 * Math.cos(2 * Math.PI * (14 + 5 * 2.1)), 9);
  });
});

describe("phasors", () => {
  it("pulls with the square of the speed when unbalanced", () => {
    const [re, im] = drivePhasor(drive({ kind: "unbalance", unbalance: 0.5, phase: Math.PI / 2 }), 3);
    expect(re).toBeCloseTo(0, 12);
    expect(im).toBeCloseTo(0.5 * (6 * Math.PI) ** 2, 10);
    expect(drivePhasor(drive({ kind: "none" }), 3)).toEqual([1, 0]);
  });

  it("groups drives by the ratio of their frequencies to the first", () => {
    const sine = (order: number, more: Partial<DriveInfo>) =>
      drive({ kind: "sine", phase: 0, order, speed: [10, 25] }, more);
    const groups = (drives: DriveInfo[]) =>
      unwrap(
        driveGroups(
          drives,
          drives.map((_, i) => i),
        ),
      ).map(({ ratio, drives: d }) => [ratio, [...d]]);
    expect(
      groups([sine(1, { writtenHz: 20 }), sine(1, { writtenHz: 50 }), sine(1, { writtenHz: 20 })]),
    ).toEqual([
      [1, [0, 2]],
      [2.5, [1]],
    ]);
    // Ranges: bands in one ratio, else orders.
    expect(groups([sine(1, { bandHz: [10, 25] }), sine(2, { bandHz: [20, 50] })])).toEqual([
      [1, [0]],
      [2, [1]],
    ]);
    expect(groups([sine(1, {}), sine(3, {})])).toEqual([
      [1, [0]],
      [3, [1]],
    ]);
  });
});
