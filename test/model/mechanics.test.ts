import { describe, expect, it } from "vitest";
import { check, codesOf, fixed, instanceOf, modelOf } from "./check.ts";

describe("what moves and what joins", () => {
  it("becomes coordinates, inertias and elements in SI", () => {
    const { assembly } = instanceOf(`
mass unit = 420 kg
    starts_at = 2 mm
    weight = negative
inertia rotor = 0.8 kg*m^2
    starts_moving = 60 rpm
junction foot
support floor
spring mounts between unit and foot = 26.5 N/mm
    count = 4
    loss_factor = 3 %
    rated_travel = 8 mm
damper oil between foot and floor = 2.1 kN*s/m
spring shaft_end between rotor and ground = 3 kN*m/rad
    damping_ratio = 5 % at 12 Hz
inerter flywheel between unit and ground = 12 kg
spring heavy between unit and ground = 1 N/mm
    mass = 6 kg
`);
    expect(assembly.free).toBe(3);
    expect(assembly.coordinates.map(({ name, motion, massless }) => [name, motion, massless])).toEqual([
      ["unit", "sliding", false],
      ["rotor", "turning", false],
      ["foot", "sliding", true],
    ]);
    expect(assembly.coordinates[0]).toMatchObject({ startsAt: 0.002, weight: -1 });
    expect(assembly.coordinates[1].startsMoving).toBeCloseTo(2 * Math.PI, 12);
    expect(assembly.supports).toEqual([{ name: "floor", motion: "sliding" }]);
    const [mounts, oil, shaftEnd] = assembly.elements;
    expect(mounts).toMatchObject({ stiffness: 106000, count: 4, lossFactor: 0.03, ratedTravel: 0.008 });
    expect(mounts.form).toEqual({ coordinates: [0, 2], factors: [1, -1], supports: [], supportFactors: [] });
    expect(oil.form).toEqual({ coordinates: [2], factors: [1], supports: [0], supportFactors: [-1] });
    expect(shaftEnd.damping).toBeCloseTo((2 * 0.05 * 3000) / (2 * Math.PI * 12), 9);
    expect(assembly.inertias.map(({ owner, value }) => [owner, value])).toEqual([
      ["unit", 420],
      ["rotor", 0.8],
      ["flywheel", 12],
      ["heavy", 1.5],
      ["heavy", 0.5],
    ]);
  });

  it("takes details from another element with `like`; its own win", () => {
    const { assembly } = instanceOf(`
mass a = 1 kg
mass b = 2 kg
spring s1 between a and ground = 3 N/mm
    loss_factor = 3 %
    count = 2
spring s2 between b and ground
    like = s1
    count = 3
spring s3 between a and b
    like = s2
`);
    expect(
      assembly.elements.map(({ stiffness, lossFactor, count }) => [stiffness, lossFactor, count]),
    ).toEqual([
      [6000, 0.03, 2],
      [9000, 0.03, 3],
      [9000, 0.03, 3],
    ]);
  });

  it("marks what does not fit", () => {
    check(
      `
mass a = 3 kg
mass b = 450 lbf
#            ^^^ weight-as-mass 450 lbf is a weight, and a mass belongs here; 450 lbm?
mass c = 40
#        ^^ missing-unit expected a mass such as kg, found \`40\` without a unit
mass d = -3 t
#        ^^^^ not-positive \`mass\` is to be above zero, found -3 t
mass f
#    ^ missing-detail \`mass f\` needs \`mass\`
mass h = 3 kg
    weight = down
#            ^^^^ wrong-kind \`weight\` is \`off\`, \`positive\` or \`negative\`, found \`down\`
inertia rot = 3 kg
#             ^^^^ unit-mismatch expected a moment of inertia such as kg*m^2, found a mass, 3 kg
inertia wheel = 3 kg*m^2
junction j
    kind = turnng
#          ^^^^^^ wrong-kind found \`turnng\`
spring s1 between a and ground = 3 kg
#                                ^^^^ unit-mismatch expected a stiffness such as N/mm, found a mass, 3 kg
spring s2 between wheel and ground = 3 N/mm
#                                    ^^^^^^ unit-mismatch a torsional spring between angles needs N*m/rad
spring s3 between wheel and a = 3 N/mm
#                           ^ wrong-kind \`wheel\` turns and \`a\` slides
spring s4 between ground and ground = 3 N/mm
#                            ^^^^^^ wrong-kind both ends
spring s5 between a and a = 3 N/mm
#                       ^ wrong-kind both ends of this spring are \`a\`
spring s6 between a and bb = 3 N/mm
#                       ^^ unknown-name
spring s7 between a and ground
#      ^^ missing-detail \`spring s7\` needs \`stiffness\`
spring s8 between a and ground = 3 N/mm
    damping_ratio = 5 %
#                   ^^^ wrong-kind \`damping_ratio\` takes a value at a rate
spring s9 between a and ok = 3 N/mm
#                       ^^ wrong-kind \`ok\` is a spring
spring s10 between a.z and ground = 3 N/mm
#                    ^ unknown-name \`a\` moves one way only
spring s11 between a and ground = 3 N/mm
    count = 2.5
#           ^^^ wrong-kind \`count\` is a whole number, found 2.5
spring s12 between a and ground = 3 N/mm
    count = 4 kg
#           ^^^^ unit-mismatch
spring ok between a and ground = 3 N/mm
damper d1 between a and ground = 3 N/mm
#                                ^^^^^^ unit-mismatch expected a damping such as N*s/m
`,
    );
  });

  it("says once what is read and not computed", () => {
    check(`
mass a = 3 kg
spring s between a and ground = 3 N/mm
    cubic = 3 N/m^3
#   ^^^^^ not-yet-computed \`cubic\` is read, and this version does not compute it yet
pendulum p = 3 kg
#<^^^^^^^ not-yet-computed
    length = 2 m
spring u2 between p and ground = 3 N*m
ask sweep
    of = p.angle, a.displacement
    from = 1 Hz
    to = 3 Hz
force f on a
expect fine = peak(sweep, a.displacement) <= 3 mm
`);
  });

  it("says a circle of `like` and one of another keyword", () => {
    check(`
mass a = 3 kg
spring s1 between a and ground = 3 N/mm
    like = s2
spring s2 between a and ground = 3 N/mm
    like = s1
#          ^^ circular-definition
spring s3 between a and ground = 3 N/mm
    like = d
#          ^ wrong-kind
damper d between a and ground = 3 N*s/m
`);
  });

  it("holds supports of kind body by their directions", () => {
    const text = "mass a = 3 kg\nsupport deck\n    kind = body\nspring s between a and deck.z = 3 N/mm\n";
    const { assembly } = instanceOf(text);
    expect(assembly.elements[0].form.supports).toEqual([2]);
    expect(assembly.supports.map(({ name, motion }) => `${name} ${motion}`)).toContain("deck.rx turning");
    expect(fixed(text.replace("deck.z", "deck"), "Write `deck.z`")).toBe(text);
    expect(codesOf(text.replace("deck.z", "deck.q"))).toEqual(["unknown-name"]);
  });

  it("puts assumptions in, with their standards", () => {
    const plain = instanceOf("mass a = 3 kg").assembly;
    expect([
      plain.gravity,
      plain.modalDamping,
      plain.massDamping,
      plain.stiffnessDamping,
      plain.resonanceBand,
    ]).toEqual([9.80665, 0, 0, 0, 0.2]);
    const given = instanceOf(
      "mass a = 3 kg\nassume gravity = 1.62 m/s^2\nassume modal_damping = 1 %\nassume mass_damping = 0.3 1/s\nassume stiffness_damping = 2 ms\nassume resonance_band = 15 %",
    ).assembly;
    expect([
      given.gravity,
      given.modalDamping,
      given.massDamping,
      given.stiffnessDamping,
      given.resonanceBand,
    ]).toEqual([1.62, 0.01, 0.3, 0.002, 0.15]);
    expect(codesOf("assume gravity = 1 g")).toEqual(["gram-as-gravity"]);
    expect(codesOf("assume gravity = 1 gn\nassume gravity = 1 gn")).toEqual(["duplicate-name"]);
  });
});

