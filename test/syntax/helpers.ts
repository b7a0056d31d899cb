import { expect } from "vitest";
import type { Diagnostic } from "../../shared-core/diagnostics/diagnostic.ts";
import { type Parsed, type ParseOptions, parse } from "../../shared-core/syntax/parser.ts";
import type { Expression, Item, SlotValue, StatementNode, UnitNode } from "../../shared-core/syntax/tree.ts";
import { applyEdits } from "../../shared-core/text/line-index.ts";
import { nearest } from "../../shared-core/text/nearest.ts";
import { isUnitName, UNIT_NAMES } from "../../shared-core/units/lookup.ts";
import { grammarTable } from "../../shared-core/vocabulary/registry.ts";

export const OPTIONS: ParseOptions = {
  grammar: grammarTable(),
  isUnit: isUnitName,
  nearestUnit: (name) => nearest(name, UNIT_NAMES),
};

export const read = (text: string): Parsed => parse(text, OPTIONS);

/** The example of language.md, section 1, and one of each other form. */
export const SAMPLE = `thrum 1
title "Air handler on a roof slab"

> Weighed on site with belt guard and motor fitted.
> source: weighbridge ticket 0417
let unit_mass = 420 kg +/- 3 %
let mount = 26.5 N/mm within 20 N/mm to 30 N/mm   # from the maker
let fan_speed = 1180 rpm

mass unit = unit_mass
mass slab = 9.6 t

spring mounts between unit and slab = mount ± 10 % normal
    count = 4
    > measured at 12 Hz
    damping_ratio = 5 % at 12 Hz
damper oil between unit and slab = 2.1 kN*s/m
group feet = mounts, oil
spring beams between slab and ground = 11.2 MN/m
    loss_factor = 0.03
stop bump between unit and slab = 3 kN/mm
    gap = 4 mm

body genset
    mass = 1.2e3 kg
    inertia = (310, 840, 760) kg*m^2
    moves = z, rx, ry
point nozzle on genset at (0.4 m, 0 m, -12 mm)
mount foot between genset and ground at (0, 0.5, 0) m
    stiffness.x = 180 N/mm +/- 5 %
    stiffness.y = 180 N/mm
resistor winding in coil = 5.6 ohm
bind pinion = -3.2 * wheel

kit isolator(k, c) between a and b
    # one foot
    > both at once
    spring s between a and b = k
        loss_factor = 2 %
    damper d between a and b = c
part front = isolator(12 N/mm, 30 N*s/m) between unit and slab

limit floor
    > source: common practice, no source
    rows =
        2 Hz   3 mm/s
        10 Hz, 1 mm/s

force imbalance on unit
    unbalance = 0.018 kg*m
    speed = 600 rpm to 1500 rpm
force shake on slab
    law = if(t < 2 s, 3 N, 0) * sin(2*pi*12 Hz * t)
motion street of ground
    chirp = from 2 Hz to 40 Hz
    record = "street.csv"

ask modes
ask sweep run_up
    of = unit.velocity, feet.force
    by = imbalance
    from = 2 Hz
    to = 40 Hz
ask vary wider
    change = mount from 20 N/mm to 40 N/mm
    watch =
        natural_frequency(1)
        peak(run_up, unit.velocity)

case winter
    mount = 31 N/mm
expect soft_enough = natural_frequency(1) <= 0.35 * fan_speed
expect quiet_slab = transmissibility(run_up, feet, at: fan_speed) <= 12 %
`;

/** Codes and places as text, `code@line:character "marked"`. */
export function said(parsed: Parsed): string[] {
  return parsed.diagnostics.map((d) => `${d.code} ${JSON.stringify(marked(parsed, d))}`);
}

export const marked = (parsed: Parsed, d: Diagnostic): string =>
  parsed.tree.text.slice(d.span.start, d.span.end);

export const outline = (text: string): string[] => outlined(read(text).tree.statements);
export const messages = (text: string): string[] => read(text).diagnostics.map((d) => d.message);

