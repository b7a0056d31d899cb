import { describe, expect, it } from "vitest";
import { check, codesOf, fixed, siOf } from "./check.ts";

const value = (expression: string): number => siOf(`let x = ${expression}`, "x");

describe("values of expressions, in SI", () => {
  it.each([
    ["26.5 N/mm", 26500],
    ["3 %", 0.03],
    ["2.1e3 N*s/m", 2100],
    ["-4 mm", -0.004],
    ["1 gn", 9.80665],
    ["2 + 3 * 4", 14],
    ["(2 + 3) * 4", 20],
    ["2 - 3 - 4", -5],
    ["16 / 4 / 2", 2],
    ["-2 ^ 2", -4],
    ["2 ^ 3 ^ 2", 512],
    ["2 ^ -1", 0.5],
    ["sqrt(9 m^2)", 3],
    ["(8 m^3) ^ (1/3)", 2],
    ["exp(ln(3))", 3],
    ["log10(1000)", 3],
    ["atan2(3 mm, 3 mm)", Math.PI / 4],
    ["sin(30 deg)", 0.5],
    ["abs(-4 mm)", 0.004],
    ["min(3 kg, 2 kg, 4 kg)", 2],
    ["max(3, 2)", 3],
    ["floor(2.7) + ceil(2.2) + round(2.5)", 8],
    ["sign(-3 kg)", -1],
    ["if(3 kg > 2 kg, 5, 7)", 5],
    ["if(not (3 > 2) or 1 < 0, 5, 7)", 7],
    ["if(1 < 2 and 2 <= 2, 5, 7)", 5],
    ["if(1 == 2, 5, if(1 != 2, 6, 7))", 6],
    ["pi + e - e", Math.PI],
    ["40 as N/mm", 40000],
    ["(2 + 3) as mm", 0.005],
    ["3 kg + 0", 3],
    ["0 - 3 kg", -3],
    ["max(0, -3 N)", 0],
    ["450 lbm", 450 * 0.45359237],
    ["500 N * cos(60 deg)", 250],
    ["disc(85 kg, 0.3 m)", (85 * 0.3 ** 2) / 2],
    ["shaft(80 GPa, 60 mm, 1.2 m)", (80e9 * Math.PI * 0.06 ** 4) / 32 / 1.2],
    ["shaft(80 GPa, 60 mm, 1.2 m, bore: 20 mm)", (80e9 * Math.PI * (0.06 ** 4 - 0.02 ** 4)) / 32 / 1.2],
    ["series(300 N/m, 600 N/m)", 200],
  ])("%s", (expression, expected) => {
    expect(value(expression)).toBeCloseTo(expected, 9 - Math.ceil(Math.log10(Math.abs(expected) + 1)));
  });

  it("does not depend on the order of lines", () => {
    expect(siOf("let a = b * 2\nlet b = c + 1 kg\nlet c = 3 kg", "a")).toBe(8);
  });

  it("takes long chains of lets, in any order, and long circles", () => {
    const lines = Array.from({ length: 4000 }, (_, i) => `let x${i + 1} = x${i} + 1 kg`);
    const upwards = ["let x0 = 0 kg", ...lines].join("\n");
    expect(siOf(upwards, "x4000")).toBe(4000);
    expect(siOf([...lines].reverse().concat("let x0 = 0 kg").join("\n"), "x4000")).toBe(4000);
    expect(codesOf(["let x0 = x4000", ...lines].join("\n"))[0]).toBe("circular-definition");
  });
});

