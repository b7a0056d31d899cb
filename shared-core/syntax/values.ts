import type { Span } from "../text/span.ts";
import type { Cursor } from "./cursor.ts";
import { LEVEL, literal, name, wholeExpression } from "./expressions.ts";
import {
  type Expression,
  type Item,
  type NumberNode,
  type PathNode,
  ROLE,
  type TableRow,
  type TextNode,
  type ToleranceNode,
  type ValueNode,
} from "./tree.ts";
import { unitBehind, unknownUnit } from "./unit-reader.ts";
import { DISTRIBUTIONS, VALUE_WORDS } from "./words.ts";

/** One or more items, separated by commas, to the end of the line. */
export function items(c: Cursor): Item[] {
  const found = [item(c)];
  while (c.word === ",") {
    const comma = c.span;
    c.take();
    if (c.atEnd) danglingComma(c, comma);
    else found.push(item(c));
  }
  c.expectEnd("an operator, `,` or the end of the line");
  return found;
}

/** `X`, `X at Y`, `A to B`, `from A to B`, `NAME from A to B`, or a text. */
export function item(c: Cursor): Item {
  const start = c.offset;
  if (c.kind === "string") return text(c);
  if (c.accept("from", ROLE.word)) return range(c, start, undefined);
  const first = value(c);
  if (c.word === "from" && first.expression.kind === "path" && !first.tolerance && !first.within) {
    c.take(ROLE.word);
    return range(c, start, first.expression);
  }
  if (c.accept("to", ROLE.word)) {
    const to = wholeExpression(c, LEVEL.as);
    return { kind: "range", span: c.from(start), from: first.expression, to };
  }
  if (c.accept("at", ROLE.word)) {
    const at = wholeExpression(c, LEVEL.as);
    return { kind: "at", span: c.from(start), value: first, at };
  }
  return first;
}

/** EXPR ["+/-" AMOUNT [DISTRIBUTION]] ["within" A "to" B]. */
export function value(c: Cursor): ValueNode {
  const start = c.offset;
  const expression = wholeExpression(c);
  const tolerance = c.word === "+/-" || c.word === "±" ? toleranceOf(c) : undefined;
  const within = c.word === "within" ? withinOf(c) : undefined;
  return { kind: "value", span: c.from(start), expression, tolerance, within };
}

/** A text in quotes; two quotes in a row stand for one. */
export function text(c: Cursor): TextNode {
  const span = c.span;
  const inner = c.word.slice(1, -1);
  if (!isClosed(c.word)) {
    const edits = [{ span: { start: span.end, end: span.end }, text: '"' }];
    c.failAt(span, "the text has no closing quote", { fixes: [{ title: 'Add `"`', edits, safe: true }] });
    return { kind: "text", span, text: c.word.slice(1) };
  }
  c.take();
  return { kind: "text", span, text: inner.replaceAll('""', '"') };
}

/** Signed literals with optional units, separated by blanks or commas; never expressions. */
export function tableRow(c: Cursor): TableRow {
  const start = c.offset;
  const cells: NumberNode[] = [];
  while (!c.atEnd) {
    cells.push(cell(c));
    if (c.accept(",") && c.atEnd) c.expected("another number behind the comma");
  }
  return { span: c.from(start), cells };
}

function danglingComma(c: Cursor, comma: Span): void {
  const fixes = [{ title: "Remove the comma", edits: [{ span: comma, text: "" }], safe: true }];
  c.expected("another item behind the comma", { fixes });
}

/** A closed text ends with an odd number of quotes behind its first: pairs stand for quotes inside. */
function isClosed(word: string): boolean {
  let quotes = 0;
  for (let i = word.length - 1; i > 0 && word[i] === '"'; i--) quotes++;
  return quotes % 2 === 1;
}

function cell(c: Cursor): NumberNode {
  const start = c.offset;
  const negative = c.word === "-";
  if (negative || c.word === "+") c.take(ROLE.prefix);
  if (c.kind !== "number") {
    const what = cellExpected(c);
    c.expected(what, { hint: "a row holds numbers with units, never names or formulas" });
    return { kind: "number", span: c.from(start), value: 0 };
  }
  const size = literal(c);
  const unit = unitBehind(c);
  if (!unit && c.is("name") && !VALUE_WORDS.has(c.word)) unknownUnit(c);
  return { kind: "number", span: c.from(start), value: negative ? -size : size, unit };
}

const cellExpected = (c: Cursor): string =>
  c.kind === "operator" ? "the next number of the row" : "a number";

function range(c: Cursor, start: number, named: PathNode | undefined): Item {
  const { from, to } = bounds(c);
  return { kind: "range", span: c.from(start), name: named, from, to };
}

function withinOf(c: Cursor): NonNullable<ValueNode["within"]> {
  const start = c.offset;
  c.take(ROLE.word);
  const { from, to } = bounds(c);
  return { from, to, span: c.from(start) };
}

/** A "to" B. */
function bounds(c: Cursor): { from: Expression; to: Expression } {
  const from = wholeExpression(c, LEVEL.as);
  if (!c.accept("to", ROLE.word)) c.expected("`to` and the other end of the range");
  const to = wholeExpression(c, LEVEL.as);
  return { from, to };
}

function toleranceOf(c: Cursor): ToleranceNode {
  const start = c.offset;
  c.take(ROLE.infix);
  const amount = wholeExpression(c, LEVEL.as);
  const named = c.kind === "name" && DISTRIBUTIONS.has(c.word);
  const distribution = named ? name(c, ROLE.word) : undefined;
  return { kind: "tolerance", span: c.from(start), amount, distribution };
}
