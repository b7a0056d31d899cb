import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type CompleteOptions, type Completion, complete } from "../../shared-core/features/complete.ts";
import type { Motion } from "../../shared-core/mechanics/builder.ts";
import { PARSING } from "../../shared-core/model/parsing.ts";
import { parse } from "../../shared-core/syntax/parser.ts";
import { ROLE } from "../../shared-core/syntax/tree.ts";
import type { Kind } from "../../shared-core/units/dimension.ts";
import { unitFromText } from "../../shared-core/units/known-kinds.ts";
import { NUMBER, sameKind } from "../../shared-core/units/quantity.ts";
import type {
  DetailDescription,
  Measure,
  StatementDescription,
} from "../../shared-core/vocabulary/description.ts";
import { dimensionOf, unitsOf } from "../../shared-core/vocabulary/measures.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { cursorIn, viewOf } from "./views.ts";

/** What is offered at the cursor. */
function offered(marked: string, options: CompleteOptions = { explicit: true }): readonly Completion[] {
  const { text, offset } = cursorIn(marked);
  return complete(viewOf(text), offset, options);
}

const labels = (marked: string, options?: CompleteOptions): string[] =>
  offered(marked, options).map(({ label }) => label);

const ofKind = (all: readonly Completion[], ...kinds: string[]): string[] =>
  all.filter(({ kind }) => kinds.includes(kind)).map(({ label }) => label);

/** One number of each kind that the language measures. */
const UNITS: Readonly<Record<string, string>> = {
  plain: "",
  a_mass: "kg",
  an_inertia: "kg*m^2",
  a_length: "mm",
  a_time: "s",
  a_rate: "Hz",
  a_stiffness: "N/mm",
  a_torque: "N*m",
  a_damping: "N*s/m",
  a_turn_damping: "N*m*s/rad",
  a_force: "N",
  a_speed: "m/s",
  an_acceleration: "m/s^2",
  an_angular_acceleration: "rad/s^2",
  a_momentum: "N*s",
  an_unbalance: "kg*m",
  a_cubic: "N/m^3",
  a_quadratic: "N*s^2/m^2",
  a_resistance: "ohm",
  an_inductance: "H",
  a_capacitance: "F",
  a_charge: "C",
  a_current: "A",
  a_voltage: "V",
  a_factor: "N/A",
  a_turn_factor: "N*m/A",
  a_decay: "1/s",
};

const LETS = Object.entries(UNITS).map(([name, unit]) => `let ${name} = 3 ${unit}`.trimEnd());
const SETUP = `thrum 1
${LETS.join("\n")}
mass unit = 420 kg
mass slab = 9.6 t
inertia rotor = 3 kg*m^2
inertia wheel = 4 kg*m^2
loop coil
loop field
body genset = 2 t
    inertia = (1, 1, 1) kg*m^2
support floor
support base
    kind = body
pendulum bob = 3 kg
    length = 2 m
spring mounts between unit and slab = 3 N/mm
damper oil between unit and slab = 3 N*s/m
spring shaft_line between rotor and wheel = 3 N*m/rad
force push on unit
    amplitude = 3 N
    frequency = 2 Hz
force knock on unit
    step = 3 N
torque twisting on rotor
    amplitude = 3 N*m
limit zone = 3 mm/s
case winter
    a_mass = 4 kg
ask sweep run_up
    of = unit.velocity
    from = 1 Hz
    to = 9 Hz
ask history stop_down
    of = unit.velocity
    lasting = 1 s
expect low = natural_frequency(1) <= 9 Hz
`;

const kindOf = (unit: string): Kind => (unit === "" ? NUMBER : unitFromText(unit).kind);

const letsOf = (...kinds: (Kind | undefined)[]): string[] =>
  Object.entries(UNITS).flatMap(([name, unit]) =>
    kinds.some((kind) => kind && sameKind(kind, kindOf(unit))) ? [name] : [],
  );