describe("what is wrong in an expression is marked where it is wrong", () => {
  it("kinds", () => {
    check(`
let k = 26.5 N/mm
let m = 420 kg
let a = k + 3 kg
#           ^^^^ unit-mismatch expected a stiffness such as N/mm, found a mass, 3 kg
let b = 3 + k
#       ^ missing-unit expected a stiffness such as N/mm, found \`3\` without a unit
let c = 2 * (k + m) * 4
#                ^ unit-mismatch found a mass, \`m\` = 420 kg
let d = exp(3 kg)
#           ^^^^ unit-mismatch expected a number, found a mass, 3 kg
let f = min(3 kg, 4 N, 2 kg)
#                 ^^^ unit-mismatch expected a mass such as kg, found a force, 4 N
let g = m ^ m
#           ^ unit-mismatch
let h = m ^ n
#           ^ unit-mismatch the exponent of a mass, \`m\` = 420 kg, is to be a plain number
let n = 2
let i = m as N
#            ^ unit-mismatch a mass, \`m\` = 420 kg, cannot be given in N, the unit of a force
let j = if(m > k, 1, 2)
#              ^ unit-mismatch
let l = if(3, 1, 2)
#          ^ wrong-kind expected a comparison, found the number 3
let o = (3 < 4)
#        ^^^^^ wrong-kind a comparison stands where a number was expected
let q = 1 kg, 2 kg
#             ^^^^ wrong-kind a \`let\` holds one number
let r = 1 Hz to 2 Hz
#       ^^^^^^^^^^^^ wrong-kind a \`let\` holds one number
let p = (1, 2)
#       ^^^^^^ wrong-kind expected one number, found 2 in a tuple
`);
  });

  it("names and functions", () => {
    check(`
let mount = 26.5 N/mm
let a = mounr * 2
#       ^^^^^ unknown-name nothing is called \`mounr\`
let b = 3 * kg
#           ^^ unknown-name \`kg\` is a unit: it stands right behind a number, as in \`3 kg\`
let c = log(3)
#       ^^^ unknown-name \`log\` leaves its base open
let d = sqroot(3)
#       ^^^^^^ unknown-name there is no function \`sqroot\`
let f = mount(3)
#       ^^^^^ wrong-kind \`mount\` is a number, not a function
let g = natural_frequency(1)
#       ^^^^^^^^^^^^^^^^^ wrong-kind computed from the answers
let h = sqrt(3, 4)
#               ^ wrong-kind \`sqrt\` takes 1 argument, here it has 2
let i = shaft(80 GPa, 60 mm)
#       ^^^^^^^^^^^^^^^^^^^^ missing-detail
let j = shaft(80 GPa, 60 mm, 1 m, bor: 2 mm)
#                                 ^^^ wrong-kind \`shaft\` has no argument \`bor\`
let k = shaft(80 GPa, 60 mm, 1 m, 2 mm)
#                                 ^^^^ wrong-kind is written with its name, \`bore: …\`
let l = helical_spring(8 mm, 10 mm, 6, 79 GPa)
#       ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ outside-validity coil over wire is 1.25, outside 4 to 20
let m = mount.x
#       ^^^^^^^ wrong-kind \`mount\` is a number and has no \`x\`
let n = ground
#       ^^^^^^ wrong-kind
`);
  });

  it("numbers that are none", () => {
    check(`
let zero = 0
let a = 3 * (1 / zero)
#                ^^^^ not-positive this is zero
let b = sqrt(-3)
#       ^^^^^^^^ not-positive a negative number, -3, has no square root
let c = ln(zero)
#       ^^^^^^^^ not-positive 0 has no logarithm
let d = 1e300 * 1e300
#       ^^^^^^^^^^^^^ not-positive beyond the largest number
let f = asin(2)
#       ^^^^^^^ not-positive
let g = (0 - 2) ^ 0.5
#       ^^^^^^^^^^^^^ not-positive
let h = a + b * c
let i = if(zero > 0, 1 / zero, 4)
`);
  });

  it("circles, with the chain", () => {
    const model = check(`
let a = b + 1
let b = c * 2
#       ^ circular-definition \`c\` is defined by itself: c -> a -> b -> c
let c = a - 3
let d = d + 1
#       ^ circular-definition \`d\` is defined by itself
let f = a * 3
`);
    expect(model.diagnostics[0].related?.map(({ message }) => message)).toEqual([
      "`c` is defined here",
      "`a` is defined here",
      "`b` is defined here",
    ]);
  });

  it("says one thing once: what depends on a mistake stays quiet", () => {
    expect(
      codesOf("let a = 3 furlong\nlet b = a * 2\nmass m = b\nspring k between m and ground = a"),
    ).toEqual(["unknown-unit"]);
  });
});

describe("glued names", () => {
  it("are an error where the name would fit, or the unit does not", () => {
    check(`
let m = 3 m
let kip = 2
mass block = 420 kg
spring s between block and ground = 12 N/m
#                                   ^^^^^^ glued-name \`m\` is also the name of a number
force f on block
    law = 40 N * sin(12 Hz*t)
#                    ^^^^^^^ glued-name blanks round the operator make it a product: \`12 Hz * t\`
force g on block
    law = 40 N/s*t
#         ^^^^^^^^ glued-name
force h on block
    amplitude = 3 N*kip
#               ^^^^^^^ glued-name
    frequency = 3 Hz
`);
  });

  it("are found inside the range of an argument, and get blanks there too", () => {
    const text = `let s = 2
mass block = 420 kg
spring k between block and ground = 12 N/m
force f on block
    amplitude = 1 N
    frequency = 3 Hz
expect c = clear_of_modes(5 Hz*s to 400 Hz) >= 1 %
`;
    expect(codesOf(text)).toEqual(["glued-name"]);
    expect(fixed(text, "Write `5 Hz * s`")).toBe(text.replace("Hz*s", "Hz * s"));
    expect(codesOf(text.replace("Hz*s", "Hz * s"))).toEqual([]);
  });

  it("are none where only the unit can be meant", () => {
    expect(
      codesOf("let m = 420 kg\nlet k = 20 N/m\nmass b = m\nspring s between b and ground = k + 3 N/m"),
    ).toEqual([]);
    expect(siOf("let k = 20000 N/m\nlet m = k / (2*pi*5 Hz)^2", "m")).toBeCloseTo(
      20000 / (10 * Math.PI) ** 2,
      9,
    );
  });

  it("get blanks from their fix", () => {
    const text = "mass b = 3 kg\nforce f on b\n    law = 40 N * sin(12 Hz*t)\n";
    expect(fixed(text, "Write `12 Hz * t`")).toBe(text.replace("Hz*t", "Hz * t"));
  });
});

describe("fixes", () => {
  it.each([
    ["let a = log(3)", "Write `ln`", "let a = ln(3)"],
    ["let mount = 3\nlet a = mounr", "Write `mount`", "let mount = 3\nlet a = mount"],
    ["mass m = 40", "Write `40 kg`", "mass m = 40 kg"],
    ["mass m = 3 * 2", "Write `3 * 2 as kg`", "mass m = 3 * 2 as kg"],
    ["mass m = 450 lbf", "Write `450 lbm`", "mass m = 450 lbm"],
    ["let w = 4119 N\nmass m = w", "Write `w / (1 gn)`", "let w = 4119 N\nmass m = w / (1 gn)"],
    ["assume gravity = 1 g", "Write `1 gn`", "assume gravity = 1 gn"],
    ["let a = 3 kg within 5 kg to 2 kg", "Write `2 kg to 5 kg`", "let a = 3 kg within 2 kg to 5 kg"],
  ])("%s", (text, title, after) => {
    expect(fixed(text, title).trimEnd()).toBe(after);
    expect(codesOf(after).filter((code) => code !== "unused-number")).toEqual([]);
  });
});
