import type { Expression } from "../syntax/tree.ts";

/** Shows every node of an expression, the whole one first. */
export function visit(node: Expression, see: (node: Expression) => void): void {
  see(node);
  for (const child of childrenOf(node)) visit(child, see);
}

/** The expressions directly inside. */
export function childrenOf(node: Expression): readonly Expression[] {
  switch (node.kind) {
    case "parenthesis":
      return [node.inner];
    case "unary":
    case "as":
      return [node.operand];
    case "binary":
      return [node.left, node.right];
    case "call":
      return [...node.positional, ...node.named.map(({ value }) => value)];
    case "tuple":
      return node.items;
    default:
      return [];
  }
}
