import { describe, expect, test } from "vitest";
import { limitAt } from "../../shared-core/judgement/limit-curve.ts";
import type { LimitCurve } from "../../shared-core/model/model.ts";
import { NUMBER } from "../../shared-core/units/quantity.ts";

const curve = (betweenPoints: LimitCurve["betweenPoints"]): LimitCurve => ({
  name: "zone",
  points: [
    { atHz: 1, value: 4 },
    { atHz: 10, value: 40 },
    { atHz: 10, value: 20 },
    { atHz: 100, value: 20 },
  ],
  betweenPoints,
  of: "peak",
  bands: "none",
  kind: NUMBER,
});

describe("a limit curve", () => {
  test("is straight on log-log paper by default: one decade up in one decade", () => {
    expect(limitAt(curve("log_log"), Math.sqrt(10))).toBeCloseTo(4 * Math.sqrt(10), 12);
  });
  test("can be straight on plain paper", () => {
    expect(limitAt(curve("straight"), 5.5)).toBeCloseTo(22, 12);
  });
  test("holds its points and does not judge outside its ends", () => {
    expect(limitAt(curve("log_log"), 1)).toBe(4);
    expect(limitAt(curve("log_log"), 100)).toBe(20);
    expect(limitAt(curve("log_log"), 10)).toBe(20);
    expect(limitAt(curve("log_log"), 0.99)).toBeUndefined();
    expect(limitAt(curve("log_log"), 101)).toBeUndefined();
  });
});
