import { describe, expect, it } from "vitest";
import type { QuantityRef } from "../../shared-core/mechanics/assembly.ts";
import type { SweepAsk } from "../../shared-core/model/model.ts";
import { check, codesOf, fixed, instanceOf } from "./check.ts";

const BASE = `mass unit = 420 kg
mass slab = 9.6 t
inertia rotor = 3 kg*m^2
support floor
spring mounts between unit and slab = 26 N/mm
damper oil between unit and slab = 2 kN*s/m
spring soil between slab and floor = 90 MN/m
spring tie between ground and slab = 1 N/mm
spring shaft_end between rotor and ground = 3 kN*m
group feet = mounts, oil
group mixed = mounts, soil
force imbalance on unit
    unbalance = 0.018 kg*m
    speed = 1180 rpm
force knock on unit
    pulse = half_sine
    peak = 3 N
    duration = 1 s
`;

/** The quantities of a sweep, as text, unit and terms: factor, what, which, derivative or measure. */
function quantity(text: string): QuantityRef {
  const instance = instanceOf(
    `${BASE}ask sweep run\n    of = ${text}\n    by = imbalance\n    from = 1 Hz\n    to = 9 Hz`,
  );
  return (instance.asks[0] as SweepAsk).of[0];
}

const termsOf = (text: string): string =>
  quantity(text)
    .terms.map((term) => {
      if (term.of === "element") return `${term.factor} element ${term.element} ${term.measure}`;
      const index = term.of === "coordinate" ? term.coordinate : term.support;
      return `${term.factor} ${term.of} ${index} d${term.derivative}`;
    })
    .join(", ");

describe("quantities", () => {
  it.each([
    ["unit.displacement", "m", "1 coordinate 0 d0"],
    ["slab.velocity", "m/s", "1 coordinate 1 d1"],
    ["unit.acceleration", "m/s^2", "1 coordinate 0 d2"],
    ["rotor.angle", "rad", "1 coordinate 2 d0"],
    ["rotor.speed", "rad/s", "1 coordinate 2 d1"],
    ["rotor.angular_acceleration", "rad/s^2", "1 coordinate 2 d2"],
    ["floor.displacement", "m", "1 support 0 d0"],
    ["mounts.travel", "m", "1 element 0 travel"],
    ["mounts.rate", "m/s", "1 element 0 rate"],
    ["mounts.force", "N", "1 element 0 force"],
    ["mounts.power", "W", "1 element 0 power"],
    ["mounts.energy", "J", "1 element 0 energy"],
    ["shaft_end.torque", "N*m", "1 element 4 force"],
    ["shaft_end.twist", "rad", "1 element 4 travel"],
    ["shaft_end.rate", "rad/s", "1 element 4 rate"],
    ["feet.force", "N", "1 element 0 force, 1 element 1 force"],
    ["feet.travel", "m", "1 element 0 travel"],
    ["floor.reaction", "N", "1 element 2 force"],
    ["ground.reaction", "N", "-1 element 3 force"],
    ["unit.displacement - slab.displacement", "m", "1 coordinate 0 d0, -1 coordinate 1 d0"],
    ["unit.displacement  -  2*slab.displacement", "m", "1 coordinate 0 d0, -2 coordinate 1 d0"],
    ["-(unit.displacement + mounts.travel)", "m", "-1 coordinate 0 d0, -1 element 0 travel"],
    ["unit.velocity / 2", "m/s", "0.5 coordinate 0 d1"],
  ])("%s in %s", (text, unit, terms) => {
    expect(quantity(text).unit).toBe(unit);
    expect(termsOf(text)).toBe(terms);
  });

  it("are called by one text, however they are written", () => {
    expect(quantity("unit.displacement  -  2*slab.displacement").text).toBe(
      "unit.displacement - (2 * slab.displacement)",
    );
    expect(quantity("unit.displacement - slab.displacement").text).toBe(
      "unit.displacement - slab.displacement",
    );
  });

  it("that do not fit are told with those that do", () => {
    check(
      `${BASE}
ask sweep run
    of =
        unit.velocty,
#            ^^^^^^^ unknown-name it has displacement, velocity, acceleration
        rotor.velocity
#             ^^^^^^^^ unknown-name it has angle, speed, angular_acceleration
        unit
#       ^^^^ wrong-kind which quantity of \`unit\` is meant: \`displacement\`, \`velocity\` or \`acceleration\`?
        imbalance.force
#       ^^^^^^^^^ wrong-kind \`imbalance\` is a force and has no quantities
        uni.velocity
#       ^^^ unknown-name
        unit.velocity.x
#                     ^ unknown-name
        mounts.torque
#              ^^^^^^ wrong-kind \`mounts\` slides and has no torque
        unit.velocity - mounts.force
#                       ^^^^^^^^^^^^ unit-mismatch \`unit.velocity\` is in m/s and \`mounts.force\` in N
        unit.velocity * slab.velocity
#       ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ wrong-kind
        mixed.travel
#             ^^^^^^ wrong-kind the members of \`mixed\` do not lie between the same ends
        3 mm
#       ^^^^ wrong-kind
        slab.velocity
        slab.velocity
#       ^^^^^^^^^^^^^ duplicate-name
    by = imbalance
    from = 1 Hz
    to = 9 Hz
`.replace("unit.velocty,", "unit.velocty"),
    );
    expect(
      fixed(`${BASE}ask sweep\n    of = rotor.velocity\n    from = 1 Hz\n    to = 2 Hz`, "Write `speed`"),
    ).toContain("of = rotor.speed");
    expect(
      fixed(`${BASE}ask sweep\n    of = unit\n    from = 1 Hz\n    to = 2 Hz`, "Write `unit.velocity`"),
    ).toContain("of = unit.velocity");
  });
});

