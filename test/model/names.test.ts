import { describe, expect, it } from "vitest";
import { check, codesOf, fixed, instanceOf, modelOf } from "./check.ts";

describe("one namespace", () => {
  it("says the second of two with the place of the first", () => {
    const model = check(`
mass unit = 420 kg
spring unit between unit and ground = 3 N/mm
#      ^^^^ duplicate-name \`unit\` is a mass already, on line 2
`);
    expect(model.diagnostics[0].related?.[0].message).toBe("here `unit` is a mass");
    expect(model.buildable).toBe(true);
  });

  it("offers a free name", () => {
    const text = "mass unit = 420 kg\nmass unit_2 = 3 kg\nmass unit = 3 kg\n";
    expect(fixed(text, "Call this one `unit_3`")).toBe(text.replace(/unit = 3 kg/, "unit_3 = 3 kg"));
  });

  it("holds asks by their kind, counted", () => {
    const text = "mass m = 1 kg\nforce f on m\nask sweep\n    from = 1 Hz\n    to = 2 Hz\n";
    const model = modelOf(`${text}ask modes\n${text.slice(text.indexOf("ask"))}`);
    expect(model.diagnostics).toEqual([]);
    expect([...model.entities.keys()]).toEqual(["m", "f", "sweep", "modes", "sweep_2"]);
    expect(codesOf(`mass sweep = 1 kg\nforce f on sweep\n${text.slice(text.indexOf("ask"))}`)).toEqual([
      "duplicate-name",
    ]);
  });

  it("takes words of the language that are no reserved ones", () => {
    expect(
      codesOf(
        "mass mass = 1 kg\nmass m = 2 kg\nspring s between mass and m = 3 N/m\nmass N = m2\nlet m2 = 3 kg",
      ),
    ).toEqual([]);
  });

  it("refuses reserved ones", () => {
    check(`
mass ground = 3 kg
#    ^^^^^^ syntax
let pi = 3
#   ^^ syntax
`);
  });

  it("hints at numbers that nothing uses, in a file that has a system", () => {
    const model = check(`
let a = 3 kg
let b = 4 kg
#   ^ unused-number nothing uses \`b\`
mass m = a
`);
    expect(model.diagnostics[0]).toMatchObject({ severity: "hint", tag: "unnecessary" });
    expect(codesOf("let a = 3 kg\nlimit b = 3 mm/s")).toEqual([]);
  });
});

describe("use", () => {
  const files = {
    "lib/steel.thrum":
      'thrum 1\nuse "base.thrum"\nlet shear = 2 * half_shear\nlet spare = 3\nlimit zone = 4.5 mm/s\nmass lost = 3 kg',
    "lib/base.thrum": "thrum 1\nlet half_shear = 40 GPa",
    "bad.thrum": "thrum 1\nlet a = 3 kg + 2 N\nlet b = 4 kg",
    "syntax.thrum": "thrum 1\nlet a 3 kg",
    "round.thrum": 'thrum 1\nuse "model.thrum"\nlet a = 3 kg',
    "self.thrum": 'thrum 1\nuse "self.thrum"\nlet a = 3 kg',
  };

  it("takes lets and limits of another file, relative to the one that uses it", () => {
    const instance = instanceOf(
      'use "lib/steel.thrum"\ninertia rotor = 2 kg*m^2\nspring s between rotor and ground = shaft(shear, 60 mm, 1 m)',
      0,
      files,
    );
    expect([...instance.parameters.keys()]).toEqual(["shear", "spare"]);
    expect(instance.parameters.get("shear")?.value).toBe(80e9);
    expect(instance.limits.get("zone")?.points).toBe(0.0045);
    expect(instance.model.files).toEqual(["lib/steel.thrum", "lib/base.thrum"]);
  });

  it("takes neither masses nor what the used file uses itself", () => {
    check(
      `
use "lib/steel.thrum"
let a = half_shear
#       ^^^^^^^^^^ unknown-name
spring s between lost and ground = 3 N/m
#                ^^^^ unknown-name
`,
      files,
    );
  });

  it("says a name that both files define", () => {
    const model = check(
      `
use "lib/steel.thrum"
let shear = 79 GPa
#   ^^^^^ duplicate-name \`shear\` is a number already, in \`lib/steel.thrum\`
`,
      files,
    );
    expect(model.diagnostics[0].related?.[0].file).toBe("lib/steel.thrum");
  });

  it("says why a file cannot be had", () => {
    check(
      `
use "nothing.thrum"
#   ^^^^^^^^^^^^^^^ file-missing there is no file \`nothing.thrum\`
use "../other.thrum"
#   ^^^^^^^^^^^^^^^^ file-outside lies outside the workspace
use "broken/folder"
#   ^^^^^^^^^^^^^^^ file-unreadable it is a folder
`,
      files,
    );
  });

  it("says the errors of a used file where it is used, and keeps quiet about what depends on them", () => {
    const model = check(
      `
use "bad.thrum"
#   ^^^^^^^^^^^ unit-mismatch \`bad.thrum\`, line 2: expected a mass such as kg, found a force, 2 N
mass m = a
mass n = b
`,
      files,
    );
    expect(model.buildable).toBe(false);
    expect(model.diagnostics[0].related?.[0]).toMatchObject({ file: "bad.thrum" });
    expect(codesOf('use "syntax.thrum"', files)).toEqual(["syntax"]);
  });

  it("says a circle of files", () => {
    check(
      `
use "round.thrum"
#   ^^^^^^^^^^^^^ circular-definition leads back to itself: model.thrum -> round.thrum -> model.thrum
mass m = a
`,
      files,
    );
    expect(codesOf('use "self.thrum"', files)).toEqual(["circular-definition"]);
    expect(codesOf('use "model.thrum"', { "model.thrum": "thrum 1" })).toEqual(["circular-definition"]);
  });

  it("finds files from a folder", () => {
    const model = modelOf('use "../lib/base.thrum"', files, "plant/model.thrum");
    expect(model.diagnostics).toEqual([]);
    expect(model.files).toEqual(["lib/base.thrum"]);
  });
});

describe("acceptances", () => {
  const text = (code: string) => `> accept ${code}: passed in two seconds\nmass m = 3 kg\n`;

  it("are kept with their reason", () => {
    const model = modelOf(text("near-resonance"));
    expect(model.diagnostics).toEqual([]);
    expect([...model.accepted.values()][0]).toMatchObject([
      { code: "near-resonance", reason: "passed in two seconds" },
    ]);
  });

  it("of an error are refused, of no code at all are told", () => {
    expect(codesOf(text("unit-mismatch"))).toEqual(["wrong-kind"]);
    expect(codesOf(text("near-resonanc"))).toEqual(["unused-accept"]);
    expect(fixed(text("near-resonanc"), "Write `near-resonance`")).toBe(text("near-resonance"));
  });
});
