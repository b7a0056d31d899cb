import { describe, expect, test } from "vitest";
import type { Quantity } from "../../shared-core/units/dimension.ts";
import { isFault } from "../../shared-core/units/fault.ts";
import { dimension, kindOf, number, quantity, RATE, rate } from "../../shared-core/units/quantity.ts";
import {
  add,
  angular,
  compare,
  cycleAngle,
  divide,
  fits,
  multiply,
  negate,
  piWithoutTwo,
  power,
  type Result,
  statedAs,
  subtract,
} from "../../shared-core/units/rates.ts";
import { meaning } from "./written.ts";

const of = (value: number, ...parts: readonly (string | number)[]): Quantity => {
  const unit = meaning(parts);
  return { ...unit.kind, value: value * unit.factor };
};
const rpm = (value: number) => of(value, "rpm", 1);
const hertz = (value: number) => of(value, "Hz", 1);
const mass = quantity(10, dimension(0, 1));
const perSecond = quantity(75, dimension(0, 0, -1));

function value(result: Result): Quantity {
  if (isFault(result)) throw new Error(result.message);
  return result;
}
const codeOf = (result: Result | undefined) => (result && isFault(result) ? result.code : undefined);

// Each test is a row of the table "Rates: cycles, radians, revolutions" of the language.
describe("the table of rates", () => {
  test("rewriting 1200 rpm as 20 Hz or 125.66 rad/s changes nothing", () => {
    const spellings = [
      rpm(1200),
      hertz(20),
      of(40 * Math.PI, "rad", 1, "s", -1),
      of(7200, "deg", 1, "s", -1),
    ];
    for (const spelling of [...spellings, of(1200, "cpm", 1), of(20, "rev", 1, "s", -1)]) {
      expect(spelling.rate).toBe(true);
      expect(spelling.value).toBeCloseTo(20, 12);
    }
  });

  test("rate +- rate, number * rate, rate / number, minus and comparison stay rates", () => {
    expect(value(add(rpm(1200), hertz(5)))).toEqual(rate(25));
    expect(value(subtract(rpm(1200), hertz(5)))).toEqual(rate(15));
    expect(value(multiply(number(2), hertz(5)))).toEqual(rate(10));
    expect(value(multiply(hertz(5), number(2)))).toEqual(rate(10));
    expect(value(divide(hertz(5), number(2)))).toEqual(rate(2.5));
    expect(negate(hertz(5))).toEqual(rate(-5));
    expect(compare(rpm(1200), hertz(10))).toBeUndefined();
  });

  test("rate / rate is a number: 1200 rpm / 10 Hz is 2", () => {
    expect(value(divide(rpm(1200), hertz(10)))).toEqual(number(2));
  });

  test("number / rate is the time of that many cycles", () => {
    expect(value(divide(number(3), rpm(1200)))).toEqual(quantity(0.15, dimension(0, 0, 1)));
  });

  test("rate * t inside sin is one cycle a turn", () => {
    expect(cycleAngle(rpm(1200), quantity(0.0125, dimension(0, 0, 1))).value).toBeCloseTo(Math.PI / 2, 14);
    expect(codeOf(multiply(rpm(1200), quantity(0.0125, dimension(0, 0, 1))))).toBe("ambiguous-rate");
  });

  // 10 kg * (2*pi*12 Hz)^2 = 10 * 5684.8921... N/m, computed from pi.
  test("the angular rate is a plain 1/s and multiplies into other quantities", () => {
    const square = value(power(angular(hertz(12)), number(2)));
    const stiffness = value(multiply(mass, square));
    expect(stiffness.dimension).toEqual([0, 1, -2, 0, 0, 0, 0]);
    expect(stiffness.value).toBeCloseTo(10 * (24 * Math.PI) ** 2, 9);
  });

  test("pi times a rate without 2 is ambiguous", () => {
    expect(piWithoutTwo(hertz(12))).toMatchObject({ code: "ambiguous-rate", replace: [" as rad/s"] });
  });

  test("a plain 1/s where a rate is wanted is ambiguous, with both fixes", () => {
    expect(fits(perSecond, RATE)).toMatchObject({ code: "ambiguous-rate", replace: [" as rad/s", " as Hz"] });
    expect(codeOf(add(hertz(1), perSecond))).toBe("ambiguous-rate");
    expect(codeOf(compare(perSecond, hertz(1)))).toBe("ambiguous-rate");
    expect(value(statedAs(perSecond, meaning(["rad", 1, "s", -1]))).value).toBeCloseTo(
      75 / (2 * Math.PI),
      12,
    );
    expect(value(statedAs(perSecond, meaning(["Hz", 1])))).toEqual(rate(75));
    expect(codeOf(statedAs(perSecond, meaning(["rpm", 1])))).toBe("ambiguous-rate");
  });

  test("any other mixture is ambiguous, with the fix", () => {
    const unbalance = quantity(0.018, dimension(1, 1));
    for (const mixed of [
      multiply(unbalance, rpm(1180)),
      multiply(hertz(1), hertz(1)),
      power(rpm(1180), number(2)),
      power(rpm(1180), number(0.5)),
      divide(mass, hertz(1)),
      divide(hertz(1), mass),
      divide(hertz(1), perSecond),
    ]) {
      expect(codeOf(mixed)).toBe("ambiguous-rate");
      expect(isFault(mixed) && mixed.replace).toEqual([" as rad/s"]);
    }
    expect(codeOf(fits(hertz(1), kindOf(dimension(0, 0, -1))))).toBe("ambiguous-rate");
  });
});

