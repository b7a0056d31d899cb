import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import type { TimeResponse } from "../../shared-core/answers/analysis.ts";
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import { curvePieces, pieceAt } from "../../shared-core/answers/speed-curves.ts";
import type { QuantityRef } from "../../shared-core/mechanics/assembly.ts";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import type { HistoryAsk } from "../../shared-core/model/model.ts";
import { judged, modelOf, saidOf, valueIn, verdictOf } from "../judgement/judged.ts";
import { unwrap } from "../numerics/helpers.ts";

interface Case {
  readonly name: string;
  readonly text: string;
  readonly timeS: readonly number[];
  readonly series: Readonly<Record<string, readonly number[]>>;
}

const { cases } = JSON.parse(
  readFileSync(new URL("../reference/data/torque-curves.json", import.meta.url), "utf8"),
) as { cases: readonly Case[] };

const RPM = (2 * Math.PI) / 60;

function historyOf(text: string): {
  ask: HistoryAsk;
  response: TimeResponse;
  quantity(name: string): QuantityRef;
} {
  const model = modelOf(text.replace("thrum 1\n", ""));
  expect(model.diagnostics.filter(({ severity }) => severity === "error")).toEqual([]);
  const instance = instantiate(model, 0);
  const ask = instance.asks.find((each): each is HistoryAsk => each.kind === "history");
  if (ask === undefined) throw new Error("no history");
  const quantity = (name: string) => {
    const found = ask.of.find((each) => each.text === name);
    if (found === undefined) throw new Error(name);
    return found;
  };
  return { ask, response: unwrap(analyse(instance).timeResponse(ask)), quantity };
}

describe.each(cases)("torque over speed: $name", ({ text, timeS, series }) => {
  const { response, quantity } = historyOf(text);

  // solve_ivp at rtol 1e-10 is itself within some 1e-9 of the largest value, with its steps of 50 us over the corners.
  test.each(Object.keys(series))("%s is what SciPy integrates", (name) => {
    const scale = Math.max(...series[name].map(Math.abs));
    timeS.forEach((time, i) => {
      const value = unwrap(response.at(quantity(name), time));
      expect(Math.abs(value - series[name][i]) / scale, `at ${time} s`).toBeLessThan(5e-9);
    });
  });
});

describe("one inertia on a straight curve", () => {
  const model = `
inertia rotor = 0.8 kg*m^2
torque motor on rotor
    curve =
        -100 rpm  44 N*m
        1000 rpm  0 N*m
        1500 rpm  0 N*m
ask history run
    of = rotor.speed, rotor.angle, rotor.angular_acceleration
    lasting = 6 s
`;
  // T = 0.4 N*m a rpm towards 1000 rpm: J w' = s (w1 - w), w = w1 (1 - e^(-t s / J)).
  const s = 44 / (1100 * RPM);
  const w1 = 1000 * RPM;
  const speed = (t: number) => w1 * (1 - Math.exp((-t * s) / 0.8));

  test("follows its closed form to rounding", () => {
    const { response, quantity } = historyOf(model);
    for (const t of [0, 0.1, 1, 2.5, 6]) {
      expect(Math.abs(unwrap(response.at(quantity("rotor.speed"), t)) / w1 - speed(t) / w1)).toBeLessThan(
        1e-12,
      );
      const angle = w1 * t - (0.8 / s) * speed(t);
      expect(Math.abs(unwrap(response.at(quantity("rotor.angle"), t)) - angle)).toBeLessThan(1e-10 * w1 * 6);
    }
  });

  test("settles, and every function of a history reads it", () => {
    expect(valueIn(model, "peak(run, rotor.speed)")).toBeCloseTo(speed(6) / (2 * Math.PI), 9);
    // within 10 % of 1000 rpm once e^(-t s / J) = 0.1
    expect(valueIn(model, "settling_time(run, rotor.speed, 100 rpm)")).toBeCloseTo(
      (Math.log(10) * 0.8) / s,
      9,
    );
    // mean of (1 - e^-x)^2 over x from 0 to X
    const X = (6 * s) / 0.8;
    const mean = 1 - (2 * (1 - Math.exp(-X))) / X + (1 - Math.exp(-2 * X)) / (2 * X);
    expect(valueIn(model, "rms(run, rotor.speed)") / (Math.sqrt(mean) * (1000 / 60))).toBeCloseTo(1, 6);
  });
});

test("constant outside the rows: torque of the last row goes on", () => {
  const model = `
inertia rotor = 2 kg*m^2
torque motor on rotor
    curve =
        0 rpm    10 N*m
        100 rpm  30 N*m
ask history run
    of = rotor.speed
    lasting = 10 s
`;
  // J w' = 10 + k w up to w1 = 100 rpm, then 30 N*m: w' = 15 rad/s^2.
  const w1 = 100 * RPM;
  const k = 20 / w1;
  const t1 = (2 / k) * Math.log(3);
  const { response, quantity } = historyOf(model);
  const at = (t: number) => unwrap(response.at(quantity("rotor.speed"), t));
  expect(Math.abs(at(t1) / w1 - 1)).toBeLessThan(1e-11);
  expect(Math.abs(at(10) / (w1 + 15 * (10 - t1)) - 1)).toBeLessThan(1e-11);
  expect(Math.abs(at(t1 / 2) / ((10 / k) * (Math.sqrt(3) - 1)) - 1)).toBeLessThan(1e-11);
});

