import { childrenOf, nodesOf } from "../syntax/expression-nodes.ts";
import { placeAt } from "../syntax/search.ts";
import type { DetailNode, Expression, Item, Node, SlotValue, StatementNode, Tree } from "../syntax/tree.ts";
import { contains, type Span } from "../text/span.ts";

/** An expression with those around it, the innermost last, and where it stands. */
export interface ExpressionPlace {
  readonly statement: StatementNode;
  readonly detail?: DetailNode;
  readonly item?: Item;
  /** Outermost first; the last is the smallest that holds the offset. */
  readonly chain: readonly Expression[];
}

/** The expressions at an offset; undefined where none stands. */
export function expressionAt(tree: Tree, offset: number): ExpressionPlace | undefined {
  const place = placeAt(tree, offset);
  if (place === undefined) return undefined;
  const { innermost: statement, detail } = place;
  const items = detail?.items ?? statement.value ?? [];
  for (const item of items) {
    if (!contains(item.span, offset)) continue;
    const chain = chainOf(rootsOf(item), offset);
    if (chain.length > 0) return { statement, detail, item, chain };
  }
  for (const slot of detail ? [] : Object.values(statement.slots)) {
    const chain = chainOf(slotExpressions(slot), offset);
    if (chain.length > 0) return { statement, chain };
  }
  for (const row of detail?.table ?? []) {
    const chain = chainOf(row.cells, offset);
    if (chain.length > 0) return { statement, detail, chain };
  }
  return undefined;
}

/** The expressions an item holds, in order. */
export function rootsOf(item: Item): readonly Expression[] {
  switch (item.kind) {
    case "text":
      return [];
    case "range":
      return [...(item.name ? [item.name] : []), item.from, item.to];
    case "at":
      return [...rootsOf(item.value), item.at];
    case "value":
      return [
        item.expression,
        ...(item.tolerance ? [item.tolerance.amount] : []),
        ...(item.within ? [item.within.from, item.within.to] : []),
      ];
  }
}

/** Every expression of a statement, of its details, rows and inner statements. */
export function* expressionsOf(statement: StatementNode): Iterable<Expression> {
  for (const slot of Object.values(statement.slots)) {
    for (const root of slotExpressions(slot)) yield* nodesOf(root);
  }
  for (const item of statement.value ?? []) for (const root of rootsOf(item)) yield* nodesOf(root);
  for (const detail of statement.details) {
    for (const item of detail.items) for (const root of rootsOf(item)) yield* nodesOf(root);
    for (const row of detail.table ?? []) yield* row.cells;
  }
  for (const inner of statement.inner) yield* expressionsOf(inner);
}

/** The statement of a name in column 1, and all statements in order, inner ones behind their kit. */
export function* everyStatement(tree: Tree): Iterable<StatementNode> {
  for (const statement of tree.statements) {
    yield statement;
    yield* statement.inner;
  }
}

function slotExpressions(slot: SlotValue): readonly Expression[] {
  if (slot.kind === "tuple" || slot.kind === "path" || slot.kind === "number") return [slot];
  return slot.kind === "call" ? [...slot.positional, ...slot.named.map(({ value }) => value)] : [];
}

function chainOf(roots: readonly Expression[], offset: number): Expression[] {
  const chain: Expression[] = [];
  let level = roots;
  for (let next = holding(level, offset); next !== undefined; next = holding(level, offset)) {
    chain.push(next);
    level = childrenOf(next);
  }
  return chain;
}

/** Of two that touch at the offset, the one that starts there. */
function holding(nodes: readonly Expression[], offset: number): Expression | undefined {
  return nodes.findLast((node: Node) => contains(node.span, offset));
}

/** The text of a span. */
export const slice = (tree: Tree, { start, end }: Span): string => tree.text.slice(start, end);
