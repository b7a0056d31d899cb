import { describe, expect, test } from "vitest";
import { lookupUnit } from "../../shared-core/units/lookup.ts";
import { loadOtherUnits } from "../../shared-core/units/other-units.ts";
import { nearestUnits } from "../../shared-core/units/unit-of.ts";
import { fault, meaning } from "./written.ts";

describe("units as written", () => {
  test("a product of factors", () => {
    const stiffness = meaning(["kN", 1, "mm", -1]);
    expect(stiffness.factor).toBeCloseTo(1e6, 6);
    expect(stiffness.kind).toEqual({ dimension: [0, 1, -2, 0, 0, 0, 0], rate: false });
    expect(meaning(["N", 1, "m", 1]).kind).toEqual(meaning(["N", 1, "m", 1, "rad", -1]).kind);
    expect(meaning(["1", 1, "s", -1]).kind.rate).toBe(false);
  });

  test.each([
    [["Hz", 1], 1],
    [["kHz", 1], 1000],
    [["rpm", 1], 1 / 60],
    [["cpm", 1], 1 / 60],
    [["rev", 1, "s", -1], 1],
    [["rev", 1, "min", -1], 1 / 60],
    [["rad", 1, "s", -1], 1 / (2 * Math.PI)],
    [["mrad", 1, "s", -1], 1 / (2000 * Math.PI)],
    [["deg", 1, "s", -1], 1 / 360],
  ] as const)("%j is a rate, held in Hz", (parts, factor) => {
    const found = meaning(parts);
    expect(found.kind.rate).toBe(true);
    expect(Math.abs(found.factor / factor - 1)).toBeLessThan(1e-15);
  });

  // language.md: "N*m/rpm is 9.549 N*m*s"; 60/(2 pi) = 9.549296585513720, the 9549 of the power formula.
  test("in a compound a turn counts 2 pi and a degree pi/180", () => {
    expect(meaning(["N", 1, "m", 1, "rpm", -1]).factor).toBeCloseTo(9.54929658551372, 12);
    expect(meaning(["N", 1, "m", 1, "cpm", -1]).factor).toBeCloseTo(9.54929658551372, 12);
    expect(meaning(["N", 1, "m", 1, "s", 1, "rev", -1]).factor).toBeCloseTo(1 / (2 * Math.PI), 15);
    expect(meaning(["N", 1, "m", 1, "s", 1, "deg", -1]).factor).toBeCloseTo(180 / Math.PI, 12);
    expect(meaning(["rpm", 1, "s", -1])).toMatchObject({ factor: (2 * Math.PI) / 60, kind: { rate: false } });
    expect(meaning(["deg", 1, "s", -2]).factor).toBeCloseTo(Math.PI / 180, 15);
  });

  test("Hz counts 1/s in a density and nowhere else", () => {
    const density = meaning(["gn", 2, "Hz", -1]);
    expect(density.factor).toBeCloseTo(96.1703842225, 9);
    expect(density.kind).toEqual({ dimension: [2, 0, -3, 0, 0, 0, 0], rate: false });
    expect(meaning(["m", 2, "s", -4, "kHz", -1]).factor).toBe(1e-3);
    for (const parts of [
      ["N", 1, "Hz", -1],
      ["Hz", 2],
      ["1", 1, "Hz", -1],
      ["m", 1, "Hz", 1],
    ] as const)
      expect(fault(...parts).code, parts.join(" ")).toBe("ambiguous-rate");
    expect(fault("N", 1, "s", 1, "Hz", 1).factorIndex).toBe(2);
  });

  test("an unknown unit says which factor, and what may be meant", () => {
    expect(fault("N", 1, "fathom", -1)).toMatchObject({ code: "unknown-unit", factorIndex: 1 });
    expect(fault("Nm", 1).message).toBe("there is no unit Nm");
    const meant = { Nm: "N*m", kNm: "kN*m", KN: "kN", hz: "Hz", RPM: "rpm", Kg: "kg", lb: "lbm", lbd: "lbf" };
    for (const [name, unit] of Object.entries(meant)) expect(nearestUnits(name)[0], name).toBe(unit);
    expect(nearestUnits("constructor")).toEqual([]);
    expect(nearestUnits("x".repeat(10_000))).toEqual([]);
  });
});

describe("units that the table does not hold", () => {
  test("are resolved by mathjs", async () => {
    const other = await loadOtherUnits();
    // NIST SP 811, B.8: yard and mile; 1 h is 3600 s.
    expect(lookupUnit("yd", other)).toMatchObject({ factor: 0.9144, dimension: [1, 0, 0, 0, 0, 0, 0] });
    expect(meaning(["mile", 1, "hour", -1], other).factor).toBeCloseTo(0.44704, 12);
    expect(lookupUnit("kilohertz", other)).toMatchObject({ factor: 1000, rate: true });
    expect(lookupUnit("min", other)?.factor).toBe(60);
  });

  test("refuses offsets, doubtful names, prefixes on other names and what is no name", async () => {
    const other = await loadOtherUnits();
    for (const name of [
      "degC",
      "degF",
      "lb",
      "ton",
      "cycle",
      "bit",
      "kyd",
      "N*m",
      "m/s",
      "",
      "toString",
      "2 m",
    ])
      expect(other(name), name).toBeUndefined();
  });
});