/** A head of each statement with what it moves; the value behind `=` is left to the test. */
const HEADS: Readonly<Record<string, readonly [string, Motion]>> = {
  mass: ["mass x", "sliding"],
  inertia: ["inertia x", "turning"],
  junction: ["junction x", "sliding"],
  body: ["body x", "sliding"],
  pendulum: ["pendulum x", "turning"],
  loop: ["loop x", "charge"],
  support: ["support x", "sliding"],
  spring: ["spring x between unit and slab", "sliding"],
  damper: ["damper x between unit and ground", "sliding"],
  inerter: ["inerter x between floor and slab", "sliding"],
  stop: ["stop x between unit and slab", "sliding"],
  cord: ["cord x between unit and slab", "sliding"],
  friction: ["friction x between unit and slab", "sliding"],
  mount: ["mount x between genset and ground at (0, 0, 0) m", "sliding"],
  inductor: ["inductor x in coil", "charge"],
  resistor: ["resistor x in coil", "charge"],
  capacitor: ["capacitor x in coil", "charge"],
  mutual: ["mutual x between coil and field", "charge"],
  transducer: ["transducer x between unit and coil", "sliding"],
  feed: ["feed x from unit to slab", "sliding"],
  force: ["force x on unit", "sliding"],
  torque: ["torque x on rotor", "turning"],
  voltage: ["voltage x on coil", "charge"],
  motion: ["motion x of floor", "sliding"],
  limit: ["limit x", "sliding"],
  expect: ["expect x = natural_frequency(1) <= 6 Hz", "sliding"],
};

const MOTION_VALUES = ["travel", "speed", "acceleration"] as const;

/** Kinds that fit a measure of a statement; undefined: any. */
function kindsFor(keyword: string, measure: Measure, motion: Motion): (Kind | undefined)[] | undefined {
  if (measure !== "any") return [dimensionOf(measure, motion)];
  return keyword === "motion" ? MOTION_VALUES.map((each) => dimensionOf(each, motion)) : undefined;
}

const slots: readonly [StatementDescription, DetailDescription, string, Motion][] = [
  ...STATEMENTS,
  ...ASKS,
].flatMap((statement) => {
  const [head, motion] = statement.variant
    ? ([`ask ${statement.variant} x`, "sliding"] as const)
    : (HEADS[statement.keyword] ?? ["", "sliding"]);
  return head === "" ? [] : statement.details.map((detail) => [statement, detail, head, motion] as never);
});

describe("every detail of every statement", () => {
  it("has its head in this test", () => {
    const without = STATEMENTS.filter(
      ({ details, keyword }) => details.length > 0 && !(keyword in HEADS) && keyword !== "ask",
    );
    expect(without.map(({ keyword }) => keyword)).toEqual([]);
    expect(slots.length).toBeGreaterThan(150);
  });

  const named = slots.map(([statement, detail, head, motion]) => ({
    name: `${statement.variant ?? statement.keyword}.${detail.key}`,
    statement,
    detail,
    head,
    motion,
  }));

  it.each(named)(
    "$name is offered where it is missing, and takes what fits",
    ({ statement, detail, head, motion }) => {
      const fits = !detail.whenMotion || detail.whenMotion.includes(motion);
      expect(ofKind(offered(`${SETUP}${head}\n    |`), "detail").includes(detail.key)).toBe(fits);
      if (!fits) return;
      const { content } = detail;
      const all = offered(`${SETUP}${head}\n    ${detail.key} = |`);
      const parameters = ofKind(all, "parameter");
      switch (content.is) {
        case "quantity":
        case "at":
        case "law":
        case "tuple":
        case "range": {
          const kinds = kindsFor(statement.keyword, content.measure, motion);
          expect(parameters).toEqual(kinds === undefined ? Object.keys(UNITS) : letsOf(...kinds));
          expect(ofKind(all, "moves", "joins", "asks", "holds")).toEqual([]);
          break;
        }
        case "word":
        case "words":
          expect(ofKind(all, "word")).toEqual([...content.words]);
          expect(all).toHaveLength(content.words.length);
          break;
        case "tolerance":
          expect(ofKind(all, "word")).toEqual(["nominal", "worst_case"]);
          break;
        case "names":
          expect(all.map(({ label }) => label)).toEqual(namesFor(statement, detail));
          break;
        case "changes":
          expect(all.map(({ label }) => label)).toEqual(Object.keys(UNITS));
          break;
        case "quantities":
          expect(ofKind(all, "moves")).toEqual([
            ...[
              "unit",
              "slab",
              "rotor",
              "wheel",
              "coil",
              "field",
              "genset",
              "floor",
              "base",
              "bob",
              "ground",
            ],
          ]);
          expect(ofKind(all, "joins").sort()).toEqual(["mounts", "oil", "shaft_line"]);
          break;
        case "unit":
          expect(all.map(({ label }) => label)).toEqual(
            (statement.keyword === "motion" ? MOTION_VALUES : (["force"] as const)).flatMap((each) =>
              unitsOf(each, motion),
            ),
          );
          break;
        case "expressions":
          expect(parameters).toEqual(Object.keys(UNITS));
          expect(ofKind(all, "function")).toContain("natural_frequency");
          break;
        case "text":
        case "table":
          expect(all).toEqual([]);
          break;
      }
    },
  );
});

