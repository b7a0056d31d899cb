import { describe, expect, test } from "vitest";
import { DEEPEST_EXPRESSION, MOST_OPERATORS } from "../../shared-core/syntax/expressions.ts";
import { grouped, read, said } from "./helpers.ts";

describe("grouping", () => {
  test.each([
    ["1 + 2 * 3 - 4", "((1 + (2 * 3)) - 4)"],
    ["a / b / c", "((a / b) / c)"],
    ["-2^2", "(- (2 ^ 2))"],
    ["2^-1", "(2 ^ (- 1))"],
    ["2^3^2", "(2 ^ (3 ^ 2))"],
    ["-a * b", "((- a) * b)"],
    ["--3", "(- (- 3))"],
    ["a * -b", "(a * (- b))"],
    ["a · b", "(a * b)"],
    ["(a + b) * c", "((a + b) * c)"],
    ["a + b as rad/s <= 3 Hz", "(((a + b) as {rad s-1}) <= 3 {Hz})"],
    ["k/m as Hz as rpm", "(((k / m) as {Hz}) as {rpm})"],
    ["if(a < b and not c >= d or e == f, 1, 2)", "if[(((a < b) and (not (c >= d))) or (e == f)), 1, 2]"],
    ["1 <= x <= 2", "((1 <= x) <= 2)"],
    ["atan2(y, x) * pi", "(atan2[y, x] * pi)"],
    ["transmissibility(run_up, feet, at: 2 Hz)", "transmissibility[run_up, feet, at: 2 {Hz}]"],
    ["clear_of_modes(a, orders: (1, 2))", "clear_of_modes[a, orders: <1, 2>]"],
    ["clear_of_modes(8 Hz to 2*12 Hz, orders: 1)", "clear_of_modes[[8 {Hz} to (2 * 12 {Hz})], orders: 1]"],
    ["genset.z.velocity - b.displacement", "(genset.z.velocity - b.displacement)"],
    ["mounts.rate", "mounts.rate"],
    ["sin (x)", "sin[x]"],
  ])("%s", (text, expected) => {
    expect(grouped(text)).toBe(expected);
  });
});

describe("units behind numbers", () => {
  test.each([
    ["420 kg", "420 {kg}"],
    ["3mm", "3 {mm}"],
    ["3 %", "3 {%}"],
    ["2.1e3 N*s/m", "2100 {N s m-1}"],
    ["3 N·m", "3 {N m}"],
    ["5 1/s", "5 {s-1}"],
    ["5 1/s^2", "5 {s-2}"],
    ["3 (m/s)", "3 {m s-1}"],
    ["3 N*s/(m*kg)", "3 {N s m-1 kg-1}"],
    ["3 (m/s)^2", "3 {m2 s-2}"],
    ["3 kg*m^2*s^-2", "3 {kg m2 s-2}"],
    ["3 µm", "3 {µm}"],
    ["1180 rev/s", "1180 {rev s-1}"],
    // The unit runs as far as there is no blank and each next factor is in the table.
    ["12 Hz*t", "12 {Hz t}"],
    ["12 Hz * t", "(12 {Hz} * t)"],
    ["500 N * cos(x)", "(500 {N} * cos[x])"],
    ["500 N*cos(x)", "(500 {N} * cos[x])"],
    ["500 N *s", "(500 {N} * s)"],
    ["500 N* s", "(500 {N} * s)"],
    ["500 N*wide", "(500 {N} * wide)"],
    ["3 m ^2", "(3 {m} ^ 2)"],
    ["2 Hz*(1 + x)", "(2 {Hz} * (1 + x))"],
    // A factor that is called, or that starts a path, is no unit.
    ["12 Hz*min(a, b)", "(12 {Hz} * min[a, b])"],
    ["12 Hz*m.velocity", "(12 {Hz} * m.velocity)"],
    // Nothing behind a name or a formula is a unit.
    ["1/s", "(1 / s)"],
    ["2*pi*12 Hz", "((2 * pi) * 12 {Hz})"],
    ["(310, 840, 760) kg*m^2", "<310, 840, 760> {kg m2}"],
    ["(1 m, -2 mm, 0)", "<1 {m}, (- 2 {mm}), 0>"],
  ])("%s", (text, expected) => {
    expect(grouped(text)).toBe(expected);
  });
});

describe("values", () => {
  test.each([
    ["26.5 N/mm +/- 10 % normal", "26.5 {N mm-1} +/- 10 {%} normal"],
    ["k ± 0.2 mm", "k +/- 0.2 {mm}"],
    ["k +/- 2 * s lognormal within 1 mm to 3 mm", "k +/- (2 * s) lognormal within [1 {mm} to 3 {mm}]"],
    ["k within 2*a to 3*a", "k within [(2 * a) to (3 * a)]"],
    ["600 rpm to 1500 rpm", "[600 {rpm} to 1500 {rpm}]"],
    ["from 2 Hz to 40 Hz", "[2 {Hz} to 40 {Hz}]"],
    ["mount from 20 N/mm to 30 N/mm", "mount [20 {N mm-1} to 30 {N mm-1}]"],
    ["5 % at 12 Hz", "5 {%} at 12 {Hz}"],
    ["a, b.c, 3 mm", "a, b.c, 3 {mm}"],
    ['"a ""b"" #1"', '"a \\"b\\" #1"'],
  ])("%s", (text, expected) => {
    expect(grouped(text)).toBe(expected);
  });
});