describe("asks", () => {
  it("are put in with their standards; `by` left out takes all that fit", () => {
    const { asks } = instanceOf(`${BASE}
ask modes
    up_to = 300 rpm
    count = 4
ask sweep run
    of = unit.velocity, feet.force
    from = 1 Hz
    to = 9 Hz
ask history h
    of = unit.velocity
    lasting = 3 s
ask sweep
    from = 1 Hz
    to = 9 Hz
    points = 50
    spacing = even
`);
    expect(asks).toMatchObject([
      { kind: "modes", name: "modes", upToHz: 5, count: 4 },
      { kind: "sweep", name: "run", by: [0], fromHz: 1, toHz: 9, points: 200, spacing: "log" },
      { kind: "history", name: "h", by: [0, 1], lasting: 3, accuracy: 1e-6, start: "as_written" },
      { kind: "sweep", name: "sweep", points: 50, spacing: "even" },
    ]);
    expect((asks[1] as SweepAsk).of.map(({ text }) => text)).toEqual(["unit.velocity", "feet.force"]);
  });

  it("are marked where they are wrong", () => {
    check(`${BASE}
ask sweep s1
    of = unit.velocity
    by = knock
#        ^^^^^ wrong-kind \`knock\` cannot drive a sweep
    from = 3 Hz
    to = 2 Hz
#        ^^^^ wrong-kind \`to\` is not above \`from\`
ask sweep s2
#         ^^ missing-detail \`ask sweep s2\` needs \`from\`
    of = unit.velocity
    by = imbalanc, mounts
#        ^^^^^^^^ unknown-name
#                  ^^^^^^ wrong-kind \`mounts\` is a spring
    to = 9 Hz
ask sweep s3
    from = 1 Hz
    to = 2
#        ^ missing-unit
    lasting = 3 s
#   ^^^^^^^ unknown-detail \`ask sweep\` has no detail \`lasting\`
    points = 2.5
#            ^^^ wrong-kind \`points\` is a whole number
    spacing = lin
#             ^^^ wrong-kind
ask history h1
    lasting = -3 s
#             ^^^^ not-positive
ask random r
#          ^ not-yet-computed an ask of kind \`random\`
    of = unit.velocity
`);
  });

  it("that are wrong leave the others", () => {
    const model = check(`${BASE}
ask sweep s1
    from = 1 Hz
    to = 2 s
#        ^^^ unit-mismatch
ask modes
expect ok = peak(s1, unit.velocity) <= 3 mm/s
`);
    expect(model.buildable).toBe(true);
  });

  it("a sweep needs something that drives it, a history does not", () => {
    expect(codesOf("mass m = 1 kg\nask sweep\n    from = 1 Hz\n    to = 2 Hz")).toEqual(["missing-detail"]);
    expect(
      codesOf("mass m = 1 kg\n    starts_at = 3 mm\nask history\n    of = m.displacement\n    lasting = 2 s"),
    ).toEqual([]);
  });
});

describe("limits", () => {
  it("are one value or rows", () => {
    const { limits } = instanceOf(
      "limit zone = 4.5 mm/s\n    of = rms\nlimit curve\n    rows =\n        480 rpm  4.5 mm/s\n        80 Hz, 9 mm/s\n    between_points = straight",
    );
    expect(limits.get("zone")).toMatchObject({
      points: 0.0045,
      of: "rms",
      betweenPoints: "log_log",
      bands: "none",
    });
    expect(limits.get("curve")).toMatchObject({
      points: [
        { atHz: 8, value: 0.0045 },
        { atHz: 80, value: 0.009 },
      ],
      betweenPoints: "straight",
    });
  });

  it("may jump: two rows at one frequency", () => {
    const { limits } = instanceOf(
      "limit zone\n    rows =\n        3 Hz 3 mm\n        4 Hz 3 mm\n        4 Hz 5 mm",
    );
    expect(limits.get("zone")?.points).toHaveLength(3);
  });

  it("are marked where they are wrong", () => {
    check(`
limit a
#     ^ missing-detail
limit b
    rows =
        3 Hz 3 mm/s
        2 Hz 3 mm/s
#       ^^^^ wrong-kind
limit jumps
    rows =
        3 Hz 3 mm/s
        4 Hz 3 mm/s
        4 Hz 5 mm/s
        4 Hz 6 mm/s
#       ^^^^ wrong-kind
limit c
    rows =
        3 s 3 mm/s
#       ^^^ unit-mismatch
limit d
    rows =
        3 Hz 3 mm/s
        4 Hz 3 mm
#            ^^^^ unit-mismatch
limit f
    rows =
        3 Hz
#       ^^^^ wrong-kind
limit g = 3 mm/s
    of = mean
#        ^^^^ wrong-kind
`);
  });
});
