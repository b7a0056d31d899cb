import { describe, expect, test } from "vitest";
import type { FrequencyResponse } from "../../shared-core/answers/analysis.ts";
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import { frequencyByEnergy, imbalanceAt } from "../../shared-core/judgement/own-checks.ts";
import { elasticModes } from "../../shared-core/judgement/shapes.ts";
import { sketch } from "../mechanics/helpers.ts";
import { contextOf, steadyForce } from "./hand-made.ts";

/** Two turning masses on a weld a million million times stiffer than the hair that holds them. */
const graded = {
  ...sketch({
    inertias: { dial: 1, hub: 1 },
    joints: [
      { name: "weld", a: "dial", b: "hub", stiffness: 5e9 },
      { name: "hair", a: "hub", stiffness: 1e-3 },
    ],
  }),
  drives: [{ ...steadyForce(0, 1e-3), unit: "N*m" }],
};

describe("energies added up element by element", () => {
  test("give the frequency of a soft mode to all digits, and show a mode that is off", () => {
    const context = contextOf(graded);
    if (!context.modes.ok) throw new Error(context.modes.reason);
    const [soft] = elasticModes(context.modes.value);
    // Both move as one on the hair, corrected by hair/(4 weld) of itself, which is below rounding; closed form.
    const exact = Math.sqrt(1e-3 / 2) / (2 * Math.PI);
    expect((frequencyByEnergy(graded, soft) ?? 0) / exact).toBeCloseTo(1, 12);
  });

  test("balance the exact response of one oscillator and not one that is off by a thousandth", () => {
    const one = {
      ...sketch({ masses: { m: 2 }, joints: [{ a: "m", stiffness: 50 }] }),
      drives: [steadyForce(0, 0.1)],
    };
    const responding = (share: number): FrequencyResponse => ({
      at: (_quantity, hertz) => ({ ok: true, value: [share / (50 - 2 * (2 * Math.PI * hertz) ** 2), 0] }),
      peak: () => ({ ok: false, reason: "not asked" }),
      least: () => ({ ok: false, reason: "not asked" }),
    });
    expect(imbalanceAt(one, responding(1), [0], 0.1)).toBeLessThan(1e-15);
    expect(imbalanceAt(one, responding(1.001), [0], 0.1)).toBeGreaterThan(4e-4);
  });

  test("take drives that cancel each other for no lack of balance", () => {
    // A shaker against its counter-phase: by hand nothing moves, and rounding of sin(180 deg) is all that is left.
    const still = sketch({ masses: { m: 5 }, joints: [{ a: "m", stiffness: 2e3, damping: 1e-3 }] });
    const drives = [0, Math.PI].map((phase) => {
      const drive = steadyForce(0, 1);
      return { ...drive, shape: { kind: "sine", amplitude: 1, frequencyHz: 1, phase, order: 1 } as const };
    });
    const model = { ...still, drives };
    const { analysis } = contextOf(model);
    const response = analysis.frequencyResponse([0, 1]);
    if (!response.ok) throw new Error(response.reason);
    for (const hertz of [1, Math.sqrt(10), 10]) {
      expect(imbalanceAt(model, response.value, [0, 1], hertz) ?? 0).toBeLessThan(1e-12);
    }
  });

  test("find the digits that a sweep loses between a weld and a hair", () => {
    const context = contextOf(graded);
    const response = analyse(context.instance).frequencyResponse([0]);
    if (!response.ok) throw new Error(response.reason);
    const at = response.value.at(
      {
        text: "dial.angle",
        terms: [{ of: "coordinate", coordinate: 0, derivative: 0, factor: 1 }],
        unit: "rad",
      },
      1e-4,
    );
    if (!at.ok) throw new Error(at.reason);
    // Far below both modes the two turn as one on the hair; closed form.
    const exact = 1 / (1e-3 - 2 * (2 * Math.PI * 1e-4) ** 2);
    const error = Math.abs(at.value[0] / exact - 1);
    const found = imbalanceAt(graded, response.value, [0], 1e-4) ?? 0;
    // Work and stored energy differ by the error, over twice their size.
    expect(Math.abs(2 * found - error)).toBeLessThan(0.1 * error + 1e-6);
  });

  test("say nothing about supports that move", () => {
    const carried = sketch({
      masses: { m: 2 },
      supports: ["quay"],
      joints: [{ a: "m", b: "quay", stiffness: 50 }],
    });
    const drives = [
      { ...steadyForce(0, 1), keyword: "motion" as const, on: { kind: "support" as const, support: 0 } },
    ];
    const response = analyse(contextOf({ ...carried, drives }).instance).frequencyResponse([0]);
    if (!response.ok) throw new Error(response.reason);
    expect(imbalanceAt({ ...carried, drives }, response.value, [0], 1)).toBeUndefined();
  });
});
