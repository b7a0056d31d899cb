import type { Fix, RelatedPlace } from "../diagnostics/diagnostic.ts";
import type { Model } from "../model/model.ts";
import type { DetailNode, Expression, Item, NumberNode, StatementNode } from "../syntax/tree.ts";
import { type Span, span } from "../text/span.ts";

/**
 * The statement that stands for a name in this file. What a part or a used file brings in is stood for by the
 * statement of this file that placed it.
 */
export function statementOf(model: Model, name: string): StatementNode | undefined {
  for (let end = name.length; end > 0; end = name.lastIndexOf(".", end - 1)) {
    const entity = model.entities.get(name.slice(0, end));
    if (entity !== undefined && entity.file === undefined) {
      const { node } = entity;
      if (model.tree.statements.includes(node)) return node;
    }
  }
  return undefined;
}

/** The defining name of a statement, or its keyword where it has none. */
export function nameSpan(statement: StatementNode): Span {
  const slot = statement.slots.name;
  return slot === undefined ? statement.keyword.span : slot.span;
}

export function detailOf(statement: StatementNode, key: string): DetailNode | undefined {
  return statement.details.find((detail) => detail.key.text === key);
}

/** What stands behind `key =`, or behind `=` in the head when `key` is the principal property. */
export function itemOf(model: Model, statement: StatementNode, key: string): Item | undefined {
  const detail = detailOf(statement, key);
  if (detail !== undefined) return detail.items[0];
  const name = statement.slots.name;
  const described =
    name?.kind === "name" ? model.entities.get(name.text)?.description.principal === key : false;
  return described ? statement.value?.[0] : undefined;
}

/** Span of a property's value, or of the name where the property is not written. */
export function valueSpan(model: Model, statement: StatementNode, ...keys: readonly string[]): Span {
  for (const key of keys) {
    const item = itemOf(model, statement, key);
    if (item !== undefined) return item.span;
  }
  return nameSpan(statement);
}

/** Span of a named thing's property in this file; the file's first character when it has no place here. */
export function placeOf(model: Model, name: string, ...keys: readonly string[]): Span {
  const statement = statementOf(model, name);
  return statement === undefined ? span(0, 0) : valueSpan(model, statement, ...keys);
}

/** A related place at a named thing, when this file has it. */
export function relatedTo(
  model: Model,
  name: string | undefined,
  message: string,
): readonly RelatedPlace[] | undefined {
  const statement = name === undefined ? undefined : statementOf(model, name);
  return statement === undefined ? undefined : [{ span: nameSpan(statement), message }];
}

/** The literal that a property comes from: its own, or that of the `let` it names. */
export function literalOf(
  model: Model,
  statement: StatementNode,
  key: string,
): { readonly literal: NumberNode; readonly statement: StatementNode } | undefined {
  const item = itemOf(model, statement, key);
  return item?.kind === "value" ? followLiteral(model, item.expression, statement, 0) : undefined;
}

/** No chain of names that matters is longer; a circle ends here. */
const LONGEST_CHAIN = 20;

function followLiteral(
  model: Model,
  expression: Expression,
  statement: StatementNode,
  depth: number,
): { readonly literal: NumberNode; readonly statement: StatementNode } | undefined {
  if (expression.kind === "number") return { literal: expression, statement };
  if (expression.kind !== "path" || expression.names.length !== 1 || depth > LONGEST_CHAIN) return undefined;
  const owner = statementOf(model, expression.names[0].text);
  const item = owner?.value?.[0];
  return owner !== undefined && item?.kind === "value"
    ? followLiteral(model, item.expression, owner, depth + 1)
    : undefined;
}

/** Sets a detail: replaces its value, or adds a line `key = value` under the statement. */
export function setDetail(
  model: Model,
  statement: StatementNode,
  key: string,
  value: string,
  options: { readonly title: string; readonly safe: boolean },
): Fix {
  const item = detailOf(statement, key)?.items[0];
  if (item !== undefined) return { ...options, edits: [{ span: item.span, text: value }] };
  const { text } = model.tree;
  const lastDetail = statement.details.at(-1);
  const end = endOfLine(text, (lastDetail ?? statement).span.end);
  const newline = text.includes("\r\n") ? "\r\n" : "\n";
  return { ...options, edits: [{ span: span(end, end), text: `${newline}    ${key} = ${value}` }] };
}

function endOfLine(text: string, offset: number): number {
  const end = text.indexOf("\n", offset);
  if (end < 0) return text.length;
  return text[end - 1] === "\r" ? end - 1 : end;
}

/** The innermost statement of this file whose text holds the span. */
export function statementAt(model: Model, place: Span): StatementNode | undefined {
  let found: StatementNode | undefined;
  const look = (statements: readonly StatementNode[]): void => {
    for (const statement of statements) {
      const first = Math.min(statement.span.start, statement.notes[0]?.span.start ?? statement.span.start);
      if (first <= place.start && place.end <= statement.span.end) {
        found = statement;
        look(statement.inner);
      }
    }
  };
  look(model.tree.statements);
  return found;
}
