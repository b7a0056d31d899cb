import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { judge } from "../../shared-core/judgement/judge.ts";
import { understand } from "../../shared-core/model/understand.ts";

/**
 * The examples with one slip each, as fingers make them: a wrong unit, a missing name, a typo, a missing sign.
 * Each gets exactly one message more than the example itself, of the code beside it.
 */
const SLIPS: Readonly<Record<string, readonly (readonly [right: string, slip: string, code: string])[]>> = {
  "ventilation-fan": [
    ["let casing_mass = 225 kg", "let casing_mass = 225 kgs", "unknown-unit"],
    ["mass beam = 1.8 t", "mass beam = 1.8 tn", "unknown-unit"],
    ["mass beam = 1.8 t +/- 10 %", "mass beam = 1.8 tn", "unknown-unit"],
    ["let isolator = 180 N/mm", "let isolator = 180 N/mmm", "unknown-name"],
    ["let isolator = 180 N/mm", "let isolator = 180 Nn/mm", "unknown-unit"],
    ["let isolator = 180 N/mm", "let isolator = 180 N", "unit-mismatch"],
    ["let isolator = 180 N/mm", "let isolator = 180", "unit-mismatch"],
    ["let isolator = 180 N/mm", "let isolator 180 N/mm", "syntax"],
    ["let isolator = 180 N/mm +/- 10 %", "let isolator = 180 N/mm +/- 10 kg", "unit-mismatch"],
    ["let isolator = 180 N/mm +/- 10 %", "let isolator = 180 N/mm +/- 10 prc", "unknown-unit"],
    ["let fan_speed = 960 rpm", "let fan_speeds = 960 rpm", "unknown-name"],
    ["let fan_speed = 960 rpm", "let fan_speed = 960 rmp", "unknown-unit"],
    ["let fan_speed = 960 rpm", "let fan_speed = 960", "unit-mismatch"],
    ["let fan_speed = 960 rpm", "let fan_speed = 960 kg", "unit-mismatch"],
    ["mass casing = casing_mass", "mas casing = casing_mass", "syntax"],
    ["mass casing = casing_mass", "mass cassing = casing_mass", "unknown-name"],
    ["mass casing = casing_mass", "mass casing = casingmass", "unknown-name"],
    ["mass casing = casing_mass", "mass casing casing_mass", "syntax"],
    ["mass casing = casing_mass", "mass casing", "missing-detail"],
    ["mass casing = casing_mass", "mass = casing_mass", "syntax"],
    ["mass casing = casing_mass", "mass casing = ", "syntax"],
    ["mass casing = casing_mass", "mass casing = fan_speed", "unit-mismatch"],
    [
      "spring bearings between rotor and casing = 40 MN/m",
      "spring bearings between rotor casing = 40 MN/m",
      "syntax",
    ],
    [
      "spring bearings between rotor and casing = 40 MN/m",
      "spring bearings between rotro and casing = 40 MN/m",
      "unknown-name",
    ],
    [
      "spring bearings between rotor and casing = 40 MN/m",
      "spring bearings betwen rotor and casing = 40 MN/m",
      "syntax",
    ],
    [
      "spring isolators between base and slab = isolator\n    count = 4",
      "spring isolators between base and slab = isolator\n    cuont = 4",
      "unknown-detail",
    ],
    [
      "spring isolators between base and slab = isolator\n    count = 4",
      "spring isolators between base and slab = isolator\n    count = 4 kg",
      "unit-mismatch",
    ],
    [
      "spring isolators between base and slab = isolator\n    count = 4",
      "spring isolators between base and slab = isolator\n    count 4",
      "syntax",
    ],
    [
      "spring isolators between base and slab = isolator\n    count = 4",
      "spring isolators between base and slab = isolator\ncount = 4",
      "syntax",
    ],
    [
      "group isolation = isolators, isolator_rubber",
      "group isolation = isolators, isolater_rubber",
      "unknown-name",
    ],
    ["group isolation = isolators, isolator_rubber", "group isolation isolators, isolator_rubber", "syntax"],
    ["group isolation = isolators, isolator_rubber", "grup isolation = isolators, isolator_rubber", "syntax"],
    [
      "group isolation = isolators, isolator_rubber",
      "group isolaton = isolators, isolator_rubber",
      "unknown-name",
    ],
    ["    unbalance = 5.3e-3 kg*m", "    unbalnce = 5.3e-3 kg*m", "unknown-detail"],
    ["    unbalance = 5.3e-3 kg*m", "    unbalance = 5.3e-3 kgm", "unknown-unit"],
    ["    unbalance = 5.3e-3 kg*m", "    unbalance = 5.3e-3", "missing-unit"],
    ["    unbalance = 5.3e-3 kg*m", "    unbalance = 5.3e-3 N*m", "weight-as-mass"],
    ["    speed = fan_speed", "    sped = fan_speed", "unknown-detail"],
    ["    speed = fan_speed", "    speed = fan_sped", "unknown-name"],
    ["    speed = fan_speed", "    speed = fan_speed^2", "ambiguous-rate"],
    ["force fan_imbalance on rotor", "force fan_imbalance on roter", "unknown-name"],
    ["force fan_imbalance on rotor", "force fan_imbalance rotor", "syntax"],
    ["force fan_imbalance on rotor", "force fan_imbalence on rotor", "unknown-name"],
    ["force fan_imbalance on rotor", "forse fan_imbalance on rotor", "syntax"],
    ["ask sweep fan_run_up", "ask sweep fan_runup", "unknown-name"],
    ["ask sweep fan_run_up", "ask sweeps fan_run_up", "syntax"],
    ["ask sweep fan_run_up", "ask swep fan_run_up", "syntax"],
    [
      "of = slab.velocity, casing.velocity, isolation.force",
      "of = slab.velocty, casing.velocity, isolation.force",
      "unknown-name",
    ],
    [
      "of = slab.velocity, casing.velocity, isolation.force",
      "of = slb.velocity, casing.velocity, isolation.force",
      "unknown-name",
    ],
    [
      "of = slab.velocity, casing.velocity, isolation.force",
      "of = slab.velocity casing.velocity, isolation.force",
      "syntax",
    ],
    ["by = fan_imbalance", "by = fan_imbalence", "unknown-name"],
    ["by = fan_imbalance", "by fan_imbalance", "syntax"],
    ["    from = 2 Hz", "    form = 2 Hz", "unknown-detail"],
    ["    from = 2 Hz", "    from = 2", "missing-unit"],
    ["    from = 2 Hz", "    from = 2 hz", "unknown-unit"],
    ["    from = 2 Hz", "    from = 200 Hz", "wrong-kind"],
    ["    from = 2 Hz", "    from = 2 mm", "unit-mismatch"],
    ["    from = 2 Hz", "", "missing-detail"],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough = natural_freqency(1) <= 0.35 * fan_speed",
      "unknown-name",
    ],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough = natural_frequency(1) = 0.35 * fan_speed",
      "syntax",
    ],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough = natural_frequency(1) <= 0.35",
      "missing-unit",
    ],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough natural_frequency(1) <= 0.35 * fan_speed",
      "syntax",
    ],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough = natural_frequency <= 0.35 * fan_speed",
      "unknown-name",
    ],
    [
      "expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed",
      "expect soft_enough = natural_frequency(1 <= 0.35 * fan_speed",
      "syntax",
    ],
    [
      "transmissibility(fan_run_up, isolation, at: fan_speed)",
      "transmissibility(fan_run_up, isolation, fan_speed)",
      "wrong-kind",
    ],
    [
      "transmissibility(fan_run_up, isolation, at: fan_speed)",
      "transmissibility(fan_run_up, isolation)",
      "missing-detail",
    ],
    [
      "transmissibility(fan_run_up, isolation, at: fan_speed)",
      "transmissibility(fan_run, isolation, at: fan_speed)",
      "unknown-name",
    ],
    [
      "transmissibility(fan_run_up, isolation, at: fan_speed)",
      "transmissibility(fan_run_up, isolation.forces, at: fan_speed)",
      "unknown-name",
    ],
    [
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm/s * sqrt(2)",
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm/sec * sqrt(2)",
      "unknown-name",
    ],
    [
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm/s * sqrt(2)",
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm * sqrt(2)",
      "unit-mismatch",
    ],
    [
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm/s * sqrt(2)",
      "value(fan_run_up, slab.velocity, at: fan_speed) <= 0.71 mm/s * sqr(2)",
      "unknown-name",
    ],
    ["    tolerance = worst_case", "    tolerance = worstcase", "wrong-kind"],
    ["    tolerance = worst_case", "    tolerence = worst_case", "unknown-detail"],
    ["    margin = 5 %", "    margin = 5 kg", "unit-mismatch"],
    ["    loss_factor = 0.02", "    loss_factr = 0.02", "unknown-detail"],
    ["    loss_factor = 0.02", "    loss_factor = 0.02 N", "unit-mismatch"],
    ["    loss_factor = 0.02", "    loss_factor 0.02", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = -60 kg +/- 10 %", "not-positive"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 0 kg +/- 10 %", "not-positive"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60 lbf +/- 10 %", "weight-as-mass"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60 kg +/ 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct == 60 kg +/- 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass base = 60 kg +/- 10 %", "duplicate-name"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60 kg) +/- 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = (60 kg +/- 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60 kg kg +/- 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 6o kg +/- 10 %", "unknown-unit"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60,0 kg +/- 10 %", "wrong-kind"],
    ["mass duct = 60 kg +/- 10 %", "mass  = 60 kg +/- 10 %", "syntax"],
    ["mass duct = 60 kg +/- 10 %", "mass duct = 60 kg +/- 10", "missing-unit"],
    ["thrum 1", "thrum 3", "version-unknown"],
    ["thrum 1", "thrm 1", "syntax"],
    ['title "Extract', "title Extract", "syntax"],
  ],
  "pump-line": [
    ["let ratio = 3.2\n", "let ratios = 3.2\n", "unknown-name"],
    ["let ratio = 3.2\n", "let ratio = 0\n", "not-positive"],
    ["let pump_speed = motor_speed / ratio", "let pump_speed = motor_speed / ration", "unknown-name"],
    ["let pump_speed = motor_speed / ratio", "let pump_speed = motorspeed / ratio", "unknown-name"],
    ["bind pinion = -ratio * wheel", "bind pinion = -ratio * whel", "wrong-kind"],
    ["bind pinion = -ratio * wheel", "bind pinion -ratio * wheel", "syntax"],
    ["bind pinion = -ratio * wheel", "bind pinon = -ratio * wheel", "unknown-name"],
    ["bind pinion = -ratio * wheel", "bind pinion = -ratio * motor_speed", "wrong-kind"],
    ["shaft(shear_modulus, 3.75 in, 14 in)", "shaft(shear_modulus, 3.75 in)", "missing-detail"],
    ["shaft(shear_modulus, 3.75 in, 14 in)", "shaft(shear_modulus, 3.75, 14 in)", "missing-unit"],
    ["shaft(shear_modulus, 3.75 in, 14 in)", "shaft(shear_modulus, 3.75 inc, 14 in)", "unknown-unit"],
    ["shaft(shear_modulus, 3.75 in, 14 in)", "shat(shear_modulus, 3.75 in, 14 in)", "unknown-name"],
    ["shaft(shear_modulus, 3.75 in, 14 in)", "shaft(shear_modul, 3.75 in, 14 in)", "unknown-name"],
    ["let shear_modulus = 11.5e6 psi", "let shear_modulus = 11.5e6 psii", "unknown-unit"],
    ["let shear_modulus = 11.5e6 psi", "let shear_modulus = 11.5e6 lbf", "unit-mismatch"],
    ["    order = 18", "    order = 18 Hz", "unit-mismatch"],
    ["torque ripple on motor", "torque ripple on wheel_shaft", "wrong-kind"],
    ["torque ripple on motor", "force ripple on motor", "wrong-kind"],
    ["inertia motor = motor_inertia", "mass motor = motor_inertia", "unit-mismatch"],
    ["inertia brake = 120 lbm*ft^2", "inertia brake = 120 lbm*ft", "unit-mismatch"],
    ["inertia brake = 120 lbm*ft^2", "inertia brake = 120 lbm*ft^2.5", "syntax"],
    ["inertia brake = 120 lbm*ft^2", "inertia brake = 120 lbs*ft^2", "unknown-unit"],
    [
      "damper windage between motor and ground = 6 lbf*in*s",
      "damper windage between motor and ground = 6 lbf*in",
      "unit-mismatch",
    ],
    [
      "damper windage between motor and ground = 6 lbf*in*s",
      "damper windage between motor and grund = 6 lbf*in*s",
      "unknown-name",
    ],
    [
      "damper windage between motor and ground = 6 lbf*in*s",
      "dampr windage between motor and ground = 6 lbf*in*s",
      "syntax",
    ],
  ],
  "gate-actuator": [
    ["    pulse = trapezoid", "    pulse = trapezium", "wrong-kind"],
    ["    pulse = trapezoid", "    puls = trapezoid", "unknown-detail"],
    ["    pulse = trapezoid\n", "", "wrong-kind"],
    ["    peak = brake_thrust\n", "", "missing-detail"],
    ["    peak = brake_thrust", "    peak = brake_trust", "unknown-name"],
    ["    duration = 0.9 s", "    duration = 0.9", "missing-unit"],
    ["    rise = 60 ms", "    rise = 60 mss", "unknown-unit"],
    ["    lasting = 6 s", "    lasts = 6 s", "unknown-detail"],
    ["    lasting = 6 s\n", "", "missing-detail"],
    ["    lasting = 6 s", "    lasting = 6 sec", "unknown-unit"],
    ["    damping_ratio = 2 % at 90 Hz", "    damping_ratio = 2 %", "wrong-kind"],
    ["    damping_ratio = 2 % at 90 Hz", "    damping_ratio = 2 % at 90", "missing-unit"],
    ["    damping_ratio = 2 % at 90 Hz", "    damping_ratio = 2 % at 90 Hertzz", "unknown-unit"],
    ["let leaf_mass = 21 t", "let leaf_mass = 21 ton_s", "unknown-unit"],
    ["let leaf_mass = 21 t", "let leaf_mas = 21 t", "unknown-name"],
    ["junction buffer_end", "junction buffer_ends", "unknown-name"],
    ["junction buffer_end", "juncton buffer_end", "syntax"],
    ["junction buffer_end\n", "", "unknown-name"],
    [
      "settling_time(stop, leaf_toe.displacement, 0.5 mm)",
      "settling_time(stop, leaf_toe.displacement, 0.5 mms)",
      "unknown-unit",
    ],
    [
      "settling_time(stop, leaf_toe.displacement, 0.5 mm)",
      "settling_time(stop, leaf_toe.displacement)",
      "missing-detail",
    ],
    [
      "settling_time(stop, leaf_toe.displacement, 0.5 mm)",
      "settling_time(stopp, leaf_toe.displacement, 0.5 mm)",
      "unknown-name",
    ],
    [
      "settling_time(stop, leaf_toe.displacement, 0.5 mm)",
      "settling_time(stop, leaf_to.displacement, 0.5 mm)",
      "unknown-name",
    ],
    ["stability_margin() >= 0.05 1/s", "stability_margin() >= 0.05", "missing-unit"],
    ["stability_margin() >= 0.05 1/s", "stability_margin() >= 0.05 Hz", "ambiguous-rate"],
    ["stability_margin() >= 0.05 1/s", "stability_margin >= 0.05 1/s", "unknown-name"],
  ],
  "quay-generator": [
    ["case soft_mounts", "case soft_mounts = 3", "syntax"],
    ["    mount = 0.85 kN/mm", "    mont = 0.85 kN/mm", "unknown-name"],
    ["    mount = 0.85 kN/mm", "    mount = 0.85 kN/m/m", "unit-mismatch"],
    ["    mount = 0.85 kN/mm", "    mount = 0.85", "missing-unit"],
    ["    mount = 0.85 kN/mm", "    mount = 0.85 kNn/mm", "unknown-unit"],
    ["    mount = 0.85 kN/mm", "    mount 0.85 kN/mm", "syntax"],
    ["let mount = 4.4 kN/mm", "let mount = 4.4 kN/mn", "unknown-name"],
    ["let mount = 4.4 kN/mm", "let mounts = 4.4 kN/mm", "duplicate-name"],
    ["orders: (1))", "orders: (1 Hz))", "unit-mismatch"],
    ["orders: (1))", "order: (1))", "wrong-kind"],
    ["orders: (1))", "orders (1))", "wrong-kind"],
  ],
};