/** Names of the setup that fit a detail. */
function namesFor({ keyword, variant }: StatementDescription, { key }: DetailDescription): string[] {
  if (key === "like") return { spring: ["mounts", "shaft_line"], damper: ["oil"] }[keyword] ?? [];
  if (key === "by")
    return variant === "sweep"
      ? ["push", "twisting"]
      : variant === "history"
        ? ["push", "knock"]
        : ["push", "knock", "twisting"];
  if (key === "on") return ["unit", "slab", "genset", "bob"];
  if (key === "cases") return ["winter"];
  if (key === "keep") return ["low"];
  return key === "change" ? Object.keys(UNITS) : [];
}

describe("units behind a number", () => {
  it.each<[string, string[]]>([
    ["mass x = 3 |", ["kg", "t", "g", "lbm", "slug"]],
    ["mass x = 3 k|", ["kg", "t", "g", "lbm", "slug"]],
    ["spring x between unit and slab = 26.5 N/|", ["N/mm", "kN/m", "N/m", "MN/m", "lbf/in", "GN/m"]],
    ["spring x between rotor and wheel = 26.5 |", ["N*m/rad", "kN*m/rad", "N*m/deg", "lbf*in/rad"]],
    ["inertia x = 3 kg*m^2\n    starts_at = 2 |", ["deg", "rad", "mrad"]],
    ["mass x = 3 kg +/- 3 |", ["%", "kg", "t", "g", "lbm", "slug"]],
    ["mass x = a_mass + 3 |", ["kg", "t", "g", "lbm", "slug"]],
    ["spring x between unit and slab = 3 N/mm\n    damping_ratio = 5 |", ["%", "ppm"]],
    ["expect x = natural_frequency(1) <= 6 |", ["Hz", "rpm", "rad/s", "cpm", "rev/s", "deg/s", "kHz"]],
    [
      "expect x = value(run_up, unit.velocity, at: 20 |",
      ["Hz", "rpm", "rad/s", "cpm", "rev/s", "deg/s", "kHz"],
    ],
    ["expect x = value(stop_down, unit.velocity, at: 20 |", ["s", "ms", "min", "h", "us"]],
    ["force x on unit\n    law = 500 |", ["N", "kN", "lbf", "kip"]],
    ["case x\n    a_length = 3 |", ["mm", "m", "um", "in", "ft", "mil"]],
    ["limit x\n    rows =\n        3 |", ["Hz", "rpm", "rad/s", "cpm", "rev/s", "deg/s", "kHz"]],
    ["let x = 3 N/mm +/- 12 % within 3 N/mm to 7 |", ["N/mm", "kN/m", "N/m", "MN/m", "lbf/in", "GN/m"]],
    ["point x on genset at (0, 0, 0) |", ["mm", "m", "um", "in", "ft", "mil"]],
    ["body x = 2 t\n    inertia = (310, 840, 760) k|", ["kg*m^2", "kg*mm^2", "lbm*in^2", "slug*ft^2"]],
    ["mount x between genset and ground at (0, 0, 0) m\n    turned = (0, 30, 0) |", ["deg", "rad", "mrad"]],
    ["assume gravity = 9.81 |", ["m/s^2", "gn", "mm/s^2", "in/s^2"]],
    ["point x on genset at (0.4 |", ["mm", "m", "um", "in", "ft", "mil"]],
  ])("%s", (line, units) => {
    const found = ofKind(offered(SETUP + line), "unit");
    expect(found.slice(0, units.length)).toEqual(units);
    const kinds = new Set(
      units.map((unit) => (unit === "%" ? "1" : JSON.stringify(unitFromText(unit).kind))),
    );
    for (const unit of found) {
      expect(kinds).toContain(unit === "%" || unit === "ppm" ? "1" : JSON.stringify(unitFromText(unit).kind));
    }
  });

  it("offers those of the file first where any unit may stand", () => {
    expect(labels("let a = 3 lbf/in\nlet b = 4 |")[0]).toBe("lbf/in");
  });

  it("replaces the whole unit, with µ and ² about", () => {
    const { text, offset } = cursorIn("# µ²°𐐀\r\nmass x = 3 µ|g\r\n");
    const [first] = complete(viewOf(text), offset);
    expect(text.slice(first.replaceSpan.start, first.replaceSpan.end)).toBe("µg");
    expect(text.slice(first.insertSpan.start, first.insertSpan.end)).toBe("µ");
  });

  it.each(["mass x = 3|", "mass x = 3.|5 kg", "# 3 |", "thrum 1|", 'title "3 |"', "let x2|"])(
    "offers nothing while a number, a comment or a name is typed: %s",
    (line) => {
      expect(labels(line, {})).toEqual([]);
    },
  );
});

