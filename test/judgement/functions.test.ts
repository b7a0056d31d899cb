import { describe, expect, test } from "vitest";
import { valueIn, verdictOf } from "./judged.ts";

/**
 * One oscillator, m = 8 kg, k = 5400 N/m, c = 40 N s/m (the public worked exercise of check case p01), driven by
 * a force of 20 N. All expected numbers are closed forms of one oscillator, any vibration textbook.
 */
const m = 8;
const k = 5400;
const c = 40;
const omega = Math.sqrt(k / m);
const zeta = c / (2 * Math.sqrt(k * m));
const f = omega / (2 * Math.PI);
const oscillator = `
mass block = ${m} kg
spring coil between block and ground = ${k} N/m
damper pot between block and ground = ${c} N*s/m
group feet = coil, pot
force push on block
    amplitude = 20 N
    frequency = 1 Hz
ask sweep run
    of = block.displacement
    by = push
    from = 0.5 Hz
    to = 20 Hz
`;
const magnification = (r: number): number => 1 / Math.hypot(1 - r * r, 2 * zeta * r);

describe("functions of the mode table", () => {
  test.each([
    ["natural_frequency(1)", f],
    ["damped_frequency(1)", f * Math.sqrt(1 - zeta * zeta)],
    ["damping_ratio(1)", zeta],
    ["effective_mass(1)", 1],
    ["stability_margin()", zeta * omega],
    ["separation(1, 5 Hz)", 5 / f - 1],
    ["static_deflection(coil)", (m * 9.80665) / k],
    ["static_force(coil)", m * 9.80665],
  ])("%s", (expression, expected) => {
    expect(valueIn(oscillator, expression) / expected).toBeCloseTo(1, 10);
  });

  test("a mode that is not there gives null and a reason with what there is", () => {
    const verdict = verdictOf(`${oscillator}expect held = natural_frequency(3) <= 5 Hz`);
    expect(verdict).toMatchObject({ holds: null, value: null, limit: 5, unit: "Hz", margin: null });
    expect(verdict.reason).toBe("there is no mode 3: the model has one elastic mode");
  });
});

describe("a mode that does not return to rest", () => {
  test("has no natural frequency, so no upper limit holds by it", () => {
    const arch =
      "mass m = 10 kg\nspring a between m and ground = 1 kN/m\nspring b between m and ground = -1.5 kN/m\n";
    for (const value of ["natural_frequency(1)", "2 Hz * separation(1, 4 Hz)"]) {
      const verdict = verdictOf(`${arch}expect held = ${value} <= 5 Hz`);
      expect(verdict).toMatchObject({ holds: null, value: null });
      expect(verdict.reason).toBe("mode 1 does not return to rest, so it has no natural frequency");
    }
  });
});

describe("static_force of a group", () => {
  // By hand: of 98.0665 N of weight 3/4 stand in the spring below; the one above is written the other way round.
  test("is the size of the sum with signs, whichever way its members were written", () => {
    const pair =
      "mass m = 10 kg\nspring under between m and ground = 3 kN/m\nspring over between ground and m = 1 kN/m\ngroup feet = under, over\n";
    expect(valueIn(pair, "static_force(feet)")).toBeCloseTo((98.0665 * 2) / 4, 9);
    expect(valueIn(pair, "static_force(over)")).toBeCloseTo(98.0665 / 4, 9);
  });
});

describe("functions of a sweep", () => {
  const most = 1 / (2 * zeta * Math.sqrt(1 - zeta * zeta));
  const edge = (sign: number): number =>
    f * Math.sqrt(1 - 2 * zeta * zeta + sign * 2 * zeta * Math.sqrt(1 - zeta * zeta));
  test.each([
    ["peak(run, block.displacement)", (20 / k) * most],
    ["highest(run, block.displacement)", (20 / k) * most],
    ["0 m - lowest(run, block.displacement)", (20 / k) * most],
    ["rms(run, block.displacement)", ((20 / k) * most) / Math.SQRT2],
    ["value(run, block.displacement, at: 6 Hz)", (20 / k) * magnification(6 / f)],
    ["value(run, coil.force, at: 6 Hz)", 20 * magnification(6 / f)],
    ["-phase(run, block.displacement, at: natural_frequency(1))", Math.PI / 2],
    ["transmissibility(run, coil, at: 6 Hz)", magnification(6 / f)],
    ["transmissibility(run, feet, at: 6 Hz)", magnification(6 / f) * Math.hypot(1, (2 * zeta * 6) / f)],
    [
      "transmissibility(run, ground.reaction, at: 6 Hz)",
      magnification(6 / f) * Math.hypot(1, (2 * zeta * 6) / f),
    ],
    ["bandwidth(run, block.displacement)", edge(1) - edge(-1)],
  ])("%s", (expression, expected) => {
    expect(valueIn(oscillator, expression) / expected).toBeCloseTo(1, 7);
  });

  test("a peak is where one oscillator has it", () => {
    expect(
      valueIn(oscillator, "peak_at(run, block.displacement)") / (f * Math.sqrt(1 - 2 * zeta * zeta)),
    ).toBeCloseTo(1, 6);
  });
});

