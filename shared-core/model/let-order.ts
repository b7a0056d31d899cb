import { visit } from "../syntax/expression-nodes.ts";
import type { Expression } from "../syntax/tree.ts";
import type { FileContext, LetTable } from "./lets.ts";
import type { Entity } from "./model.ts";

/**
 * Understands the lets of a file, each behind those that it names, so that a chain of any length in any order
 * needs no deep recursion. Circles are left for the table of lets to say.
 */
export function understandLets(file: FileContext, lets: LetTable): void {
  const state = new Map<Entity, "open" | "done">();
  for (const entity of file.names.values()) {
    if (entity.keyword !== "let" || entity.file !== file.file) continue;
    const stack: Entity[] = [entity];
    while (stack.length > 0) {
      const top = stack[stack.length - 1];
      if (state.get(top) === undefined) {
        state.set(top, "open");
        for (const named of namedLets(top, file)) if (state.get(named) === undefined) stack.push(named);
        continue;
      }
      stack.pop();
      if (state.get(top) === "done") continue;
      state.set(top, "done");
      lets.typed(top, file);
    }
  }
}

function namedLets(entity: Entity, file: FileContext): Entity[] {
  const named: Entity[] = [];
  for (const item of entity.node.value ?? []) {
    if (item.kind !== "value") continue;
    const expressions: (Expression | undefined)[] = [
      item.expression,
      item.tolerance?.amount,
      item.within?.from,
      item.within?.to,
    ];
    for (const expression of expressions) {
      if (expression === undefined) continue;
      visit(expression, (node) => {
        const other = node.kind === "path" && node.names[0] ? file.names.get(node.names[0].text) : undefined;
        if (other?.keyword === "let" && other.file === file.file) named.push(other);
      });
    }
  }
  return named;
}