const nothing = { read: () => ({ ok: false, why: "missing", detail: "no such file" }) as const };

function said(text: string) {
  const report = judge(understand("model.thrum", text, nothing), { upTo: "modes" });
  return report.diagnostics.map(({ code, message }) => ({ code, message }));
}

describe.each(Object.entries(SLIPS))("one slip in %s gets one message", (name, slips) => {
  const text = readFileSync(new URL(`../../examples/${name}.thrum`, import.meta.url), "utf8");
  const before = said(text).map(({ message }) => message);

  it.each(slips)("%j written %j: %s", (right, slip, code) => {
    expect(text).toContain(right);
    const after = said(text.replace(right, () => slip)).filter(({ message }) => !before.includes(message));
    expect(
      after.map((each) => each.code),
      after.map(({ message }) => message).join("\n"),
    ).toEqual([code]);
  });
});

describe("places of one mistake", () => {
  const text = (name: string) => `thrum 1
mass ${name} = 3 kg
spring a between unit and ground = 3 N/mm
damper b between unit and ground = 3 N*s/m
`;

  it("are named beside the first, and one fix cures all", () => {
    const [only, ...more] = understand("model.thrum", text("units"), nothing).diagnostics;
    expect(more).toEqual([]);
    expect(
      only.related?.map(({ span, message }) => [text("units").slice(span.start, span.end), message]),
    ).toEqual([["unit", "here too"]]);
    expect(only.fixes?.map(({ title, edits }) => [title, edits.length])).toEqual([["Write `units`", 2]]);
  });

  it("are told apart where a number is used for different things", () => {
    const model = understand(
      "model.thrum",
      "thrum 1\nlet x = 3 kg\nspring a between u and ground = x\ndamper b between u and ground = x\nmass u = 1 kg\n",
      nothing,
    );
    expect(model.diagnostics.map(({ code }) => code)).toEqual(["unit-mismatch", "unit-mismatch"]);
  });
});