describe("transmissibility", () => {
  const carried = (drive: string): string => `
support quay
mass block = ${m} kg
spring coil between block and quay = ${k} N/m
damper pot between block and quay = ${c} N*s/m
group feet = coil, pot
${drive}
ask sweep run
    of = block.displacement
    from = 0.5 Hz
    to = 20 Hz
`;
  const absolute = magnification(6 / f) * Math.hypot(1, (2 * zeta * 6) / f);
  test("of a motion compares like with like, whatever the drive is given in", () => {
    for (const amplitude of ["2 mm", "3 mm/s", "0.1 m/s^2"]) {
      const text = carried(`motion swell of quay\n    amplitude = ${amplitude}\n    frequency = 1 Hz`);
      for (const quantity of ["displacement", "velocity", "acceleration"]) {
        expect(valueIn(text, `transmissibility(run, block.${quantity}, at: 6 Hz)`) / absolute).toBeCloseTo(
          1,
          9,
        );
      }
    }
  });
  test("of an unbalance is over unbalance times the square of the angular rate", () => {
    const text = carried("force rotor on block\n    unbalance = 0.018 kg*m\n    speed = 600 rpm");
    expect(valueIn(text, "transmissibility(run, feet, at: 360 rpm)") / absolute).toBeCloseTo(1, 9);
  });
  test("of unlike things, or with two drives, is null with a reason", () => {
    const swell = carried("motion swell of quay\n    amplitude = 2 mm\n    frequency = 1 Hz");
    expect(verdictOf(`${swell}expect held = transmissibility(run, feet, at: 6 Hz) <= 1`).reason).toContain(
      "like with like",
    );
    const two = `${oscillator}
force pull on block
    amplitude = 3 N
    frequency = 1 Hz
ask sweep both
    of = block.displacement
    from = 0.5 Hz
    to = 20 Hz
expect held = transmissibility(both, feet, at: 6 Hz) <= 1`;
    expect(verdictOf(two).reason).toContain("2 drives act in `both`");
  });
});

describe("functions of a history", () => {
  const released = (start: string, lasting = "4 s"): string => `
mass block = ${m} kg
    ${start}
spring coil between block and ground = ${k} N/m
damper pot between block and ground = ${c} N*s/m
ask history after
    of = block.displacement
    lasting = ${lasting}
`;
  const damped = omega * Math.sqrt(1 - zeta * zeta);
  const decay = (t: number): number =>
    0.03 *
    Math.exp(-zeta * omega * t) *
    (Math.cos(damped * t) + ((zeta * omega) / damped) * Math.sin(damped * t));
  test("value, peak, highest, lowest and where they are", () => {
    const text = released("starts_at = 30 mm");
    expect(valueIn(text, "value(after, block.displacement, at: 0.3 s) + 1 m") - 1).toBeCloseTo(decay(0.3), 9);
    expect(valueIn(text, "peak(after, block.displacement)")).toBeCloseTo(0.03, 9);
    expect(valueIn(text, "highest(after, block.displacement)")).toBeCloseTo(0.03, 9);
    expect(valueIn(text, "0 m - lowest(after, block.displacement)")).toBeCloseTo(-decay(Math.PI / damped), 8);
    expect(valueIn(text, "least(after, block.displacement)")).toBe(0);
  });
  test("period_of is the damped period", () => {
    expect(valueIn(released("starts_at = 30 mm"), "period_of(after, block.displacement)")).toBeCloseTo(
      (2 * Math.PI) / damped,
      7,
    );
  });
  test("period_of rounding is none: two equal masses that a third drives alike do not part", () => {
    const twins = (second: string): string => `
mass left = 1.3 kg
mass middle = 2.7 kg
mass right = ${second}
spring a between left and ground = 4.1 kN/m
spring b between right and ground = 4.1 kN/m
spring d between left and middle = 1.7 kN/m
spring g between right and middle = 1.7 kN/m
spring f between middle and ground = 0.7 kN/m
force push on middle
    amplitude = 1 N
    frequency = 3 Hz
ask history run
    of = left.displacement
    by = push
    lasting = 4 s
`;
    const apart = ["left.displacement - right.displacement", "a.force - b.force", "d.rate - g.rate"];
    for (const quantity of apart) {
      const judged = (second: string) =>
        verdictOf(`${twins(second)}expect held = period_of(run, ${quantity}) <= 10 s`);
      expect(judged("1.3 kg")).toMatchObject({ holds: null, value: null });
      expect(judged("1.3 kg").reason).toContain("stays where it is");
      // A part in a million is no rounding.
      expect(judged("1.3000013 kg").holds).toBe(true);
    }
    expect(valueIn(twins("1.3 kg"), "period_of(run, left.displacement)")).toBeGreaterThan(0.1);
  });
  test("settling_time is the last instant outside the band", () => {
    let last = 0;
    for (let t = 0; t < 4; t += 1e-5) if (Math.abs(decay(t)) > 0.02 * 0.03) last = t;
    expect(
      valueIn(released("starts_at = 30 mm"), "settling_time(after, block.displacement, 2 %)"),
    ).toBeCloseTo(last, 4);
    expect(
      valueIn(released("starts_at = 30 mm"), "settling_time(after, block.displacement, 0.6 mm)"),
    ).toBeCloseTo(last, 4);
  });
  test("settling_time of a history that ends too early is null, and not-settled says so", () => {
    const verdict = verdictOf(
      `${released("starts_at = 30 mm", "0.5 s")}expect held = settling_time(after, block.displacement, 2 %) <= 3 s`,
    );
    expect(verdict.holds).toBeNull();
    expect(verdict.reason).toContain("ends after 500 ms");
  });
});