describe("quantities and directions behind a dot", () => {
  it.each<[string, string[]]>([
    ["ask sweep\n    of = unit.|", ["displacement", "velocity", "acceleration"]],
    ["ask sweep\n    of = rotor.ve|", ["angle", "speed", "angular_acceleration"]],
    ["ask sweep\n    of = mounts.|", ["travel", "rate", "force", "power", "energy"]],
    ["ask sweep\n    of = shaft_line.|", ["travel", "twist", "rate", "force", "torque", "power", "energy"]],
    ["ask sweep\n    of = ground.|", ["reaction"]],
    ["ask sweep\n    of = genset.|", ["x", "y", "z", "rx", "ry", "rz"]],
    ["ask sweep\n    of = genset.rx.|", ["angle", "speed", "angular_acceleration"]],
    ["ask sweep\n    of = coil.|", ["charge", "current"]],
    [
      "ask sweep\n    of =\n        unit.velocity\n        slab.|",
      ["displacement", "velocity", "acceleration"],
    ],
    ["expect x = peak(run_up, slab.|", ["displacement", "velocity", "acceleration"]],
    ["spring x between genset.|", ["x", "y", "z", "rx", "ry", "rz"]],
    ["mount x between genset and ground at (0, 0, 0) m\n    stiffness.|", ["x", "y", "z"]],
    ["ask sweep\n    of = nothing.|", []],
  ])("%s", (line, expected) => {
    expect(labels(SETUP + line)).toEqual(expected);
  });

  it("sees the inside of a part", () => {
    const kit =
      "kit foot(k) between above and below\n    junction middle\n    spring rubber between above and middle = k\n";
    const part = "part left = foot(3 N/m) between unit and ground\n";
    expect(labels(`${SETUP}${kit}${part}ask sweep\n    of = left.|`)).toEqual(["middle", "rubber"]);
    expect(labels(`${SETUP}${kit}${part}ask sweep\n    of = left.rubber.|`)).toContain("force");
  });
});