describe("plain arithmetic", () => {
  test("like with like, dimensions of products, quotients and powers", () => {
    const weight = value(multiply(mass, of(1, "gn", 1)));
    expect(weight.value).toBeCloseTo(98.0665, 10);
    expect(weight.dimension).toEqual([1, 1, -2, 0, 0, 0, 0]);
    const stiffness = value(divide(weight, quantity(0.002, dimension(1))));
    expect(stiffness.dimension).toEqual([0, 1, -2, 0, 0, 0, 0]);
    const root = value(power(value(divide(stiffness, mass)), number(0.5)));
    expect(root.dimension).toEqual([0, 0, -1, 0, 0, 0, 0]);
    const back = value(power(value(power(mass, number(1 / 3))), number(3)));
    expect(back.dimension).toEqual(mass.dimension);
  });

  test("the number 0 fits any kind, another number does not", () => {
    expect(value(add(mass, number(0)))).toEqual(mass);
    expect(value(subtract(number(0), rate(3)))).toEqual(rate(-3));
    expect(fits(number(0), RATE)).toBeUndefined();
    expect(compare(number(0), mass)).toBeUndefined();
    expect(codeOf(add(mass, number(1)))).toBe("unit-mismatch");
  });

  test("a mismatch says what was expected and what was found", () => {
    const stiffness = kindOf(dimension(0, 1, -2));
    expect(fits(quantity(3, dimension(0, 1)), stiffness)).toEqual({
      code: "unit-mismatch",
      message: "expected a stiffness such as N/m, found a mass, 3 kg",
    });
    expect(fits(number(40), stiffness)?.message).toBe(
      "expected a stiffness such as N/m, found the number 40",
    );
    expect(codeOf(power(mass, mass))).toBe("unit-mismatch");
    expect(codeOf(statedAs(mass, meaning(["mm", 1])))).toBe("unit-mismatch");
  });

  test("`as` gives a bare number its unit", () => {
    expect(value(statedAs(number(26.5), meaning(["N", 1, "mm", -1]))).value).toBeCloseTo(26500, 8);
    expect(value(statedAs(number(1200), meaning(["rpm", 1])))).toEqual(rate(20));
    expect(value(statedAs(mass, meaning(["lbm", 1])))).toEqual(mass);
  });
});
