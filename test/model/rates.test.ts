import { describe, expect, it } from "vitest";
import { check, codesOf, fixed, instanceOf, siOf } from "./check.ts";

const value = (expression: string): number =>
  siOf(`let n = 1200 rpm\nlet f = 10 Hz\nlet x = ${expression}`, "x");

/** The table "Rates: cycles, radians, revolutions" of the language, row by row. */
describe("rates", () => {
  it.each(["20 Hz", "1200 rpm", "1200 cpm", "20 rev/s", "0.02 kHz", "7200 deg/s"])(
    "%s is 20 Hz",
    (written) => {
      expect(siOf(`let x = ${written}`, "x")).toBeCloseTo(20, 12);
    },
  );

  it("125.66 rad/s is 20 Hz", () => {
    expect(siOf("let x = 125.66370614359172 rad/s", "x")).toBeCloseTo(20, 12);
  });

  it.each([
    ["n + f", 30],
    ["n - f", 10],
    ["2 * n", 40],
    ["n / 4", 5],
    ["n / f", 2],
    ["-n", -20],
    ["abs(-n)", 20],
    ["min(n, f)", 10],
    ["max(n, f, 30 Hz)", 30],
    ["if(n > f, n, f)", 20],
    ["5 / n", 0.25],
    ["1 / n + 1 s", 1.05],
    ["n ^ -1", 0.05],
    ["2 * pi * n", 40 * Math.PI],
    ["n * pi * 2", 40 * Math.PI],
    ["(2 * pi) * n", 40 * Math.PI],
    ["2 * (pi * n)", 40 * Math.PI],
    ["-2 * pi * n", -40 * Math.PI],
    ["10 kg * (2*pi*12 Hz)^2", 10 * (24 * Math.PI) ** 2],
    ["10 kg * (n as rad/s)^2", 10 * (40 * Math.PI) ** 2],
    ["3 m * (n as rad/s)", 120 * Math.PI],
    ["400 N/m / (2*pi*n)^2", 400 / (40 * Math.PI) ** 2],
    ["3 N / (2 * pi * n)", 3 / (40 * Math.PI)],
    ["3 kg * n / f", 6],
    ["sqrt(4 N/m / 1 kg) as rad/s", 1 / Math.PI],
    ["sqrt(4 N/m / 1 kg) as Hz", 2],
    ["30 as rpm", 0.5],
    ["n as rad/s", 20],
    ["2 * (n as rad/s)", 40],
    ["(3 1/s) * (1 / n)", 0.15],
  ])("%s", (expression, expected) => {
    expect(value(expression)).toBeCloseTo(expected, 9);
  });

  it.each([
    ["2 * (n as rad/s)", "a rate"],
    ["2 * pi * n", "a plain 1/s"],
  ])("%s is %s", (expression, kind) => {
    const codes = codesOf(`let n = 1200 rpm\nlet y = ${expression}\nlet x = y + 1 Hz`);
    expect(codes).toEqual(kind === "a rate" ? [] : ["ambiguous-rate"]);
  });

  it.each(["20 Hz", "1200 rpm", "7200 deg/s"])("`%s * t` inside sin and cos is one cycle a turn", (rate) => {
    const { shape } = instanceOf(`mass m = 1 kg\nforce f on m\n    law = 3 N * sin(${rate} * t + 90 deg)`)
      .assembly.drives[0];
    if (shape.kind !== "law") throw new Error("no law");
    expect(shape.law.at(0)).toBeCloseTo(3, 9);
    expect(shape.law.at(0.0125)).toBeCloseTo(0, 9);
    expect(shape.law.at(0.025)).toBeCloseTo(-3, 9);
    expect(shape.law.fastestHz).toBeCloseTo(20, 9);
  });

  it("with 2 pi it is the same angle", () => {
    const law = (text: string) => {
      const { shape } = instanceOf(`mass m = 1 kg\nforce f on m\n    law = 3 N * cos(${text})`).assembly
        .drives[0];
      return shape.kind === "law" ? shape.law.at(0.0137) : Number.NaN;
    };
    const expected = 3 * Math.cos(2 * Math.PI * 20 * 0.0137);
    for (const text of [
      "20 Hz * t",
      "2*pi*20 Hz*t".replace("Hz*t", "Hz * t"),
      "(2*pi*20 Hz) * t",
      "2*pi*(20 Hz * t)",
      "(20 Hz as rad/s) * t",
    ]) {
      expect(law(text), text).toBeCloseTo(expected, 9);
    }
  });

  it("says what leaves cycles or radians open, at the smallest place", () => {
    check(`
let n = 1180 rpm
let U = 0.018 kg*m
let x1 = U * n^2
#            ^ ambiguous-rate \`n\` = 19.67 Hz
let x2 = U * n * n
#            ^ ambiguous-rate
let x3 = pi * n
#        ^^^^^^ ambiguous-rate the angular rate of a rate is 2 * pi times it
let x4 = 3 kg * pi * n
#        ^^^^^^^^^^^^^ ambiguous-rate
let x5 = sqrt(4 N/m / 1 kg) + n
#        ^^^^^^^^^^^^^^^^^^ ambiguous-rate 2 rad/s are 0.3183 Hz
let x6 = 3 m * n
#              ^ ambiguous-rate
let x7 = n * 3 s
#        ^ ambiguous-rate
let x8 = sqrt(n * n)
#             ^ ambiguous-rate
let x9 = sqrt(n)
#             ^ ambiguous-rate
let y1 = (3 1/s) as rpm
#                   ^^^ ambiguous-rate
let y2 = sin(n)
#            ^ unit-mismatch
let y3 = if(n > 3 1/s, 1, 2)
#               ^^^^^ ambiguous-rate
let y4 = 3 kg*Hz
#             ^^ ambiguous-rate
let y5 = sin(n * 360 deg * 2 s)
#            ^ ambiguous-rate
`);
    check(`
mass block = 1 kg
spring s between block and ground = 4 N/m
    damping_ratio = 5 % at sqrt(4 N/m / 1 kg)
#                          ^^^^^^^^^^^^^^^^^^ ambiguous-rate
assume mass_damping = 3 Hz
#                     ^^^^ ambiguous-rate
force push on block
    amplitude = 3 N
    frequency = 2 * pi * 3 Hz
#               ^^^^^^^^^^^^^ ambiguous-rate
`);
  });

  it.each([
    ["let n = 3 Hz\nlet U = 3 kg*m\nlet x = U * n^2", "Write `(n as rad/s)`", "let x = U * (n as rad/s)^2"],
    [
      "let n = 3 Hz\nlet U = 3 kg*m\nlet x = U * (n + n)^2",
      "Write `(n + n as rad/s)`",
      "let x = U * (n + n as rad/s)^2",
    ],
    ["let n = 3 Hz\nlet x = pi * n", "Write `2 * pi`", "let x = 2 * pi * n"],
    [
      "mass m = 1 kg\nforce f on m\n    amplitude = 1 N\n    frequency = sqrt(4 N/m / 1 kg)",
      "Read it as rad/s: `sqrt(4 N/m / 1 kg) as rad/s`",
      "    frequency = sqrt(4 N/m / 1 kg) as rad/s",
    ],
    [
      "let n = 3 Hz\nlet x = n + sqrt(4 N/m / 1 kg)",
      "Read it as Hz: `(sqrt(4 N/m / 1 kg) as Hz)`",
      "let x = n + (sqrt(4 N/m / 1 kg) as Hz)",
    ],
    ["assume mass_damping = 3 Hz", "Write `1/s`", "assume mass_damping = 3 1/s"],
  ])("%s", (text, title, last) => {
    const after = fixed(text, title);
    expect(after.trimEnd().split("\n").at(-1)).toBe(last);
    expect(codesOf(after)).toEqual([]);
  });

  it("counts 2 pi a turn in compound units", () => {
    expect(siOf("let c = 1 N*m/rpm", "c")).toBeCloseTo(9.549296585513721, 12);
    expect(codesOf("let c = 1 N*m/Hz")).toEqual(["ambiguous-rate"]);
    expect(codesOf("let d = 1 N^2/Hz")).toEqual([]);
  });
});
