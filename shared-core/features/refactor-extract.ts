import { childrenOf } from "../syntax/expression-nodes.ts";
import type { DetailNode, Expression, Item, NumberNode, StatementNode, Tree } from "../syntax/tree.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { isFault } from "../units/fault.ts";
import { knownKind } from "../units/known-kinds.ts";
import { isNumber } from "../units/quantity.ts";
import { unitOf } from "../units/unit-of.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";
import { type ExpressionPlace, expressionAt, slice } from "./navigate-nodes.ts";
import { type CodeAction, freeName, linesBefore, linesBehind, nameOf, refused } from "./refactor-edits.ts";
import type { View } from "./view.ts";

/** Gives the literal under the cursor a name with `let`; its tolerance stays where it is written. */
export function extractActions({ model }: View, range: Span): readonly CodeAction[] {
  const { tree } = model;
  const place = expressionAt(tree, range.start);
  const literal = place?.chain.at(-1);
  if (!place || literal?.kind !== "number") return [];
  const text = slice(tree, literal.span);
  const title = `Name ${text} with \`let\``;
  const reason = whyNot(place, literal);
  if (reason === "whole") return [];
  if (reason) return [refused(title, "refactor.extract", reason)];
  const name = freeName(model, nameFor(place, literal));
  const edits = [...definition(model.tree, name, text), { span: literal.span, text: name }];
  return [{ title: `Name ${text} with \`let ${name}\``, kind: "refactor.extract", edits, safe: true }];
}

/** Why a literal cannot be named; `whole` where it is a `let` already. */
function whyNot(
  { chain, statement, detail, item }: ExpressionPlace,
  literal: NumberNode,
): string | undefined {
  if (detail?.table?.some(({ cells }) => cells.includes(literal))) return "rows hold numbers, never names";
  const outer = chain[chain.length - 2];
  if (outer?.kind === "tuple" && outer.unit && !literal.unit)
    return "its unit stands behind the parenthesis, for all of them";
  if (outer?.kind === "binary" && outer.operator === "^" && outer.right === literal) {
    return "the unit of the result depends on an exponent, so it is a plain number";
  }
  if (isShareOf(item, literal))
    return "a tolerance in % is a share of its value; by a name it could be read as a number beside it";
  if (detail && !takesNumbers(statement, detail)) return `\`${detail.key.text}\` takes no name`;
  const whole = item?.kind === "value" && item.expression === literal;
  if (whole && statement.keyword.text === "let" && !detail) return "whole";
  if (literal.value === 0 && !literal.unit) return "the number 0 fits any dimension, a name would fit one";
  if (!literal.unit && standsBesidePi(chain))
    return "it makes the angular rate of 2 * pi * rate, which a name would not";
  return undefined;
}

function isShareOf(item: Item | undefined, literal: NumberNode): boolean {
  const value = item?.kind === "at" ? item.value : item;
  const isShare = literal.unit?.text === "%" || literal.unit?.text === "ppm";
  return value?.kind === "value" && value.tolerance?.amount === literal && isShare;
}

/** Whether a detail holds expressions, rather than words or numbers that must stand as such. */
function takesNumbers({ keyword, slots }: StatementNode, { key }: DetailNode): boolean {
  if (keyword.text === "case") return true;
  const description = describe(keyword.text, slots.kind?.kind === "name" ? slots.kind.text : undefined);
  const is = description && detailOf(description, key.text)?.content.is;
  return is !== undefined && NUMERIC.has(is);
}

const NUMERIC: ReadonlySet<string> = new Set([
  "quantity",
  "at",
  "law",
  "tuple",
  "range",
  "expressions",
  "changes",
]);

/** A product holding a literal 2, pi and a rate is the angular rate. */
function standsBesidePi(chain: readonly Expression[]): boolean {
  const product = chain.find(
    (node) => node.kind === "binary" && (node.operator === "*" || node.operator === "/"),
  );
  const holdsPi = (node: Expression): boolean =>
    (node.kind === "path" && node.names[0]?.text === "pi") || childrenOf(node).some(holdsPi);
  return product !== undefined && holdsPi(product);
}

/** `mounts_stiffness` for the number of an element, else what kind of number it is. */
function nameFor({ statement, detail, chain, item }: ExpressionPlace, literal: NumberNode): string {
  const owner = nameOf(statement);
  const isWhole = chain.length === 1 && item?.kind === "value" && item.expression === literal;
  const key = detail?.key.text ?? HEAD_KEYS.get(statement.keyword.text);
  if (isWhole && owner !== "" && key !== undefined && statement.keyword.text !== "case")
    return `${owner}_${key}`;
  const meaning = literal.unit && unitOf(literal.unit);
  if (!meaning || isFault(meaning)) return "number";
  if (isNumber(meaning.kind)) return /rad|deg|rev/.test(meaning.text) ? "angle" : "share";
  const words = knownKind(meaning.kind)?.words ?? "quantity";
  return words
    .replace(/^an? /, "")
    .replace(/ or .*/, "")
    .replaceAll(" ", "_");
}

const HEAD_KEYS: ReadonlyMap<string, string> = new Map([
  ["mass", "mass"],
  ["inertia", "inertia"],
  ["body", "mass"],
  ["pendulum", "mass"],
  ["spring", "stiffness"],
  ["damper", "damping"],
  ["inerter", "inertance"],
  ["stop", "stiffness"],
  ["cord", "stiffness"],
  ["friction", "force"],
]);

/** Behind the last `let`, else in front of the first statement that uses numbers. */
function definition(tree: Tree, name: string, text: string): TextEdit[] {
  const line = `let ${name} = ${text}`;
  const last = tree.statements.findLast(({ keyword }) => keyword.text === "let");
  if (last) return [linesBehind(tree, last, [line])];
  const first = tree.statements.find(({ keyword }) => keyword.text !== "title" && keyword.text !== "use");
  return first ? [linesBefore(tree, first, [line, ""])] : [{ span: span(0, 0), text: `${line}\n` }];
}
