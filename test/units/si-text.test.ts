import { describe, expect, it } from "vitest";
import type { Dimension, Kind } from "../../shared-core/units/dimension.ts";
import { NUMBER, RATE } from "../../shared-core/units/quantity.ts";
import { siUnit } from "../../shared-core/units/si-text.ts";
import { unitOf } from "../../shared-core/units/unit-of.ts";
import { writtenUnit } from "../../shared-core/writing/units/written-unit.ts";

const kind = (...exponents: number[]): Kind => ({
  dimension: [0, 1, 2, 3, 4, 5, 6].map((i) => exponents[i] ?? 0) as unknown as Dimension,
  rate: false,
});

describe("the SI text of a kind", () => {
  it("names rates and bare numbers", () => {
    expect(siUnit(RATE)).toBe("Hz");
    expect(siUnit(NUMBER)).toBe("1");
  });

  it("means the kind it stands for, with factor 1", () => {
    const exponents = [-2, -1, 0, 1, 2];
    const kinds = exponents.flatMap((m) =>
      exponents.flatMap((kg) => exponents.flatMap((s) => [0, -1].map((a) => kind(m, kg, s, a)))),
    );
    const read = kinds
      .filter((each) => each.dimension.some((exponent) => exponent !== 0))
      .map((each) => {
        // Parentheses below the bar read as one factor each: kg/(m*s) is kg/m/s.
        const text = siUnit(each).replace(/\((.*)\)/, (_, inner: string) => inner.replaceAll("*", "/"));
        return { each, meaning: unitOf(writtenUnit(text)) };
      });
    expect(read.length).toBeGreaterThan(200);
    for (const { each, meaning } of read) {
      expect(meaning).toMatchObject({ factor: 1, kind: { dimension: each.dimension, rate: false } });
    }
  });

  it.each([
    [kind(0, 1, -2), "N/m"],
    [kind(0, 1, -1), "N*s/m"],
    [kind(1, 0, -2), "m/s^2"],
    [kind(2, 1, -2), "N*m"],
    [kind(0, 0, -1), "1/s"],
    [kind(-1, 1, -1), "kg/(m*s)"],
  ])("%o is %s", (each, text) => expect(siUnit(each)).toBe(text));
});
