import { describe, expect, it } from "vitest";
import { staticResponse } from "../../shared-core/answers/statics.ts";
import { type SystemSketch, sketch } from "../mechanics/helpers.ts";
import { unwrap } from "../numerics/helpers.ts";

const statics = (system: SystemSketch) => unwrap(staticResponse(sketch(system)));

describe("static response", () => {
  it("sags by m g / k, each spring under what hangs on it", () => {
    const s = statics({
      masses: { a: 3, b: 2 },
      gravity: 10,
      joints: [
        { a: "a", stiffness: 100 },
        { a: "b", b: "a", stiffness: 40 },
        { a: "b", b: "a", damping: 7 },
      ],
    });
    expect(unwrap(s.element(0)).travel).toBeCloseTo(0.5, 14);
    expect(unwrap(s.element(0)).force).toBeCloseTo(50, 12);
    expect(unwrap(s.element(1)).force).toBeCloseTo(20, 12);
    expect(unwrap(s.element(2))).toMatchObject({ travel: unwrap(s.element(1)).travel, force: 0 });
    expect(s.element(3).ok).toBe(false);
  });

  it("carries loads through junctions, levers and a spring's own mass", () => {
    // Lever 2:1 on a spring: force at the spring is twice the weight, and half a spring's mass rides along.
    const s = statics({
      masses: { heel: 0, tip: 6 },
      gravity: 10,
      junctions: ["j"],
      binds: { tip: { heel: 2 } },
      joints: [
        { a: "heel", b: "j", stiffness: 500, mass: 2 },
        { a: "j", stiffness: 300 },
      ],
    });
    expect(unwrap(s.element(0)).force).toBeCloseTo(120 + 10, 10);
    expect(unwrap(s.element(1)).force).toBeCloseTo(120 + 20, 10);
  });

  it("says what nothing holds, and answers for the rest", () => {
    const s = statics({
      masses: { hung: 1, falling: 2, with_it: 3 },
      gravity: 10,
      joints: [
        { a: "hung", stiffness: 100 },
        { a: "falling", b: "with_it", stiffness: 50 },
        { a: "with_it", damping: 5 },
      ],
    });
    expect(unwrap(s.element(0)).travel).toBeCloseTo(0.1, 14);
    const loose = s.element(1);
    expect(loose.ok ? "" : loose.reason).toBe("no spring holds falling against its weight");
  });

  it("leaves free motions alone that gravity does not work on", () => {
    const s = statics({
      masses: { m: 1 },
      inertias: { r: 1, q: 2 },
      gravity: 10,
      joints: [
        { a: "m", stiffness: 100 },
        { a: "r", b: "q", stiffness: 5 },
      ],
    });
    expect(unwrap(s.element(0)).travel).toBeCloseTo(0.1, 14);
    expect(unwrap(s.element(1)).travel).toBe(0);
  });
});
