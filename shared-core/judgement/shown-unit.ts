import type { Instance } from "../model/model.ts";
import type { Expression, UnitNode } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import { sameKind } from "../units/quantity.ts";
import { formatQuantity } from "../units/show.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";

/** A quantity in the unit in which one of the expressions writes that kind of quantity; else in a fitting one. */
export function showAs(
  quantity: Quantity,
  instance: Instance,
  ...expressions: readonly Expression[]
): string {
  for (const expression of expressions) {
    const unit = writtenUnit(instance, expression);
    if (unit !== undefined && sameKind(unit.kind, quantity)) return formatQuantity(quantity, { unit });
  }
  return formatQuantity(quantity);
}

/** A parameter's value in the unit it is written in. */
export function showParameter(instance: Instance, name: string, value: number): string {
  const parameter = instance.parameters.get(name);
  if (parameter === undefined) return String(value);
  const unit = meaningOf(parameter.unitNode);
  return formatQuantity({ ...parameter, value }, { unit });
}

/** The first unit that an expression, or a `let` it names, is written in. Units inside calls are of arguments. */
export function writtenUnit(instance: Instance, expression: Expression): UnitMeaning | undefined {
  switch (expression.kind) {
    case "number":
      return meaningOf(expression.unit);
    case "as":
      return meaningOf(expression.unit);
    case "path":
      return meaningOf(instance.parameters.get(expression.names[0].text)?.unitNode);
    case "parenthesis":
      return writtenUnit(instance, expression.inner);
    case "unary":
      return writtenUnit(instance, expression.operand);
    case "binary":
      return writtenUnit(instance, expression.left) ?? writtenUnit(instance, expression.right);
    default:
      return undefined;
  }
}

function meaningOf(unit: UnitNode | undefined): UnitMeaning | undefined {
  if (unit === undefined) return undefined;
  const meaning = unitOf(unit);
  return "kind" in meaning ? meaning : undefined;
}
