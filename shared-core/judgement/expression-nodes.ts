import { nodesOf } from "../syntax/expression-nodes.ts";
import type { Expression } from "../syntax/tree.ts";

/** Whether an expression names one of these things. */
export function names(expression: Expression, wanted: ReadonlySet<string>): boolean {
  for (const node of nodesOf(expression)) {
    if (node.kind === "path" && wanted.has(node.names[0].text)) return true;
  }
  return false;
}
