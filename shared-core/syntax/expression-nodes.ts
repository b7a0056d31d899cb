import type { Expression } from "./tree.ts";

/** The expressions directly inside, in the order of the text; the ends of a range are inside it. */
export function childrenOf(node: Expression): readonly Expression[] {
  switch (node.kind) {
    case "parenthesis":
      return [node.inner];
    case "unary":
    case "as":
      return [node.operand];
    case "binary":
      return [node.left, node.right];
    case "tuple":
      return node.items;
    case "range":
      return [...(node.name ? [node.name] : []), node.from, node.to];
    case "call":
      return [...node.positional, ...node.named.map(({ value }) => value)];
    default:
      return [];
  }
}

/** Every node of an expression, the whole one first. */
export function* nodesOf(expression: Expression): Generator<Expression> {
  yield expression;
  for (const child of childrenOf(expression)) yield* nodesOf(child);
}

/** Shows every node of an expression, the whole one first: the same for where each step counts. */
export function visit(node: Expression, see: (node: Expression) => void): void {
  see(node);
  for (const child of childrenOf(node)) visit(child, see);
}