describe("binds", () => {
  const base =
    "inertia wheel = 2 kg*m^2\ninertia pinion = 1 kg*m^2\nmass rack = 3 kg\njunction tip\njunction heel\nsupport floor\nlet r = 0.3 m\n";
  const formOf = (text: string, name: string) => {
    const { assembly } = instanceOf(base + text);
    return { free: assembly.free, ...assembly.coordinates.find((each) => each.name === name)?.form };
  };

  it.each([
    ["bind pinion = -3.2 * wheel", "pinion", [0], [-3.2], 4],
    ["bind rack = r * wheel", "rack", [0], [0.3], 4],
    ["bind rack = wheel * r", "rack", [0], [0.3], 4],
    ["bind pinion = wheel / 2", "pinion", [0], [0.5], 4],
    ["bind tip = -(heel - 2 * rack)", "tip", [2, 3], [2, -1], 4],
    ["bind tip = 2 * heel\nbind heel = 3 * rack", "tip", [2], [6], 3],
    ["bind heel = 3 * rack\nbind tip = 2 * heel", "tip", [2], [6], 3],
    ["bind tip = 2 * heel\nbind tip = 3 * rack", "tip", [2], [2], 3],
    ["bind tip = 2 * heel\nbind tip = 3 * rack", "rack", [2], [0.666666666667], 3],
    ["bind tip = ground", "tip", [], [], 4],
  ])("%s", (text, name, coordinates, factors, free) => {
    const unused = text.includes(" r") ? text : `${text}\nspring q between tip and ground = 1 N/m * (r / r)`;
    const form = formOf(unused, name);
    expect(form.free).toBe(free);
    expect(form.coordinates).toEqual(coordinates);
    expect(form.factors?.map((factor) => Number(factor.toPrecision(12)))).toEqual(factors);
  });

  it("takes supports along", () => {
    const form = formOf(
      "bind tip = floor + 2 * heel\nspring q between tip and ground = 1 N/m * (r / r)",
      "tip",
    );
    expect(form).toMatchObject({ coordinates: [3], factors: [2], supports: [0], supportFactors: [1] });
  });

  it("marks what is no sum of multiples, and multiples of the wrong kind", () => {
    check(`${base}
bind tip = 3 kg * heel
#          ^^^^ unit-mismatch
bind heel = r * rack
#           ^ unit-mismatch
bind rack = wheel
#           ^^^^^ unit-mismatch
bind pinion = wheel^2
#             ^^^^^^^ wrong-kind
bind wheel = sin(pinion)
#            ^^^^^^^^^^^ wrong-kind
bind floor = tip
#    ^^^^^ wrong-kind
bind tipp = heel
#    ^^^^ unknown-name
bind tip = heell
#          ^^^^^ unknown-name
bind tip = 3 mm
#          ^^^^ wrong-kind
bind tip = heel +/- 3 %
#          ^^^^^^^^^^^^ wrong-kind
`);
  });

  it("says binds that contradict each other or go in a circle", () => {
    const used = "spring q between tip and ground = 1 N/m * (r / r)\n";
    const both = modelOf(`${base}${used}bind tip = 2 * heel\nbind tip = 3 * heel`);
    expect(both.diagnostics.map(({ code, message }) => [code, message])).toEqual([
      ["inconsistent-bind", "this bind of `tip` and the others together hold `heel` at zero"],
    ]);
    expect(both.buildable).toBe(false);
    expect(codesOf(`${base}${used}bind tip = 2 * heel\nbind heel = tip / 2`)).toEqual(["inconsistent-bind"]);
    expect(codesOf(`${base}${used}bind tip = 2 * tip`)).toEqual(["inconsistent-bind"]);
    expect(codesOf(`${base}${used}bind tip = floor\nbind tip = 2 * floor`)).toEqual(["inconsistent-bind"]);
  });
});

describe("groups", () => {
  it("hold joining elements that move alike", () => {
    check(`
mass a = 3 kg
inertia w = 3 kg*m^2
spring s between a and ground = 3 N/mm
spring u between w and ground = 3 N*m
group ok = s
group g1 = s, a
#             ^ wrong-kind \`a\` is a mass; a group holds joining elements
group g2 = s, u
#             ^ wrong-kind
group g3 = s, s
#             ^ duplicate-name
group g4 = s, t
#             ^ unknown-name
`);
  });
});
