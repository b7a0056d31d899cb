import { describe, expect, test } from "vitest";
import { convertNumber, digitsOf } from "../../shared-core/units/convert.ts";
import { describeKind, likelyUnits } from "../../shared-core/units/describe.ts";
import { isFault } from "../../shared-core/units/fault.ts";
import { KNOWN_KINDS, unitFromText } from "../../shared-core/units/known-kinds.ts";
import {
  dimension,
  kindOf,
  NUMBER,
  quantity,
  RATE,
  rate,
  sameKind,
} from "../../shared-core/units/quantity.ts";
import { formatNumber, formatQuantity, siUnit } from "../../shared-core/units/show.ts";
import { SLIPS, slipIn } from "../../shared-core/units/slips.ts";
import { unitOf } from "../../shared-core/units/unit-of.ts";
import { meaning, written } from "./written.ts";

const of = (value: number, text: string) => {
  const unit = unitFromText(text);
  return { ...unit.kind, value: value * unit.factor };
};

describe("numbers for people", () => {
  test.each([
    [0.35, "0.35"],
    [26500, "26500"],
    [19.666666, "19.67"],
    [1234567, "1.235e6"],
    [0.000012, "1.2e-5"],
    [-0.1 - 0.2, "-0.3"],
    [-0, "0"],
    [999999, "1e6"],
    [Number.NaN, "no number"],
    [Number.POSITIVE_INFINITY, "infinite"],
  ])("%d reads %s", (value, text) => {
    expect(formatNumber(value)).toBe(text);
  });

  test("more digits on demand, no trailing noise", () => {
    expect(formatNumber(0.1 + 0.2, 12)).toBe("0.3");
    expect(formatNumber(1 / 3, 6)).toBe("0.333333");
  });

  test("a quantity as written, in SI and in inch units", () => {
    const mount = of(26.5, "N/mm");
    expect(formatQuantity(mount, { unit: unitFromText("N/mm") })).toBe("26.5 N/mm");
    expect(formatQuantity(mount, { unit: unitFromText("N/mm"), system: "si" })).toBe("26.5 kN/m");
    expect(formatQuantity(mount, { system: "inch" })).toBe("151.3 lbf/in");
    expect(formatQuantity(of(9.6, "t"))).toBe("9.6 t");
    expect(formatQuantity(of(4.2, "mm/s"))).toBe("4.2 mm/s");
    expect(formatQuantity(of(30, "g*mm"))).toBe("30 g*mm");
    expect(formatQuantity(rate(19.6666))).toBe("19.67 Hz");
    expect(formatQuantity(rate(0.05))).toBe("0.05 Hz");
    expect(formatQuantity(quantity(0, dimension(1)))).toBe("0 m");
    expect(formatQuantity({ ...NUMBER, value: 0.0312 })).toBe("0.0312");
    expect(formatQuantity(quantity(2, [3, 0, -2, 1, 0, 0, 0]))).toBe("2 m^3*A/s^2");
  });

  test("units of one size up are taken through rounding", () => {
    expect(formatQuantity(quantity(999.9999999999999, dimension(1, 1, -2)))).toBe("1 kN");
  });
});

describe("kinds in words", () => {
  test("name a unit that a person uses", () => {
    expect(describeKind(kindOf(dimension(0, 1, -2)))).toBe("a stiffness such as N/m");
    expect(describeKind(kindOf(dimension(0, 1)))).toBe("a mass such as kg");
    expect(describeKind(RATE)).toBe("a rate such as Hz");
    expect(describeKind(NUMBER)).toBe("a number without a unit");
    expect(describeKind(kindOf(dimension(2, 0, -3)))).toBe("an acceleration density such as (m/s^2)^2/Hz");
    expect(describeKind(kindOf(dimension(5, 1)))).toBe("a quantity in kg*m^5");
  });

  test("every known kind has an SI unit of factor 1, and scales and inch unit of its kind", () => {
    for (const known of KNOWN_KINDS) {
      if (known.kind.rate || known.si === "1") continue;
      expect(unitFromText(known.si).factor, known.si).toBe(1);
      for (const scale of [...known.scales, ...(known.inch ? [known.inch] : [])])
        expect(sameKind(scale.kind, known.kind), scale.text).toBe(true);
      expect(known.scales.map(({ factor }) => factor)).toEqual(
        known.scales.map(({ factor }) => factor).sort((a, b) => a - b),
      );
    }
  });

  test("every likely unit is of the kind it is offered for", () => {
    for (const { kind } of KNOWN_KINDS) {
      for (const text of likelyUnits(kind)) {
        const found = unitOf(writtenFrom(text));
        expect(isFault(found), text).toBe(false);
        if (!isFault(found)) expect(sameKind(found.kind, kind), text).toBe(true);
      }
    }
  });

  test("SI text of what every statement needs", () => {
    const texts = ["N/m", "N*s/m", "kg*m^2", "m/s^2", "N*m", "Pa", "N/m^3", "1/s", "ohm", "F", "H", "N/A"];
    for (const text of texts) expect(siUnit(unitFromText(text).kind)).toBe(text);
    expect(siUnit(RATE)).toBe("Hz");
    expect(siUnit(NUMBER)).toBe("1");
  });
});

