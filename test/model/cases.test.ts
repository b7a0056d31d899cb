import { describe, expect, it } from "vitest";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import { check, codesOf, fixed, instanceOf, modelOf } from "./check.ts";

const BASE = `let mount = 26.5 N/mm +/- 10 % within 15 N/mm to 40 N/mm
let m = 420 kg +/- 5 kg normal
let twice = 2 * mount
let speed = 1180 rpm
mass unit = m
spring a between unit and ground = mount
spring b between unit and ground = twice
force f on unit
    amplitude = 1 N
    frequency = speed
`;

describe("cases", () => {
  it("replace numbers; a bare value keeps a percentage and the range, not an absolute tolerance", () => {
    const text = `${BASE}case soft\n    mount = 20 N/mm\n    m = 500 kg\ncase exact\n    mount = 30 N/mm +/- 1 N/mm within 10 N/mm to 50 N/mm`;
    const model = modelOf(text);
    expect(model.diagnostics).toEqual([]);
    expect(model.cases.map(({ name }) => name)).toEqual(["as written", "soft", "exact"]);
    const [written, soft, exact] = [0, 1, 2].map((index) => instantiate(model, index));
    expect(written.assembly.elements.map(({ stiffness }) => stiffness)).toEqual([26500, 53000]);
    expect(soft.assembly.elements.map(({ stiffness }) => stiffness)).toEqual([20000, 40000]);
    const of = (instance: typeof soft, name: string) => instance.parameters.get(name);
    expect(of(written, "mount")).toMatchObject({
      low: 23850,
      high: 29150,
      range: [15000, 40000],
      written: "26.5 N/mm",
    });
    expect(of(soft, "mount")).toMatchObject({
      low: 18000,
      high: 22000,
      range: [15000, 40000],
      written: "20 N/mm",
    });
    expect(of(soft, "m")).toMatchObject({ value: 500, written: "500 kg" });
    expect(of(soft, "m")?.low).toBeUndefined();
    expect(of(exact, "mount")).toMatchObject({ low: 29000, high: 31000, range: [10000, 50000] });
    expect(of(soft, "mount")?.unitNode?.text).toBe("N/mm");
  });

  it("may use other numbers, whatever the order", () => {
    const model = modelOf(`${BASE}case odd\n    mount = twice_m * 1 N/mm / (1 kg)\nlet twice_m = 2 * m / 10`);
    expect(model.diagnostics).toEqual([]);
    expect(instantiate(model, 1).parameters.get("mount")?.value).toBe(84000);
  });

  it("are marked where they are wrong", () => {
    check(`${BASE}
case c1
    mont = 3 N/mm
#   ^^^^ unknown-name a case replaces numbers that \`let\` defines
case c2
    mount = 3 kg
#           ^^^^ unit-mismatch \`mount\` is \`26.5 N/mm\` as written
case c3
    unit = 3 kg
#   ^^^^ wrong-kind \`unit\` is a mass
case c4
    mount = twice
#   ^^^^^ circular-definition in case \`c4\` \`mount\` is defined by itself
case c5
    mount = 3 N/mm, 4 N/mm
#           ^^^^^^ wrong-kind
case c1
#    ^^ duplicate-name
    mount = 3 N/mm
`);
  });

  it("say which case a number fails in", () => {
    const model = modelOf(
      `${BASE}case none\n    m = 0 kg\ncase half\n    mount = 1 N/mm / zero\nlet zero = 0`,
    );
    expect(model.diagnostics.map(({ code }) => code)).toEqual(["not-positive"]);
    const text = modelOf(`${BASE}case none\n    m = 0 kg`);
    const instance = instantiate(text, 1);
    expect(instance.sound).toBe(false);
    expect(instance.diagnostics).toMatchObject([{ code: "not-positive", case: "none" }]);
    expect(instantiate(text, 0).diagnostics).toEqual([]);
  });
});

