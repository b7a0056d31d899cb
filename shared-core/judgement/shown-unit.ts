import type { Instance } from "../model/model.ts";
import type { Expression, UnitNode } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import { NUMBER, sameKind } from "../units/quantity.ts";
import { formatQuantity } from "../units/show.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import { dimensionOf } from "../vocabulary/measures.ts";

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

/** The value of what a tolerance is written on: a `let`, `mounts.stiffness`, `slab.mass`. */
export function showOwner(instance: Instance, owner: string, value: number): string {
  if (instance.parameters.has(owner)) return showParameter(instance, owner, value);
  const dot = owner.lastIndexOf(".");
  const element = instance.assembly.elements.find(({ name }) => name === owner.slice(0, dot));
  const measure = MEASURES.find((known) => known === owner.slice(dot + 1));
  const kind = measure === undefined ? undefined : dimensionOf(measure, element?.motion);
  return formatQuantity({ ...(kind ?? NUMBER), value });
}

const MEASURES = ["stiffness", "damping", "inertance", "mass", "inertia"] as const;

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