describe("conversion keeps digits", () => {
  test.each([
    ["26.5", "N/mm", "N/m", "26500"],
    ["3", "in", "mm", "76.2"],
    ["9.6", "t", "kg", "9600"],
    ["1", "lbm", "g", "454"],
    ["420", "kg", "lbm", "926"],
    ["1180", "rpm", "Hz", "19.67"],
    ["0.030", "kN/m", "lbf/in", "0.171"],
    ["0", "kg", "lbm", "0"],
    ["-4", "mm", "m", "-0.004"],
  ])("%s %s is %s: %s", (number, from, to, expected) => {
    const found = convertNumber(number, unitFromText(from), unitFromText(to));
    const back = (Number(found) * unitFromText(to).factor) / unitFromText(from).factor;
    if (Number(number) !== 0)
      expect(Number(back.toPrecision(digitsOf(number)))).toBeCloseTo(Number(number), 12);
    expect(found).toBe(expected);
  });

  test("counts significant digits", () => {
    expect(["420", "2.1e3", "0.030", "0"].map(digitsOf)).toEqual([3, 2, 2, 0]);
  });
});

describe("slips", () => {
  const massKind = kindOf(dimension(0, 1));
  const acceleration = kindOf(dimension(1, 0, -2));

  test("a weight where a mass is wanted", () => {
    expect(slipIn(written("lbf", 1), massKind)).toMatchObject({
      code: "weight-as-mass",
      to: "lbm",
      ratio: 1,
    });
    expect(slipIn(written("kip", 1), massKind)).toMatchObject({ to: "lbm", ratio: 1000 });
    expect(slipIn(written("kN", 1), massKind)?.ratio).toBeCloseTo(101.971621297793, 10);
    expect(slipIn(written("lbf", 1, "in", 2), kindOf(dimension(2, 1)))).toMatchObject({ to: "lbm" });
  });

  test("gram where gravity is meant, also in a density", () => {
    expect(slipIn(written("g", 1), acceleration)).toMatchObject({
      code: "gram-as-gravity",
      to: "gn",
      ratio: 1,
    });
    const density = slipIn(written("g", 2, "Hz", -1), kindOf(dimension(2, 0, -3)));
    expect(density).toMatchObject({ code: "gram-as-gravity", factorIndex: 0 });
    expect(slipIn(written("mg", 1), acceleration)?.ratio).toBe(1e-3);
  });

  test("none where no factor explains it", () => {
    expect(slipIn(written("kg", 1), acceleration)).toBeUndefined();
    expect(slipIn(written("N", 1, "m", -1), massKind)).toBeUndefined();
  });

  test("each replaces one unit of the table by another and keeps the physics", () => {
    for (const { from, to, ratio } of SLIPS) {
      const [a, b] = [meaning([from, 1]), meaning([to, 1])];
      const gravity = a.kind.dimension[2] === -2 ? 9.80665 : 1;
      if (to !== "gn") expect((b.factor * ratio * gravity) / a.factor, from).toBeCloseTo(1, 12);
    }
  });
});

/** Unit text with one level of parentheses, as offered in completion. */
function writtenFrom(text: string): Parameters<typeof unitOf>[0] {
  const flat = text.replace(/\(([^)]*)\)\^2/g, (_, inner: string) =>
    inner.replace(
      /([A-Za-z]+)(?:\^(\d))?/g,
      (__, name: string, power?: string) => `${name}^${2 * Number(power ?? 1)}`,
    ),
  );
  const factors = [...flat.matchAll(/([*/]?)([^*/^]+)(?:\^(-?\d+))?/g)].map(([, sign, name, power]) => ({
    name,
    power: (sign === "/" ? -1 : 1) * Number(power ?? 1),
  }));
  return { text, factors };
}
