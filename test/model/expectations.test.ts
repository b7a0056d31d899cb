import { describe, expect, it } from "vitest";
import { evaluateExpression } from "../../shared-core/model/instantiate.ts";
import type { AnswerArguments } from "../../shared-core/model/model.ts";
import { fail, succeed } from "../../shared-core/numerics/outcome.ts";
import { RATE } from "../../shared-core/units/quantity.ts";
import { check, codesOf, fixed, instanceOf, modelOf } from "./check.ts";

const BASE = `let mount = 12 kN/m
let f0 = 20 Hz
mass unit = 420 kg
inertia rotor = 3 kg*m^2
spring twist between rotor and ground = 3 kN*m
spring a between unit and ground = mount
damper b between unit and ground = 3 kN*s/m
group feet = a, b
force shaker on unit
    amplitude = 3 N
    frequency = 2 Hz to 30 Hz
ask sweep run
    of = unit.velocity
    from = 1 Hz
    to = f0
ask history h
    of = unit.velocity
    by = shaker
    lasting = 3 s
limit zone = 3 mm/s
case soft
    mount = 8 kN/m
`.replace("    by = shaker\n", "");

describe("expectations", () => {
  it("are one comparison, or a value between two bounds", () => {
    const model = modelOf(
      `${BASE}expect one = natural_frequency(1) <= 0.35 * f0\nexpect two = 3 Hz <= natural_frequency(1) <= 9 Hz\nexpect three = 9 Hz >= natural_frequency(1) >= 3 Hz`,
    );
    expect(model.diagnostics).toEqual([]);
    const text = model.tree.text;
    const shown = model.expectations.map(({ name, left, operator, right }) => [
      name,
      text.slice(left.span.start, left.span.end),
      operator,
      text.slice(right.span.start, right.span.end),
    ]);
    expect(shown).toEqual([
      ["one", "natural_frequency(1)", "<=", "0.35 * f0"],
      ["two.low", "natural_frequency(1)", ">=", "3 Hz"],
      ["two.high", "natural_frequency(1)", "<=", "9 Hz"],
      ["three.low", "natural_frequency(1)", ">=", "3 Hz"],
      ["three.high", "natural_frequency(1)", "<=", "9 Hz"],
    ]);
  });

  it("hold margin, cases and tolerance", () => {
    const [first, second] = modelOf(
      `${BASE}expect one = damping_ratio(1) >= 3 %\n    margin = 10 %\n    cases = soft\n    tolerance = worst_case\nexpect two = damping_ratio(1) >= 3 %\n    tolerance = 99 %`,
    ).expectations;
    expect(first).toMatchObject({ margin: 0.1, cases: ["soft"], tolerance: "worst_case" });
    expect(second).toMatchObject({ cases: undefined, tolerance: { share: 0.99 } });
  });

  it("are marked where they are wrong", () => {
    check(
      `${BASE}
expect x1 = natural_frequency(1) <= 3
#                                   ^ missing-unit expected a rate such as Hz
expect x2 = natural_frequncy(1) <= 3 Hz
#           ^^^^^^^^^^^^^^^^ unknown-name there is no function \`natural_frequncy\`
expect x3 = natural_frequency(1 Hz) <= 3 Hz
#                             ^^^^ unit-mismatch expected a number, found a rate, 1 Hz
expect x4 = natural_frequency() <= 3 Hz
#           ^^^^^^^^^^^^^^^^^^^ missing-detail
expect x5 = peak(rn, unit.velocity) <= 3 mm/s
#                ^^ unknown-name
expect x6 = peak(run, unit.velocity) <= 3 mm
#                                       ^^^^ unit-mismatch expected a velocity such as mm/s, found a length, 3 mm
expect x7 = peak(run, unit.angle) <= 3 mm
#                          ^^^^^ unknown-name
expect x8 = value(run, unit.velocity) <= 3 mm/s
#           ^^^^^^^^^^^^^^^^^^^^^^^^^ missing-detail
expect x9 = value(run, unit.velocity, 3 Hz) <= 3 mm/s
#                                     ^^^^ wrong-kind is written with its name
expect y1 = value(run, unit.velocity, at: 3 s) <= 3 mm/s
#                                         ^^^ unit-mismatch expected a rate such as Hz, found a time, 3 s
expect y2 = value(h, unit.velocity, at: 3 Hz) <= 3 mm/s
#                                       ^^^^ unit-mismatch expected a time
expect y3 = transmissibility(h, feet, at: f0) <= 12 %
#                            ^ wrong-kind \`h\` asks for history; \`transmissibility\` reads a sweep
expect y4 = natural_frequency(1) == 3 Hz
#                                ^^ wrong-kind a computed number is never exactly another
expect y5 = natural_frequency(1) <= 3 Hz and natural_frequency(1) >= 1 Hz
#                                        ^^^ wrong-kind two conditions are two \`expect\` lines
expect y6 = natural_frequency(1)
#           ^^^^^^^^^^^^^^^^^^^^ wrong-kind
expect y7 = below(run, unit.velocity, zx) <= 1
#                                     ^^ unknown-name
expect y8 = sensitivity(natural_frequency(1), mont) <= 1
#                                             ^^^^ unknown-name
expect y9 = static_deflection(unit) <= 3 mm
#                             ^^^^ wrong-kind \`unit\` is a mass; expected a joining element or group
expect z1 = effective_mass(1, lin) >= 3 %
#                             ^^^ wrong-kind
expect z2 = stability_margin() >= 3 Hz
#                                 ^^^^ ambiguous-rate
expect z3 = separation(1, f0) <= unit.velocity
#                                ^^^^^^^^^^^^^ wrong-kind varies with frequency or time
expect z4 = crossing_rate(run, unit.velocity) <= 3 Hz
#                         ^^^ wrong-kind
expect z5 = 3 Hz <= natural_frequency(1) >= 9 Hz
#           ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ wrong-kind
expect z6 = natural_frequency(1) <= 3 Hz +/- 3 %
#           ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ wrong-kind
expect z7 = damping_ratio(1) >= 3 %
    margin = 3 Hz
#            ^^^^ unit-mismatch
    cases = soft, hard
#                 ^^^^ unknown-name
    tolerance = worstcase
#               ^^^^^^^^^ wrong-kind
expect z8 = static_deflection(twist) <= 3 mm
#                                       ^^^^ unit-mismatch
expect z9 = 3 kg <= 3 N
#                   ^^^ unit-mismatch
`.replace(/expect z4.*\n#.*\n/, ""),
    );
  });

  it("say once that a function is not computed, and leave the others", () => {
    const model = check(`${BASE}
expect x1 = period(unit, 3 deg) <= 3 s
#           ^^^^^^ not-yet-computed \`period\`
expect x2 = natural_frequency(1) <= 3 Hz
`);
    expect(model.buildable).toBe(true);
    const instance = instanceOf(BASE);
    const [first] = model.expectations;
    expect(evaluateExpression(instance, first.left, () => fail("never asked")).ok).toBe(false);
  });

  it("have fixes", () => {
    expect(fixed(`${BASE}expect z = stability_margin() >= 3 Hz`, "Write `1/s`")).toContain(">= 3 1/s");
    expect(
      fixed(`${BASE}expect z = damping_ratio(1) >= 3 %\n    tolerance = worstcase`, "Write `worst_case`"),
    ).toContain("= worst_case");
    expect(codesOf(`${BASE}expect z = peak(run, unit.velocity - 2 * unit.velocity) <= zone`)).toEqual([
      "wrong-kind",
    ]);
  });
});

describe("evaluating with answers", () => {
  const seen: [string, AnswerArguments][] = [];
  const evaluate = (expression: string, caseIndex = 0) => {
    seen.length = 0;
    const instance = instanceOf(`${BASE}expect z = ${expression} >= 0`, caseIndex);
    const [{ left }] = instance.model.expectations;
    return evaluateExpression(instance, left, (call, args) => {
      seen.push([call.callee.text, args]);
      return call.callee.text === "damped_frequency" ? fail("overdamped") : succeed({ ...RATE, value: 4 });
    });
  };

  it("hands resolved arguments to the answers, inner calls first", () => {
    const found = evaluate("value(run, unit.velocity, at: 2 * natural_frequency(1)) / (1 mm/s)");
    expect(found).toMatchObject({ ok: true, value: { value: 4000 } });
    expect(seen.map(([name]) => name)).toEqual(["natural_frequency", "value"]);
    expect(seen[0][1].mode).toMatchObject({ is: "number", quantity: { value: 1 } });
    expect(seen[1][1]).toMatchObject({
      ask: { is: "ask", ask: { name: "run", toHz: 20 } },
      quantity: { is: "series", quantity: { text: "unit.velocity" } },
      at: { is: "number", quantity: { value: 8, rate: true } },
    });
  });

  it("resolves elements, groups, drives, ranges, lists, lets, limits, words and expressions", () => {
    evaluate("transmissibility(run, feet, at: f0)");
    expect(seen[0][1].of).toMatchObject({
      is: "element",
      name: "feet",
      elements: [1, 2],
      force: { unit: "N" },
    });
    evaluate("clear_of_modes(shaker, orders: (1, 2))");
    expect(seen[0][1]).toMatchObject({
      rate: { is: "range", from: { value: 2 }, to: { value: 30 } },
      orders: { values: [1, 2] },
    });
    evaluate("clear_of_modes(2 Hz to 480 rpm, orders: (1))");
    expect(seen[0][1]).toMatchObject({ rate: { is: "range", to: { value: 8 } }, orders: { values: [1] } });
    evaluate("clear_of_modes(f0)");
    expect(seen[0][1]).toMatchObject({ rate: { is: "number", quantity: { value: 20 } } });
    evaluate("below(run, unit.velocity, zone)");
    expect(seen[0][1].limit).toMatchObject({ is: "limit", limit: { points: 0.003 } });
    evaluate("effective_mass(1, line)");
    expect(seen[0][1].direction).toEqual({ is: "word", word: "line" });
    evaluate("settling_time(h, unit.velocity, 2 %) / (1 s)");
    expect(seen[0][1].band).toMatchObject({ is: "number", quantity: { value: 0.02 } });
    evaluate("settling_time(h, unit.velocity, 2 mm/s) / (1 s)");
    expect(seen[0][1].band).toMatchObject({ is: "number", quantity: { value: 0.002 } });
  });

  it("evaluates the expression of a sensitivity by itself", () => {
    evaluate("sensitivity(natural_frequency(1) / f0, mount)");
    const { quantity, parameter } = seen[0][1];
    expect(parameter).toEqual({ is: "let", name: "mount" });
    if (quantity?.is !== "expression") throw new Error("no expression");
    const instance = instanceOf(`${BASE}expect z = sensitivity(natural_frequency(1) / f0, mount) >= 0`);
    const again = instance.model.expectations[0].left;
    if (again.kind !== "call") throw new Error("no call");
    const inner = evaluateExpression(instance, again.positional[0], () => succeed({ ...RATE, value: 4 }));
    expect(inner).toMatchObject({ ok: true, value: { value: 0.2, rate: false } });
  });

  it("fails with the reason of the answer, or of a number that is none", () => {
    expect(evaluate("damped_frequency(1) / f0")).toEqual({ ok: false, reason: "overdamped" });
    expect(evaluate("1 / (natural_frequency(1) / (4 Hz) - 1)")).toEqual({
      ok: false,
      reason: "this is zero, and zero divides nothing",
    });
  });

  it("takes the numbers of the case", () => {
    expect(evaluate("mount / (1 kN/m) + natural_frequency(1) / (4 Hz)", 1)).toMatchObject({
      ok: true,
      value: { value: 9 },
    });
  });
});
