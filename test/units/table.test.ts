import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { create, createUnitDependencies, unitDependencies } from "mathjs";
import { describe, expect, test } from "vitest";
import { isUnitName, lookupUnit, PREFIXES, UNIT_NAMES } from "../../shared-core/units/lookup.ts";
import { UNIT_TABLE } from "../../shared-core/units/table.ts";

const math = create({ unitDependencies, createUnitDependencies });

/** Units whose factor in the table is exact where mathjs rounds, or which mathjs does not know. */
const EXACT: ReadonlyMap<string, { readonly factor: number; readonly source: string }> = new Map([
  ["lbf", { factor: 4.4482216152605, source: "0.45359237 kg x 9.80665 m/s^2, NIST SP 811 (2008), B.8" }],
  ["kip", { factor: 4448.2216152605, source: "1000 lbf, NIST SP 811, B.8" }],
  [
    "psi",
    { factor: 4.4482216152605 / 0.00064516, source: "lbf/in^2, 1 in^2 = 645.16 mm^2, NIST SP 811, B.8" },
  ],
  ["slug", { factor: 4.4482216152605 / 0.3048, source: "lbf s^2/ft, NIST SP 811, B.8" }],
  ["oz", { factor: 0.028349523125, source: "avoirdupois ounce, NIST SP 811, B.8" }],
  ["lbm", { factor: 0.45359237, source: "avoirdupois pound, NIST SP 811, B.8" }],
  ["in", { factor: 0.0254, source: "NIST SP 811, B.8" }],
  ["ft", { factor: 0.3048, source: "NIST SP 811, B.8" }],
  ["mil", { factor: 0.0000254, source: "0.001 in, NIST SP 811, B.8" }],
  ["t", { factor: 1000, source: "tonne, SI brochure (2019), table 8" }],
  ["gn", { factor: 9.80665, source: "standard gravity, ISO 80000-3" }],
  ["deg", { factor: Math.PI / 180, source: "ISO 80000-3" }],
  ["rev", { factor: 2 * Math.PI, source: "one turn, ISO 80000-3" }],
  ["rpm", { factor: 1 / 60, source: "cycles a minute, held in Hz" }],
  ["cpm", { factor: 1 / 60, source: "cycles a minute, held in Hz" }],
  ["%", { factor: 0.01, source: "ISO 80000-1" }],
  ["ppm", { factor: 1e-6, source: "parts per million" }],
]);

/** What mathjs calls a unit that it does not know by the name of the language. */
const ASKED: Readonly<Record<string, string>> = {
  slug: "lbf s^2 / ft",
  gn: "m / s^2",
  rpm: "Hz",
  cpm: "Hz",
  "\u03a9": "ohm",
  "\u2126": "ohm",
};
const NUMBERS = ["%", "ppm", "rev"];

describe("the unit table", () => {
  test.each(UNIT_TABLE.filter(({ name }) => !NUMBERS.includes(name)))("$name is as mathjs has it", (unit) => {
    const si = math.unit(1, ASKED[unit.name] ?? unit.name).toSI() as unknown as {
      value: number;
      dimensions: number[];
    };
    const [mass, length, time, current, temperature, luminous, amount] = si.dimensions;
    expect(unit.dimension).toEqual([length, mass, time, current, temperature, amount, luminous]);
    const exact = EXACT.get(unit.name);
    if (exact === undefined) expect(unit.factor).toBe(si.value);
    // mathjs rounds psi in the eleventh digit and kip in the eighth.
    else if (!["rpm", "cpm", "gn"].includes(unit.name))
      expect(Math.abs(unit.factor / si.value - 1)).toBeLessThan(1e-8);
  });

  test.each([...EXACT])("%s has its exact factor", (name, { factor }) => {
    const found = lookupUnit(name)?.factor ?? Number.NaN;
    expect(Math.abs(found / factor - 1)).toBeLessThanOrEqual(2 ** -52);
  });

  test("only SI names and names used with them take prefixes", () => {
    const taking = UNIT_TABLE.filter((unit) => unit.prefixes).map((unit) => unit.name);
    expect(taking.join(" ")).toBe(
      "m g s A K mol cd N Pa J W C V F H S Wb T ohm \u03a9 \u2126 rad l L bar Hz",
    );
    for (const name of ["klbf", "kpsi", "mmin", "kt", "mrpm", "kin", "mdeg", "m%"])
      expect(lookupUnit(name), name).toBeUndefined();
  });

  test("exact names win over prefix and name, and words of the grammar are no units", () => {
    expect(lookupUnit("min")?.factor).toBe(60);
    expect(lookupUnit("cd")?.dimension).toEqual([0, 0, 0, 0, 0, 0, 1]);
    expect(lookupUnit("Pa")?.dimension).toEqual([-1, 1, -2, 0, 0, 0, 0]);
    expect(lookupUnit("ft")?.factor).toBe(0.3048);
    expect(lookupUnit("h")?.factor).toBe(3600);
    expect(lookupUnit("T")?.dimension).toEqual([0, 1, -2, -1, 0, 0, 0]);
    for (const word of ["as", "at", "to", "from", "and", "or", "if", "pi", "e", "within", "normal"])
      expect(isUnitName(word), word).toBe(false);
  });

  test("micro is typed in three ways, and prefixed grams are exact", () => {
    for (const name of ["um", "\u00b5m", "\u03bcm"]) expect(lookupUnit(name)?.factor).toBe(1e-6);
    expect(lookupUnit("kg")?.factor).toBe(1);
    expect(lookupUnit("mg")?.factor).toBe(1e-6);
    expect(lookupUnit("dag")?.factor).toBe(0.01);
    expect(lookupUnit("kHz")).toEqual({
      name: "kHz",
      factor: 1000,
      dimension: [0, 0, -1, 0, 0, 0, 0],
      rate: true,
    });
  });

  test("no prefix with an SI name spells another unit of the table", () => {
    const clashes = [...PREFIXES.keys()].flatMap((prefix) =>
      UNIT_TABLE.filter((unit) => unit.prefixes && UNIT_NAMES.includes(prefix + unit.name)).map(
        (unit) => prefix + unit.name,
      ),
    );
    expect(clashes).toEqual([]);
  });
});

test("the table is what its script writes", () => {
  const script = fileURLToPath(new URL("../../tools/make-unit-table.mjs", import.meta.url));
  const { status, stderr } = spawnSync(process.execPath, [script, "--check"], { encoding: "utf8" });
  expect(stderr).toBe("");
  expect(status).toBe(0);
});