describe("clearance and limits", () => {
  const driven = (drive: string): string => `
mass left = 100 kg
mass right = 100 kg
spring a between left and ground = 400 kN/m
    loss_factor = 4 %
spring b between right and left = 400 kN/m
    loss_factor = 4 %
spring d between right and ground = 400 kN/m
    loss_factor = 4 %
${drive}
`;
  const first = Math.sqrt(4e5 / 100) / (2 * Math.PI);
  const push = (name: string, on: string, speed: string): string =>
    `force ${name} on ${on}\n    unbalance = 2e-3 kg*m\n    speed = ${speed}`;
  test("clear_of_modes is the least separation over modes and orders", () => {
    const text = driven(push("rotor", "left", "300 rpm"));
    const orders = [1, 2].flatMap((o) => [first, Math.sqrt(3) * first].map((g) => Math.abs((o * 5) / g - 1)));
    expect(valueIn(text, "clear_of_modes(300 rpm, orders: (1, 2))")).toBeCloseTo(Math.min(...orders), 9);
  });
  test("clear_of_modes of a range that holds a mode is 0", () => {
    expect(valueIn(driven(push("rotor", "left", "300 rpm")), "clear_of_modes(8 Hz to 12 Hz)")).toBe(0);
  });
  test("clear_of_modes leaves out a mode that the drive cannot excite", () => {
    const middle = `
mass left = 100 kg
mass centre = 100 kg
mass right = 100 kg
spring a between left and centre = 400 kN/m
spring b between right and centre = 400 kN/m
spring d between centre and ground = 400 kN/m
${push("rotor", "centre", "600 rpm")}
`;
    // The mode in which the centre stands still lies at sqrt(k/m); the others at sqrt(2 ± sqrt 3) times that; closed form.
    const still = Math.sqrt(4e5 / 100);
    const moving = [Math.sqrt(2 - Math.sqrt(3)), Math.sqrt(2 + Math.sqrt(3))].map(
      (x) => (x * still) / (2 * Math.PI),
    );
    expect(valueIn(middle, "clear_of_modes(600 rpm)")).toBeCloseTo(
      Math.min(...moving.map((g) => Math.abs(10 / g - 1))),
      9,
    );
  });
  test("below is the largest ratio to a limit, peak or rms, and finds it between samples", () => {
    const limit = (of: string): string => `${oscillator}
limit zone
    of = ${of}
    rows =
        1 Hz 10 mm
        10 Hz 1 mm
`;
    let most = 0;
    for (let g = 1; g <= 10; g += 1e-5) {
      most = Math.max(most, ((20 / k) * magnification(g / f)) / (0.01 / g));
    }
    expect(valueIn(limit("peak"), "below(run, block.displacement, zone)") / most).toBeCloseTo(1, 6);
    expect((valueIn(limit("rms"), "below(run, block.displacement, zone)") * Math.SQRT2) / most).toBeCloseTo(
      1,
      6,
    );
  });
  test("sensitivity of a frequency is one half by stiffness, minus one half by mass", () => {
    const text = `
let stiff = 5400 N/m
let heavy = 8 kg
mass block = heavy
spring coil between block and ground = stiff
`;
    expect(valueIn(text, "sensitivity(natural_frequency(1), stiff)")).toBeCloseTo(0.5, 9);
    expect(valueIn(text, "1 + sensitivity(natural_frequency(1), heavy)")).toBeCloseTo(0.5, 9);
  });
});
