import type { Expression } from "./tree.ts";

/** Whether the text shows the number as it is: a literal, with its sign or its unit behind `as`. */
export function saysItself(expression: Expression): boolean {
  switch (expression.kind) {
    case "number":
    case "broken":
    case "range":
      return true;
    case "unary":
    case "as":
      return saysItself(expression.operand);
    case "parenthesis":
      return saysItself(expression.inner);
    case "tuple":
      return expression.items.every(saysItself);
    default:
      return false;
  }
}
