import type { Draft } from "./draft.ts";
import { nameSpan } from "./names.ts";

/** A let that nothing uses, in a file that has a system: a file of numbers for others is used elsewhere. */
export function sayUnusedNumbers(draft: Draft): void {
  const hasSystem = draft.statements.some(({ description }) => description.family === "moves");
  if (!hasSystem) return;
  for (const entity of draft.main.names.values()) {
    if (entity.keyword !== "let" || entity.file !== undefined || draft.lets.used.has(entity)) continue;
    if (draft.lets.plannedOf(entity) === undefined) continue;
    if (mentioned(entity.name, draft)) continue;
    draft.findings.say("unused-number", nameSpan(entity.node), `nothing uses \`${entity.name}\``, {
      hint: "take it out, or use it where the number stands now",
      tag: "unnecessary",
    });
  }
}

/** Named in a detail that holds names (`change = mount`), which no expression reads. */
function mentioned(name: string, draft: Draft): boolean {
  return draft.statements.some(({ node }) =>
    node.details.some((detail) =>
      detail.items.some((item) => {
        if (item.kind === "range") return item.name?.names[0]?.text === name;
        return item.kind === "value" && holds(item.expression, name);
      }),
    ),
  );
}

type Node = import("../syntax/tree.ts").Expression;

function holds(node: Node, name: string): boolean {
  switch (node.kind) {
    case "path":
      return node.names[0]?.text === name;
    case "parenthesis":
      return holds(node.inner, name);
    case "unary":
    case "as":
      return holds(node.operand, name);
    case "binary":
      return holds(node.left, name) || holds(node.right, name);
    case "call":
      return [...node.positional, ...node.named.map(({ value }) => value)].some((each) => holds(each, name));
    case "tuple":
      return node.items.some((each) => holds(each, name));
    default:
      return false;
  }
}