/** The text after the first fix of its only diagnostic; the fixed text has no diagnostics but `left`. */
export function fixed(text: string, left: string[] = []): string {
  const parsed = read(text);
  expect(parsed.diagnostics).toHaveLength(1);
  const cured = applyEdits(text, parsed.diagnostics[0].fixes?.[0].edits ?? []);
  expect(said(read(cured))).toEqual(left);
  return cured;
}

/** The expression behind `let x = ` in brackets that show how it was grouped. */
export function grouped(text: string): string {
  const { tree, diagnostics } = read(`thrum 1\nlet x = ${text}\n`);
  if (diagnostics.length > 0) return diagnostics.map((d) => `${d.code}: ${d.message}`).join("; ");
  return (tree.statements[0].value ?? []).map(itemText).join(", ");
}

export function itemText(item: Item): string {
  if (item.kind === "text") return JSON.stringify(item.text);
  if (item.kind === "range") {
    const name = item.name ? `${item.name.names.map((n) => n.text).join(".")} ` : "";
    return `${name}[${shape(item.from)} to ${shape(item.to)}]`;
  }
  if (item.kind === "at") return `${itemText(item.value)} at ${shape(item.at)}`;
  const tolerance = item.tolerance
    ? ` +/- ${shape(item.tolerance.amount)}${item.tolerance.distribution ? ` ${item.tolerance.distribution.text}` : ""}`
    : "";
  const within = item.within ? ` within [${shape(item.within.from)} to ${shape(item.within.to)}]` : "";
  return shape(item.expression) + tolerance + within;
}

export function shape(node: Expression): string {
  switch (node.kind) {
    case "number":
      return `${node.value}${node.unit ? ` ${unitText(node.unit)}` : ""}`;
    case "tuple":
      return `<${node.items.map(shape).join(", ")}>${node.unit ? ` ${unitText(node.unit)}` : ""}`;
    case "path":
      return node.names.map((name) => name.text).join(".");
    case "call": {
      const named = node.named.map(({ name, value }) => `${name.text}: ${shape(value)}`);
      return `${node.callee.text}[${[...node.positional.map(shape), ...named].join(", ")}]`;
    }
    case "unary":
      return `(${node.operator} ${shape(node.operand)})`;
    case "binary":
      return `(${shape(node.left)} ${node.operator} ${shape(node.right)})`;
    case "as":
      return `(${shape(node.operand)} as ${unitText(node.unit)})`;
    case "range":
      return `[${shape(node.from)} to ${shape(node.to)}]`;
    case "parenthesis":
      return shape(node.inner);
    case "broken":
      return "?";
  }
}

export const unitText = (unit: UnitNode): string =>
  `{${unit.factors.map(({ name, power }) => `${name}${power === 1 ? "" : power}`).join(" ")}}`;

/** Statements with their slots and details, one a line. */
export function outlined(statements: readonly StatementNode[], indent = ""): string[] {
  return statements.flatMap((s) => [
    `${indent}${s.keyword.text} ${Object.entries(s.slots)
      .map(([slot, value]) => `${slot}=${slotText(value)}`)
      .join(" ")}${s.value ? ` := ${s.value.map(itemText).join(", ")}` : ""}${s.broken ? " broken" : ""}`,
    ...s.details.map((d) => {
      const key = d.component ? `${d.key.text}.${d.component.text}` : d.key.text;
      const table = d.table?.map((row) => `[${row.cells.map(shape).join(" | ")}]`).join("") ?? "";
      return `${indent}  ${key}: ${d.items.map(itemText).join(", ")}${table}${d.broken ? " broken" : ""}`;
    }),
    ...outlined(s.inner, `${indent}    `),
  ]);
}

function slotText(value: SlotValue): string {
  if (value.kind === "name" || value.kind === "text") return value.text;
  if (value.kind === "names" || value.kind === "parameters") {
    return `(${value.items.map((item) => (item.kind === "path" ? shape(item) : item.text)).join(" ")})`;
  }
  return value.kind === "value" ? itemText(value) : shape(value);
}