test("rows of one torque are a step, whatever else drives", () => {
  const model = (motor: string) => `
inertia rotor = 0.3 kg*m^2
    starts_moving = -50 rpm
inertia load = 2 kg*m^2
spring shaft between rotor and load = 500 N*m/rad
damper rubber between rotor and load = 0.4 N*m*s/rad
spring bar between load and ground = 90 N*m/rad
torque motor on rotor
${motor}
torque knock on load
    pulse = trapezoid
    peak = 80 N*m
    duration = 0.4 s
    rise = 0.1 s
    fall = 0.1 s
    start = 0.7 s
torque sway on load
    law = 4 N*m * sin(3 * t / (1 s))
ask history run
    of = rotor.speed, shaft.torque, load.angular_acceleration
    lasting = 3 s
`;
  const rows = [-40, -10, 0, 10, 40].map((speed) => `        ${speed} rpm  7 N*m\n`).join("");
  const curve = historyOf(model(`    curve =\n${rows}`));
  const step = historyOf(model("    step = 7 N*m"));
  for (const name of ["rotor.speed", "shaft.torque", "load.angular_acceleration"]) {
    const [a, b] = [curve, step].map(({ response, quantity }) => ({
      at: (t: number) => unwrap(response.at(quantity(name), t)),
      high: unwrap(response.highest(quantity(name))),
      rms: unwrap(response.rms(quantity(name))),
      up: unwrap(response.crossings(quantity(name), 0.1, "up")),
    }));
    for (let t = 0; t <= 3; t += 0.1) expect(Math.abs(a.at(t) - b.at(t)) / b.high.value).toBeLessThan(1e-9);
    expect(Math.abs(a.high.value / b.high.value - 1)).toBeLessThan(1e-9);
    expect(Math.abs(a.rms / b.rms - 1)).toBeLessThan(1e-5);
    expect(a.up.length).toBe(b.up.length);
    a.up.forEach((time, i) => void expect(Math.abs(time - b.up[i])).toBeLessThan(1e-8));
  }
});

describe("pieces of a curve", () => {
  const curve = curvePieces([0, 1, 3], [10, 30, 20]);

  test("meet at the rows and are flat outside", () => {
    const torque = (piece: number, w: number) => curve.intercepts[piece] + curve.slopes[piece] * w;
    expect(curve.slopes[0]).toBe(0);
    expect(curve.slopes[3]).toBe(0);
    curve.knots.forEach((w, i) => void expect(torque(i, w)).toBeCloseTo(torque(i + 1, w), 12));
    expect(torque(1, Math.PI)).toBeCloseTo(20, 12);
  });

  test("change only beyond the slack", () => {
    const knot = curve.knots[1];
    expect(pieceAt(curve, knot * (1 + 1e-13), 1, 1e-11)).toBe(1);
    expect(pieceAt(curve, knot * (1 + 1e-10), 1, 1e-11)).toBe(2);
    expect(pieceAt(curve, -5, undefined, 0)).toBe(0);
    expect(pieceAt(curve, 1e9, 1, 1e-11)).toBe(3);
  });
});

describe("a torque over speed", () => {
  const text = (rows: string, rest = "") => `
inertia rotor = 0.8 kg*m^2
damper fan between rotor and ground = 0.02 N*m*s/rad
torque motor on rotor
    curve =
${rows}
${rest}`;
  const rows = "        0 rpm  40 N*m\n        1500 rpm  0 N*m";

  test("takes no part in modes, which is said", () => {
    const report = judged(text(rows, "ask modes\n"));
    expect(saidOf(report, "nonlinear-linearised").map(({ message }) => message)).toEqual([
      "`motor` takes no part in `modes`, which holds for small motion about standstill: its torque follows the speed, with rows from 0 to 1500 rpm",
    ]);
  });

  test.each([
    ["        0 rpm  40 N*m\n        0 rpm  0 N*m", "wrong-kind"],
    ["        0 rpm  40 N*m  3\n", "wrong-kind"],
    ["        0 rpm  40\n", "missing-unit"],
    ["        0 s  40 N*m\n", "unit-mismatch"],
  ])("says what is wrong with the rows %j", (wrong, code) => {
    expect(modelOf(text(wrong)).diagnostics.map((each) => each.code)).toEqual([code]);
  });

  test("needs an inertia to act on", () => {
    const verdict = verdictOf(`
inertia rotor = 0.8 kg*m^2
junction hub
    kind = turning
spring a between rotor and hub = 3 N*m/rad
spring b between hub and ground = 3 N*m/rad
torque motor on hub
    curve =
${rows}
ask history run
    of = rotor.speed
    lasting = 1 s
expect held = peak(run, rotor.speed) <= 3 rpm
`);
    expect(verdict.reason).toContain("needs an inertia to act on");
  });
});