describe("heads", () => {
  it.each<[string, string[]]>([
    ["spring x between |", ["unit", "slab", "rotor", "wheel", "genset.x", "floor", "ground"]],
    ["spring x between unit and |", ["slab", "genset.x", "floor", "base.z", "ground"]],
    ["spring x between rotor and |", ["wheel", "genset.rx", "bob", "base.rz", "ground"]],
    ["force x on |", ["unit", "slab", "genset.x", "genset.y", "genset.z"]],
    ["torque x on |", ["rotor", "wheel", "genset.rx", "bob"]],
    ["voltage x on |", ["coil", "field"]],
    ["motion x of |", ["floor", "base.x", "base.rz"]],
    ["mount x between |", ["genset"]],
    ["mount x between genset and |", ["base", "ground"]],
    ["point x on |", ["genset"]],
    ["transducer x between unit and |", ["coil", "field"]],
    ["mutual x between coil and |", ["field"]],
    ["group x = |", ["mounts", "oil", "shaft_line"]],
    ["group x = mounts, |", ["oil", "shaft_line"]],
    ["spring x |", ["between"]],
    ["inductor x |", ["in", "between"]],
    ["spring x between unit and slab |", ["="]],
    ["ask |", ["modes", "sweep", "history", "shock_spectrum", "random", "vary", "spread", "tune", "fit"]],
    ["assume |", ["gravity", "modal_damping", "mass_damping", "stiffness_damping", "resonance_band"]],
  ])("%s", (line, expected) => {
    const found = labels(SETUP + line);
    expect(found).toEqual(expect.arrayContaining(expected));
    const loose =
      line.includes("between |") || line.includes("and |") || line.includes("of |") || line.includes("on |");
    if (!loose) expect(found.sort()).toEqual([...expected].sort());
  });

  it.each<[string, string[]]>([
    ["spring x between unit and |", ["unit", "rotor", "coil", "genset.rx", "mounts"]],
    ["spring x between rotor and |", ["unit", "floor", "coil", "genset.x"]],
    ["force x on |", ["rotor", "coil", "floor", "ground", "genset.rx"]],
    ["motion x of |", ["ground", "unit"]],
  ])("%s leaves out what does not fit", (line, wrong) => {
    const found = labels(SETUP + line);
    for (const each of wrong) expect(found).not.toContain(each);
  });

  it("offers the principal number by its kind", () => {
    expect(ofKind(offered(`${SETUP}mass x = |`), "parameter")).toEqual(["a_mass"]);
    expect(ofKind(offered(`${SETUP}spring x between rotor and wheel = |`), "parameter")).toEqual([
      "a_torque",
    ]);
    expect(ofKind(offered(`${SETUP}bind unit = |`), "moves")).toContain("slab");
  });

  it("offers statements in column 1, and those of a kit inside it", () => {
    expect(labels("|")).toEqual(["thrum 1", ...labels("thrum 1\n|")]);
    expect(labels("thrum 1\n|")).toHaveLength(STATEMENTS.length);
    const inKit = labels("kit foot between a and b\n    |");
    expect(inKit).toContain("spring");
    expect(inKit).not.toContain("ask");
    expect(labels("kit foot(k) between a and b\n    spring s between |")).toEqual(["a", "b", "ground"]);
    expect(
      ofKind(offered("kit foot(k) between a and b\n    spring s between a and b = |"), "parameter"),
    ).toEqual(["k"]);
  });

  it("names no new thing", () => {
    for (const line of ["mass |", "let |", "ask sweep |", "kit |"]) expect(labels(SETUP + line)).toEqual([]);
  });
});

describe("calls", () => {
  it.each<[string, string[]]>([
    ["expect x = peak(|", ["run_up", "stop_down"]],
    ["expect x = bandwidth(|", ["run_up"]],
    ["expect x = settling_time(|", ["stop_down"]],
    ["expect x = static_force(|", ["mounts", "oil", "shaft_line"]],
    ["expect x = below(run_up, unit.velocity, |", ["zone"]],
    ["expect x = period(|", ["bob"]],
    ["expect x = value(run_up, unit.velocity, |", ["at"]],
    ["expect x = value(run_up, unit.velocity, at: 3 Hz, |", []],
    ["expect x = clear_of_modes(3 Hz, |", ["orders"]],
    ["let x = shaft(80 GPa, 3 mm, 1 m, |", ["bore"]],
    ["expect x = effective_mass(1, |", ["line", "turn", "x", "y", "z", "rx", "ry", "rz"]],
    ["expect x = sensitivity(natural_frequency(1), |", Object.keys(UNITS)],
  ])("%s", (line, expected) => {
    expect(labels(SETUP + line)).toEqual(expected);
  });

  it("offers numbers of the kind an argument has", () => {
    const lets = (line: string) => ofKind(offered(SETUP + line), "parameter");
    expect(lets("let x = shaft(80 GPa, |")).toEqual(["a_length"]);
    expect(lets("let x = series(a_stiffness, |")).toEqual(["a_stiffness", "a_torque"]);
    expect(lets("let x = min(a_length, |")).toEqual(["a_length"]);
    expect(lets("expect x = separation(1, |")).toEqual(["a_rate"]);
    expect(lets("expect x = natural_frequency(1) <= |")).toEqual(["a_rate"]);
    expect(lets("let x = a_mass + |")).toEqual(["a_mass"]);
    expect(lets("let x = 2 * |")).toEqual(Object.keys(UNITS));
    expect(ofKind(offered(`${SETUP}expect x = clear_of_modes(|`), "drives")).toEqual([
      "push",
      "knock",
      "twisting",
    ]);
  });

  it("keeps answers out of numbers, and offers helpers of the kind wanted", () => {
    const functions = (line: string) => ofKind(offered(SETUP + line), "function");
    expect(functions("mass x = |")).not.toContain("natural_frequency");
    expect(functions("mass x = |")).not.toContain("helical_spring");
    expect(functions("spring x between unit and slab = |")).toEqual(
      expect.arrayContaining(["helical_spring", "series", "if"]),
    );
    expect(functions("expect x = |")).toContain("natural_frequency");
  });
});

