/**
 * Writes shared-core/units/table.ts: asks mathjs for the dimension and factor of each unit of the language and
 * puts the exact factor in place of a rounded one. Usage: node tools/make-unit-table.mjs [--check]
 */
import { execFileSync } from "node:child_process";
import { readFileSync, writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { create, createUnitDependencies, unitDependencies } from "mathjs";
import { EXACT, LANGUAGE_UNITS } from "./unit-definitions.mjs";

const target = fileURLToPath(new URL("../shared-core/units/table.ts", import.meta.url));
const math = create({ unitDependencies, createUnitDependencies });

const rows = LANGUAGE_UNITS.map(rowOf);
const text = format(render(rows));
if (process.argv.includes("--check")) {
  if (readFileSync(target, "utf8") !== text) {
    console.error("shared-core/units/table.ts is not what tools/make-unit-table.mjs writes");
    process.exit(1);
  }
} else {
  writeFileSync(target, text);
}

/** One row: [name, factor, dimension, flags]. */
function rowOf(unit) {
  const asked = unit.ask === null ? undefined : math.unit(1, unit.ask ?? unit.name).toSI();
  const factor = EXACT[unit.name]?.factor ?? asked.value;
  const dimension = asked ? dimensionOf(asked.dimensions) : [0, 0, 0, 0, 0, 0, 0];
  return { ...unit, factor, dimension };
}

/** mathjs: mass, length, time, current, temperature, luminous intensity, amount, angle, bit. Angle is a number. */
function dimensionOf([mass, length, time, current, temperature, luminous, amount]) {
  return [length, mass, time, current, temperature, amount, luminous];
}

function render(all) {
  const lines = all.map(({ name, factor, dimension, rate, prefixes }) => {
    const parts = [
      `name: ${JSON.stringify(name)}`,
      `factor: ${factor}`,
      `dimension: [${dimension.join(", ")}]`,
    ];
    if (rate) parts.push(`rate: true`);
    if (prefixes) parts.push(`prefixes: true`);
    return `  { ${parts.join(", ")} },`;
  });
  return `import type { Unit } from "./dimension.ts";

/** A unit that the language spells itself; \`prefixes\` marks the SI names, which alone take them. */
export interface TableUnit extends Unit {
  readonly prefixes?: true;
}

/**
 * The units of the language. Written by tools/make-unit-table.mjs from mathjs, with exact factors in place of
 * rounded ones; change that script, not this file. Dimension order as in dimension.ts; rates in Hz.
 */
export const UNIT_TABLE: readonly TableUnit[] = [
${lines.join("\n")}
];
`;
}

function format(source) {
  return execFileSync("npx", ["biome", "format", "--stdin-file-path=shared-core/units/table.ts"], {
    input: source,
    encoding: "utf8",
    cwd: fileURLToPath(new URL("..", import.meta.url)),
  });
}