describe("what cannot be read is said once, with its place", () => {
  test.each([
    ["", "expected a value, and the line ends here"],
    ["(", "expected a value, and the line ends here"],
    ["()", "expected a value, found `)`"],
    ["(1, 2", "expected an operator, `,` or `)`, and the line ends here"],
    ["(1", "expected an operator or `)`, and the line ends here"],
    ["1 +", "expected a value, and the line ends here"],
    ["a, b,", "expected another item behind the comma, and the line ends here"],
    ["a,, b", "expected a value, found `,`"],
    ["* 2", "expected a value, found `*`"],
    ["a b", "expected an operator, `,` or the end of the line, found `b`"],
    ["3 3", "expected an operator, `,` or the end of the line, found `3`"],
    ["3 kg m", "expected an operator, `,` or the end of the line, found `m`"],
    ["unit.", "expected a name behind the dot, and the line ends here"],
    ["f(a,)", "expected another argument behind the comma, found `)`"],
    ["if + 1", "expected `(` behind `if`, as in `if(a < b, x, y)`, found `+`"],
    ["to + 1", "expected a value, found `to`"],
    ["1 to", "expected a value, and the line ends here"],
    ["from 1", "expected `to` and the other end of the range, and the line ends here"],
    ["k within 1", "expected `to` and the other end of the range, and the line ends here"],
    ["k as", "expected a unit, as in `x as rad/s`, and the line ends here"],
    ["(a + b) kg", "the unit `kg` stands behind a parenthesis; only a number or a tuple takes one"],
    ["3 m^0.5", "the power of a unit is a whole number, as in `m^2`"],
    ["3 m^n", "the power of a unit is a whole number, as in `m^2`"],
    ["3 m^100", "the power of a unit is a whole number, as in `m^2`"],
    ["x ≤ 3", "`≤` is written `<=` here"],
    ["3 mm²", "`²` is written `^2` here"],
    ["3 \u0001", "the character U+0001 has no meaning here"],
    ["3 € ", "`€` has no meaning here"],
    ["1e999", "`1e999` is beyond the largest number, about 1.8e308"],
    ['"open', "the text has no closing quote"],
    ['"open""', "the text has no closing quote"],
  ])("%s", (text, message) => {
    expect(grouped(text)).toBe(`syntax: ${message}`);
  });

  test("a name behind a number that is no unit, with the unit that was meant", () => {
    const parsed = read("thrum 1\nlet x = 3 rmp\n");
    expect(said(parsed)).toEqual(['unknown-unit "rmp"']);
    expect(parsed.diagnostics[0].fixes?.[0].edits[0].text).toBe("rpm");
    expect(grouped("x as furlong")).toBe("unknown-unit: `furlong` is not a unit");
    expect(grouped("3 x(2)")).toBe("syntax: expected an operator behind `3`, found `x`");
  });

  test("one fix cures all lookalikes of a line", () => {
    const parsed = read("thrum 1\nlet x = 3 mm² − 2 mm²\n");
    expect(parsed.diagnostics).toHaveLength(1);
    expect(parsed.diagnostics[0].fixes?.[0].edits.map((edit) => edit.text)).toEqual(["^2", "-", "^2"]);
  });
});

describe("depth and length are bounded", () => {
  test("60 parentheses deep is read", () => {
    expect(grouped(`${"(".repeat(60)}x${")".repeat(60)}`)).toBe("x");
    expect(grouped(`${"sin(".repeat(60)}x${")".repeat(60)}`)).toContain("sin[x]");
    expect(grouped(`${"(1 + ".repeat(60)}x${")".repeat(60)}`)).toContain("(1 + x)");
  });

  test.each(["(", "-", "not ", "f(", "2^", "(1 + ", "(1, ", "3 (", "a * ("])(
    "100,000 times `%s`",
    (piece) => {
      const parsed = read(`thrum 1\nlet x = ${piece.repeat(100_000)}\nlet y = 2\n`);
      expect(parsed.diagnostics).toHaveLength(1);
      expect(parsed.tree.statements).toHaveLength(2);
    },
  );

  test("one message says the limit", () => {
    expect(grouped("(".repeat(100_000))).toBe(
      `syntax: this expression is nested deeper than ${DEEPEST_EXPRESSION} levels`,
    );
    expect(grouped(`1${" + 1".repeat(100_000)}`)).toBe(
      `syntax: this expression has more than ${MOST_OPERATORS} operators; name parts of it with \`let\``,
    );
    expect(grouped(`1${" + 1".repeat(MOST_OPERATORS)}`)).toContain("1 + 1");
  });
});
