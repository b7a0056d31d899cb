import type { Expression } from "../syntax/tree.ts";

/** Every node of an expression, itself first. */
export function* nodesOf(expression: Expression): Generator<Expression> {
  yield expression;
  for (const child of childrenOf(expression)) yield* nodesOf(child);
}

function childrenOf(expression: Expression): readonly Expression[] {
  switch (expression.kind) {
    case "tuple":
      return expression.items;
    case "call":
      return [...expression.positional, ...expression.named.map(({ value }) => value)];
    case "unary":
    case "as":
      return [expression.operand];
    case "binary":
      return [expression.left, expression.right];
    case "parenthesis":
      return [expression.inner];
    default:
      return [];
  }
}

/** Whether an expression names one of these things. */
export function names(expression: Expression, wanted: ReadonlySet<string>): boolean {
  for (const node of nodesOf(expression)) {
    if (node.kind === "path" && wanted.has(node.names[0].text)) return true;
  }
  return false;
}