describe("words", () => {
  it.each<[string, string[]]>([
    ["let x = 3 kg +/- 10 % |", ["normal", "uniform", "lognormal", "within"]],
    ["let x = 3 kg within 2 kg |", ["to"]],
    ["ask vary\n    change = a_mass |", ["from"]],
    ["ask vary\n    change = a_mass from 3 kg |", ["to"]],
    ["spring x between unit and slab = 3 N/mm\n    damping_ratio = 5 % |", ["at"]],
    ["force x on unit\n    speed = a_rate |", ["to", "within", "as"]],
    ["mass x = a_mass |", ["within", "as"]],
    ["expect x = clear_of_modes(3 Hz |", ["to", "as"]],
  ])("%s", (line, expected) => {
    expect(ofKind(offered(SETUP + line), "word")).toEqual(expected);
  });
});

describe("files, notes, cases", () => {
  const files = ["pier/pump.thrum", "pier/numbers.thrum", "catalogue/mounts.thrum", "pier/data/quay.csv"];
  it.each<[string, string[]]>([
    ['use "|', ["numbers.thrum", "../catalogue/mounts.thrum"]],
    ['use "num|bers.thrum"', ["numbers.thrum", "../catalogue/mounts.thrum"]],
    ["use |", ["numbers.thrum", "../catalogue/mounts.thrum"]],
    ['motion x of floor\n    record = "|"', ["data/quay.csv"]],
    ["motion x of floor\n    record = |", ["data/quay.csv"]],
    ['title "|', []],
  ])("%s", (line, expected) => {
    expect(labels(line, { files })).toEqual(expected);
  });

  it("replaces what stands inside the quotes", () => {
    const marked = 'use "num|bers.thrum"\n';
    const { text } = cursorIn(marked);
    const [first] = offered(marked, { files });
    expect(text.slice(first.replaceSpan.start, first.replaceSpan.end)).toBe("numbers.thrum");
    expect(first.insert).toBe("numbers.thrum");
    expect(offered('use "n|', { files })[0].insert).toBe('numbers.thrum"');
  });

  it("offers tags and codes in notes", () => {
    expect(labels("> |")).toEqual(["source", "owner", "checked", "accept"]);
    expect(labels("> accept near|")).toContain("near-resonance");
    expect(labels("> accept |")).not.toContain("syntax");
    expect(labels("> source: weigh|")).toEqual([]);
  });

  it("offers numbers in cases, those not replaced yet", () => {
    const lets = Object.keys(UNITS);
    expect(labels(`${SETUP}case x\n    |`)).toEqual(lets);
    expect(labels(`${SETUP}case x\n    a_mass = 2 kg\n    |`)).toEqual(
      lets.filter((name) => name !== "a_mass"),
    );
    expect(ofKind(offered(`${SETUP}case x\n    a_length = |`), "parameter")).toEqual(["a_length"]);
  });
});

