import { expect, describe as group, test } from "vitest";
import { dimension, kindOf, NUMBER, RATE, sameKind } from "../../shared-core/units/quantity.ts";
import type { Measure } from "../../shared-core/vocabulary/description.ts";
import { dimensionOf, unitsOf, wordsOf } from "../../shared-core/vocabulary/measures.ts";
import { ASKS, describe, detailOf, grammarTable, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { kindsOf, read } from "./written.ts";

const keysOf = (keyword: string, kind?: string): string =>
  (describe(keyword, kind)?.details ?? []).map(({ key }) => key).join(" ");

// The tables of language.md, section 3, row by row.
const JOINS = "count like";
const DRIVE = "amplitude frequency speed order phase";
const PULSE = "pulse peak duration rise fall step";
const RECORD = "record column time_column sampled_at unit scale density";
const DETAILS: Readonly<Record<string, string>> = {
  title: "",
  use: "",
  let: "",
  assume: "",
  case: "",
  limit: "rows between_points of bands",
  group: "",
  kit: "",
  part: "",
  mass: "mass starts_at starts_moving weight",
  inertia: "inertia starts_at starts_moving",
  junction: "kind",
  body: "mass centre inertia products moves spin weight",
  point: "",
  pendulum: "mass length inertia on hangs swing damping starts_at starts_moving",
  loop: "starts_at starts_moving",
  support: "kind",
  bind: "",
  spring: `stiffness loss_factor damping_ratio cubic law curve rated_travel preload mass ${JOINS}`,
  damper: `damping quadratic law rated_force ${JOINS}`,
  inerter: `inertance ${JOINS}`,
  stop: `stiffness gap damping side ${JOINS}`,
  cord: `stiffness slack damping rated_force ${JOINS}`,
  friction: `force static_force ${JOINS}`,
  mount: `stiffness damping damping_ratio loss_factor turned ${JOINS}`,
  inductor: `inductance ${JOINS}`,
  resistor: `resistance ${JOINS}`,
  capacitor: `capacitance ${JOINS}`,
  mutual: `inductance ${JOINS}`,
  transducer: `factor ${JOINS}`,
  feed: `stiffness damping inertance ${JOINS}`,
  force: `${DRIVE} unbalance turning ${PULSE} impulse start law chirp lasting ${RECORD}`,
  torque: `${DRIVE} unbalance turning ${PULSE} impulse start law curve chirp lasting ${RECORD}`,
  voltage: `${DRIVE} ${PULSE} impulse start law chirp lasting ${RECORD}`,
  motion: `${DRIVE} ${PULSE} start law chirp lasting ${RECORD}`,
  expect: "margin cases tolerance",
  "ask modes": "up_to count",
  "ask sweep": "of by from to points spacing",
  "ask history": "of by lasting step accuracy start",
  "ask shock_spectrum": "of by q_factor from to",
  "ask random": "of by from to duration bands",
  "ask vary": "change points watch",
  "ask spread": "samples seed watch",
  "ask tune": "change least most keep",
  "ask fit": "change measured",
};

group("the registry", () => {
  test("holds every statement and kind of ask of the language, with its details", () => {
    for (const [title, keys] of Object.entries(DETAILS)) {
      const [keyword, kind] = title.split(" ");
      expect(keysOf(keyword, kind).split(" ").sort(), title).toEqual(keys.split(" ").sort());
    }
    const titles = [...STATEMENTS.filter(({ keyword }) => keyword !== "ask"), ...ASKS];
    expect(titles.length).toBe(Object.keys(DETAILS).length);
  });

  test("assume knows its keys", () => {
    const keys = describe("assume")?.keys?.map(({ key, standard }) => `${key} ${standard}`);
    expect(keys).toEqual([
      "gravity 1 gn",
      "modal_damping 0 %",
      "mass_damping 0 1/s",
      "stiffness_damping 0 s",
      "resonance_band 20 %",
    ]);
  });

  test("says what this version does not compute", () => {
    const statements = STATEMENTS.filter(({ notYet }) => notYet).map(({ keyword }) => keyword);
    expect(statements.join(" ")).toBe(
      "kit part body point pendulum loop stop cord friction mount inductor resistor capacitor mutual " +
        "transducer feed voltage",
    );
    const asks = ASKS.filter(({ notYet }) => notYet).map(({ variant }) => variant);
    expect(asks.join(" ")).toBe("shock_spectrum random vary spread tune fit");
    const details = STATEMENTS.filter(({ notYet }) => !notYet).flatMap((statement) =>
      statement.details.filter(({ notYet }) => notYet).map(({ key }) => `${statement.keyword}.${key}`),
    );
    expect(details.join(" ")).toBe(
      "spring.cubic spring.law spring.curve damper.quadratic damper.law " +
        "force.turning force.density torque.turning torque.density motion.density",
    );
  });

  test("an ask before its kind is known takes the details of all kinds and wants none", () => {
    const details = describe("ask")?.details ?? [];
    expect(details.some(({ required }) => required)).toBe(false);
    for (const ask of ASKS)
      for (const { key } of ask.details) expect(details.map((each) => each.key)).toContain(key);
    expect(describe("ask", "no_such_kind")).toBe(describe("ask"));
    expect(describe("no_such_statement")).toBeUndefined();
  });

  test("the parser's table is what the descriptions say", () => {
    const table = grammarTable();
    expect([...table.keys()]).toEqual(STATEMENTS.map(({ keyword }) => keyword));
    expect(table.get("case")?.openDetails).toBe(true);
    expect(table.get("kit")?.holdsStatements).toBe(true);
    const rows = (keyword: string) =>
      (table.get(keyword)?.details ?? [])
        .filter((detail) => detail.rows)
        .map(({ key, rows: kind }) => `${key} ${kind}`);
    expect(rows("limit")).toEqual(["rows table"]);
    expect(rows("spring")).toEqual(["curve table", "like list"]);
    expect(rows("ask").sort()).toEqual([
      "by list",
      "change list",
      "keep list",
      "least list",
      "measured table",
      "most list",
      "of list",
      "watch list",
    ]);
    expect(detailOf(STATEMENTS[0], "anything")).toBeUndefined();
  });
});

// The forms of language.md, section 3, that differ from `KEYWORD NAME [= VALUE]`.
group("forms of a head", () => {
  test.each([
    "let twice = 2 * (3 mm + 1 in)",
    "let k = 26.5 N/mm +/- 10 % normal within 20 N/mm to 30 N/mm",
    "assume resonance_band = 15 %",
    "limit floor = 4.5 mm/s",
    "limit floor",
    "group feet = mounts, oil",
    "kit foot(p, q) between A and B",
    "part left = foot(3 N/mm, q: 2) between unit and slab",
    "body genset = 2.4 t",
    "point hook on genset at (1, 0, 0.5) m",
    "bind pinion = -3.2 * wheel",
    "bind tip = (b/a) * heel",
    "bind genset.z = 2 * wheel",
    "spring k between genset.z and ground",
    "mount foot between genset and ground at (310, 0, -20) mm",
    "inductor coil in winding = 3 mH",
    "resistor r between left and right = 3 ohm",
    "transducer bl between former and winding = 4 N/A",
    "feed sky from cab to frame",
    "force kick on hook.x",
    "voltage source on winding",
    "motion quake of floor",
    "motion quake of floor.z",
    "ask modes",
    "ask sweep run_up",
    "ask shock_spectrum",
    "expect stiff = natural_frequency(1) >= 8 Hz",
    "expect band = 3 Hz <= natural_frequency(1) <= 6 Hz",
  ])("%s", (line) => {
    const { tree, diagnostics } = read(`thrum 1\n${line}\n`);
    expect(diagnostics.map(({ message }) => message)).toEqual([]);
    expect(tree.statements[0].broken).toBe(false);
  });

  test.each([
    "spring k between a",
    "ask sweeps",
    "point p at (0, 0, 0) m",
    "let x",
    "mass pump on floor",
    "force f of a",
  ])("%s is an error", (line) => {
    expect(read(`thrum 1\n${line}\n`).diagnostics.length).toBeGreaterThan(0);
  });
});

group("measures", () => {
  const motions = ["sliding", "turning", "charge"] as const;
  const measures: readonly Measure[] = [
    ...([
      "mass",
      "inertia",
      "length",
      "angle",
      "time",
      "rate",
      "stiffness",
      "damping",
      "inertance",
      "force",
    ] as const),
    ...([
      "travel",
      "speed",
      "acceleration",
      "momentum",
      "unbalance",
      "cubic",
      "quadratic",
      "resistance",
    ] as const),
    ...([
      "inductance",
      "capacitance",
      "charge",
      "current",
      "voltage",
      "force_factor",
      "decay",
      "pressure",
    ] as const),
    ...(["area", "volume", "second_moment", "power", "energy", "number", "share"] as const),
  ];

  test("depend on what moves", () => {
    expect(dimensionOf("stiffness")).toEqual(kindOf(dimension(0, 1, -2)));
    expect(dimensionOf("stiffness", "turning")).toEqual(kindOf(dimension(2, 1, -2)));
    expect(dimensionOf("damping", "charge")).toEqual(dimensionOf("resistance"));
    expect(dimensionOf("inertance", "charge")).toEqual(dimensionOf("inductance"));
    expect(dimensionOf("travel", "turning")).toEqual(NUMBER);
    expect(dimensionOf("speed", "turning")).toEqual(RATE);
    expect(dimensionOf("any")).toBeUndefined();
    expect(wordsOf("stiffness")).toBe("a stiffness");
    expect(wordsOf("force", "turning")).toBe("a torque");
  });

  test("power balances in every motion: force times speed, and half stiffness times travel squared", () => {
    const joule = dimension(2, 1, -2);
    for (const motion of motions) {
      const at = (measure: Measure) => dimensionOf(measure, motion)?.dimension ?? NUMBER.dimension;
      const sum = (...parts: readonly (readonly number[])[]) =>
        parts.reduce((total, part) => total.map((each, i) => each + part[i]), [0, 0, 0, 0, 0, 0, 0]);
      expect(sum(at("force"), at("travel")), motion).toEqual([...joule]);
      expect(sum(at("stiffness"), at("travel"), at("travel")), motion).toEqual([...joule]);
      expect(sum(at("damping"), at("speed")), motion).toEqual([...at("force")]);
      expect(sum(at("inertance"), at("acceleration")), motion).toEqual([...at("force")]);
      expect(sum(at("cubic"), at("travel"), at("travel"), at("travel")), motion).toEqual([...at("force")]);
      expect(sum(at("quadratic"), at("speed"), at("speed")), motion).toEqual([...at("force")]);
      expect(sum(at("force"), dimension(0, 0, 1)), motion).toEqual([...at("momentum")]);
    }
  });

  test("offer units of their kind", () => {
    for (const motion of motions) {
      for (const measure of measures) {
        const wanted = dimensionOf(measure, motion);
        for (const unit of unitsOf(measure, motion)) {
          const { tree, diagnostics } = read(`thrum 1\nlet x = 1 ${unit}\n`);
          expect(diagnostics, unit).toEqual([]);
          const [value] = tree.statements[0].value ?? [];
          expect(
            value.kind === "value" && wanted !== undefined && sameKind(kindOfFirst(value), wanted),
            unit,
          ).toBe(true);
        }
      }
    }
  });
});

function kindOfFirst(value: Parameters<typeof kindsOf>[0][number]) {
  return kindsOf([value])[0];
}
