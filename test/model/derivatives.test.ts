import { describe, expect, it } from "vitest";
import { derivatives } from "../../shared-core/model/instantiate.ts";
import type { Derivatives } from "../../shared-core/model/model.ts";
import { modelOf } from "./check.ts";

const TEXT = `let d = 60 mm
let n = 12 Hz
let m = 40 kg
let ratio = 3.2
let slack = 0 N/mm +/- 1 N/mm
mass unit = m
mass disc = 2 * m + 3 kg
inertia wheel = 2 kg*m^2
inertia pinion = 1 kg*m^2
bind pinion = ratio * wheel
spring shaft_end between wheel and ground = shaft(80 GPa, d, 1 m)
spring k between unit and disc = m * (2*pi*n)^2
    damping_ratio = 5 % at n
    preload = 10 N/kg * m
spring soft between disc and ground = 5 N/mm + slack
    loss_factor = 1 % * ratio
force f on unit
    amplitude = 1 N
    frequency = n
assume gravity = ratio * 1 m/s^2
`;

function of(name: string): Derivatives {
  const model = modelOf(TEXT);
  expect(model.diagnostics).toEqual([]);
  const found = derivatives(model, 0, name);
  if (found === undefined) throw new Error(`no ${name}`);
  return found;
}

/** Relative error of central differences of fourth order at a step of 1e-3: both errors near 1e-12. */
const close = (found: number, expected: number) =>
  expect(Math.abs(found - expected)).toBeLessThanOrEqual(1e-10 * Math.abs(expected));

describe("derivatives of the numbers of a model by its lets, against the formulas", () => {
  it("of powers: a shaft by its diameter", () => {
    close(of("d").stiffness[0], (4 * 80e9 * Math.PI * 0.06 ** 3) / 32);
    expect([...of("d").stiffness.slice(1)]).toEqual([0, 0]);
  });

  it("of rates, in Hz: stiffness and the damper beside it", () => {
    const found = of("n");
    close(found.stiffness[1], 40 * 8 * Math.PI ** 2 * 12);
    // c = 2 zeta k / (2 pi n) = 2 zeta m 2 pi n
    close(found.damping[1], 2 * 0.05 * 40 * 2 * Math.PI);
    expect(found.movesDrives).toBe(true);
    expect(found.movesForms).toBe(false);
  });

  it("of inertias and preloads", () => {
    const found = of("m");
    close(found.inertia[0], 1);
    close(found.inertia[1], 2);
    close(found.preload[1], 10);
    expect(found.movesDrives).toBe(false);
  });

  it("of assumptions, loss factors, and forms that move", () => {
    const found = of("ratio");
    close(found.gravity, 1);
    close(found.lossFactor[2], 0.01);
    expect(found.movesForms).toBe(true);
  });

  it("at zero, with the step of the band", () => {
    close(of("slack").stiffness[2], 1);
  });

  it("of what is no let: none", () => {
    expect(derivatives(modelOf(TEXT), 0, "unit")).toBeUndefined();
  });
});