describe("manners", () => {
  it("leaves out details that are there, and those of another shape", () => {
    const keys = labels(`${SETUP}force x on unit\n    unbalance = 3 kg*m\n    |`);
    expect(keys.sort()).toEqual(["chirp", "lasting", "phase", "speed", "turning"]);
    expect(labels(`${SETUP}force x on unit\n    speed = 3 Hz\n    |`).sort()).toEqual([
      ...["amplitude", "frequency", "order", "phase", "turning", "unbalance"],
    ]);
    expect(labels(`${SETUP}mass x = 3 kg\n    |`)).not.toContain("mass");
    expect(labels(`${SETUP}mass x\n    |`)[0]).toBe("mass");
  });

  it("types the number as a place and keeps the unit, one that fits what turns", () => {
    const snippet = (line: string, key: string) =>
      offered(SETUP + line).find(({ label }) => label === key)?.snippet;
    expect(snippet("spring x between unit and slab\n    |", "stiffness")).toBe(`stiffness = \${1:26.5} N/mm`);
    expect(snippet("spring x between rotor and wheel\n    |", "stiffness")).toBe(
      `stiffness = \${1:26.5} N*m/rad`,
    );
    expect(snippet("mass x = 3 kg\n    |", "weight")).toBe(`weight = \${1|off,positive,negative|}`);
    expect(snippet("mass x = 3 kg\n    | = 3 mm", "starts_at")).toBeUndefined();
  });

  it("offers every detail's snippet as text that can be read", () => {
    const byHead = new Map<string, readonly Completion[]>();
    for (const [, detail, head] of slots) {
      const all = byHead.get(head) ?? offered(`${SETUP}${head}\n    |`);
      byHead.set(head, all);
      const found = all.find(({ label }) => label === detail.key);
      if (!found?.snippet) continue;
      const typed = found.snippet
        .replaceAll(/\$\{1\|([^,|]*)[^}]*\}/g, "$1")
        .replaceAll(/\$\{1:((?:[^}\\]|\\.)*)\}/g, "$1");
      const { diagnostics } = parse(`thrum 1\n${head}\n    ${typed.replaceAll("\n", "\n    ")}\n`, PARSING);
      expect({ key: detail.key, diagnostics }).toEqual({ key: detail.key, diagnostics: [] });
    }
  });

  it("sorts by fit and never repeats a label", () => {
    const all = offered(`${SETUP}expect x = |`);
    expect(new Set(all.map(({ label }) => label)).size).toBe(all.length);
    expect(all.map(({ sort }) => sort)).toEqual(all.map(({ sort }) => sort).sort());
  });

  it("offers the word that stands there, all over the examples", () => {
    const without: string[] = [];
    const texts = readdirSync("examples").flatMap((each) =>
      each.endsWith(".thrum") ? [[each, readFileSync(`examples/${each}`, "utf8"), {}] as const] : [],
    );
    const described = [...STATEMENTS, ...ASKS].map(
      ({ keyword, variant, example, exampleFiles }) => [variant ?? keyword, example, exampleFiles] as const,
    );
    for (const [file, text, files] of [...texts, ...described]) {
      const view = viewOf(text, { file: "x.thrum", files });
      const { tokens, roles } = view.model.tree;
      for (const [i, { kind, offset, length }] of tokens.entries()) {
        const inUnit = roles[i] === ROLE.unit && roles[i - 1] === ROLE.unit;
        if (kind !== "name" || roles[i] === ROLE.definition || inUnit) continue;
        const word = text.slice(offset, offset + length);
        const found = complete(view, offset + 1, { explicit: true }).some(({ label }) => {
          return roles[i] === ROLE.unit ? text.startsWith(label, offset) : label.split(/[ .]/)[0] === word;
        });
        if (!found) without.push(`${file}: ${/\S+/.exec(text.slice(offset))?.[0]}`);
      }
    }
    // A unit that is spelt unlike those of the list is typed by hand.
    expect(new Set(without)).toEqual(new Set(["pump-line.thrum: lbm*ft^2"]));
  });

  it("never throws, at any offset and for any prefix of an example", () => {
    const text = readFileSync("examples/ventilation-fan.thrum", "utf8");
    const view = viewOf(text);
    for (let offset = 0; offset <= text.length; offset += 3) complete(view, offset, { explicit: true });
    for (let end = 0; end <= text.length; end += 97) {
      const part = text.slice(0, end);
      complete(viewOf(part), end, { explicit: true });
    }
  });
});