describe("tolerances", () => {
  it("are one draw each where they are written", () => {
    const model = modelOf(
      `${BASE}spring c between unit and ground = 3 N/mm +/- 20 % uniform\n    count = 4\n    loss_factor = 3 % +/- 1 %\nspring d between unit and ground = 5 N/mm\n    count = 2\nspring g between unit and ground\n    like = c`,
    );
    expect(model.draws.map(({ owner, distribution, copies }) => [owner, distribution, copies])).toEqual([
      ["mount", "uniform", 1],
      ["m", "normal", 1],
      ["c.stiffness", "uniform", 4],
      ["c.loss_factor", "uniform", 4],
      ["g.stiffness", "uniform", 4],
      ["g.loss_factor", "uniform", 4],
    ]);
  });

  it("move a number inside its band, in percent, absolute, and by its logarithm", () => {
    const model = modelOf(
      `let a = 100 N/m +/- 10 %\nlet b = 100 N/m +/- 20 N/m normal\nlet c = 100 N/m +/- 25 % lognormal\nlet scatter = 5 %\nlet d = 100 N/m +/- scatter\nlet f = 30 % +/- 10 %\nlet g = 3 +/- 0.5`,
    );
    expect(model.diagnostics).toEqual([]);
    const at = (position: number) => {
      const draws = new Map(model.draws.map(({ id }) => [id, position]));
      return [...instantiate(model, 0, { draws }).parameters.values()]
        .filter(({ draw }) => draw !== undefined)
        .map(({ value }) => Number(value.toPrecision(9)));
    };
    expect(at(0)).toEqual([100, 100, 100, 100, 0.3, 3]);
    expect(at(1)).toEqual([110, 120, 125, 105, 0.33, 3.5]);
    expect(at(-1)).toEqual([90, 80, 80, 95, 0.27, 2.5]);
    expect(at(0.5)).toEqual([105, 110, Number((100 * Math.sqrt(1.25)).toPrecision(9)), 102.5, 0.315, 3.25]);
  });

  it("of a let move everything that uses it together", () => {
    const model = modelOf(BASE);
    const { assembly } = instantiate(model, 0, { draws: new Map([[0, 1]]) });
    expect(assembly.elements.map(({ stiffness }) => Number(stiffness.toPrecision(9)))).toEqual([
      29150, 58300,
    ]);
  });

  it("are marked where they are wrong", () => {
    check(`
let a = 3 kg +/- 0.1
#                ^^^ missing-unit a tolerance is a share of the value, in %, or a number in the unit of the value
let b = 3 kg +/- 10 mm
#                ^^^^^ unit-mismatch
let c = 3 kg +/- -3 %
#                ^^^^ not-positive a tolerance is not negative
let d = 3 kg within 5 kg to 2 kg
#                   ^^^^^^^^^^^^ wrong-kind the range runs from 5 kg to 2 kg
let f = 3 kg within 1 kg to 2 N
#                             ^ weight-as-mass
`);
    expect(fixed("let a = 3 kg +/- 0.1", "Write `0.1 kg`")).toContain("+/- 0.1 kg");
  });
});

describe("overrides", () => {
  it("replace a let, and what depends on it follows", () => {
    const model = modelOf(BASE);
    const { assembly, parameters } = instantiate(model, 0, { parameters: new Map([["mount", 1000]]) });
    expect(assembly.elements.map(({ stiffness }) => stiffness)).toEqual([1000, 2000]);
    expect(parameters.get("mount")).toMatchObject({ value: 1000, low: 900, high: 1100 });
  });

  it("that leave no number are said, never passed on", () => {
    const instance = instantiate(modelOf(BASE), 0, { parameters: new Map([["m", Number.NaN]]) });
    expect(instance.sound).toBe(false);
    expect(instance.diagnostics.length).toBeGreaterThan(0);
  });

  it("out of range of the cases take the nearest", () => {
    expect(instantiate(modelOf(BASE), 7).caseIndex).toBe(0);
    expect(codesOf(BASE)).toEqual([]);
    expect(instanceOf(BASE).sound).toBe(true);
  });
});
