import type { Expression, NumberNode, UnitNode } from "../syntax/tree.ts";
import { isFault } from "../units/fault.ts";
import { siUnit } from "../units/show.ts";
import { unitOf } from "../units/unit-of.ts";

/** Digits that a canonical number keeps: enough for any input, few enough to hide the rounding of a unit. */
const DIGITS = 12;

/** An SI number as text: twelve digits, no trailing zeros. */
export const canonicalNumber = (value: number): string => String(Number(value.toPrecision(DIGITS)));

/** An SI value with its SI unit; a bare number stands alone. */
export const canonicalValue = (value: number, unit: string): string =>
  unit === "1" || unit === "" ? canonicalNumber(value) : `${canonicalNumber(value)} ${unit}`;

/** An expression in one spelling: numbers in SI, one blank round operators, the author's parentheses. */
export function expressionText(node: Expression): string {
  switch (node.kind) {
    case "number":
      return literalText(node);
    case "path":
      return node.names.map((name) => name.text).join(".");
    case "tuple":
      return `(${node.items.map(expressionText).join(", ")})${node.unit ? ` ${node.unit.text}` : ""}`;
    case "call": {
      const named = node.named.map(({ name, value }) => `${name.text}: ${expressionText(value)}`);
      return `${node.callee.text}(${[...node.positional.map(expressionText), ...named].join(", ")})`;
    }
    case "unary":
      return `${node.operator}${node.operator === "not" ? " " : ""}${expressionText(node.operand)}`;
    case "binary":
      return `${expressionText(node.left)} ${node.operator} ${expressionText(node.right)}`;
    case "as":
      return `${expressionText(node.operand)} as ${node.unit.text}`;
    case "parenthesis":
      return `(${expressionText(node.inner)})`;
    case "range":
      return `${expressionText(node.from)} to ${expressionText(node.to)}`;
    case "broken":
      return "?";
  }
}

function literalText({ value, unit }: NumberNode): string {
  const meaning = unit && meaningOf(unit);
  if (meaning === undefined) return canonicalNumber(value) + (unit ? ` ${unit.text}` : "");
  return canonicalValue(value * meaning.factor, meaning.si);
}

function meaningOf(unit: UnitNode): { readonly factor: number; readonly si: string } | undefined {
  const meaning = unitOf(unit);
  return isFault(meaning) ? undefined : { factor: meaning.factor, si: siUnit(meaning.kind) };
}
