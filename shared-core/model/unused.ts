import { childrenOf } from "../syntax/expression-nodes.ts";
import type { Expression } from "../syntax/tree.ts";
import type { Draft } from "./draft.ts";
import { nameSpan } from "./names.ts";

/** A let that nothing uses, in a file that has a system: a file of numbers for others is used elsewhere. */
export function sayUnusedNumbers(draft: Draft): void {
  const hasSystem = draft.statements.some(({ description }) => description.family === "moves");
  if (!hasSystem) return;
  const mentioned = mentionedNames(draft);
  for (const entity of draft.main.names.values()) {
    if (entity.keyword !== "let" || entity.file !== undefined || draft.lets.used.has(entity)) continue;
    if (draft.lets.plannedOf(entity) === undefined) continue;
    if (mentioned.has(entity.name)) continue;
    draft.findings.say("unused-number", nameSpan(entity.node), `nothing uses \`${entity.name}\``, {
      hint: "take it out, or use it where the number stands now",
      tag: "unnecessary",
    });
  }
}

/** Names in details that hold names (`change = mount`), which no expression reads. */
function mentionedNames(draft: Draft): ReadonlySet<string> {
  const names = new Set<string>();
  for (const { node } of draft.statements) {
    for (const { items } of node.details) {
      for (const item of items) {
        if (item.kind === "range" && item.name?.names[0] !== undefined) names.add(item.name.names[0].text);
        if (item.kind === "value") collect(item.expression, names);
      }
    }
  }
  return names;
}

function collect(node: Expression, names: Set<string>): void {
  if (node.kind === "path" && node.names[0] !== undefined) names.add(node.names[0].text);
  for (const child of childrenOf(node)) collect(child, names);
}
