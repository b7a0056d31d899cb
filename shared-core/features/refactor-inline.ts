import type { Entity, Model } from "../model/model.ts";
import { lineIndexAt } from "../syntax/search.ts";
import type { Expression, StatementNode, Tree, ValueNode } from "../syntax/tree.ts";
import { lineEnding } from "../text/line-index.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { placesOf, type SymbolPlace, symbolAt } from "./navigate.ts";
import { unreadableLineWith } from "./navigate-names.ts";
import { expressionAt, slice } from "./navigate-nodes.ts";
import { type CodeAction, nameOf, refused, withoutLines } from "./refactor-edits.ts";
import type { View } from "./view.ts";

/**
 * Puts the number of a `let` where its name stands and takes the `let` out. Its notes go along. Refused where the
 * numbers would no longer be drawn together, or where something speaks of the name.
 */
export function inlineActions(view: View, range: Span): readonly CodeAction[] {
  const { model } = view;
  const symbol = symbolAt(model, range.start);
  const entity = symbol && model.entities.get(symbol.key);
  const [value] = entity?.node.value ?? [];
  if (!symbol || entity?.keyword !== "let" || value?.kind !== "value") return [];
  const title = `Put the value of \`${entity.name}\` in its place`;
  if (entity.file !== undefined) {
    return [refused(title, "refactor.inline", `\`${entity.name}\` is defined in \`${entity.file}\``)];
  }
  const places = placesOf(view, symbol).filter(({ occurrence }) => occurrence.role === "reference");
  const reason = whyNot(model, entity, value, places);
  if (reason) return [refused(title, "refactor.inline", reason)];
  const edits = [...replacements(model.tree, value, places), ...notesMoved(model.tree, entity.node, places)];
  return [
    {
      title,
      kind: "refactor.inline",
      edits: [...edits, withoutLines(model.tree, entity.node.span)],
      safe: true,
    },
  ];
}

function whyNot(
  model: Model,
  { name }: Entity,
  value: ValueNode,
  places: readonly SymbolPlace[],
): string | undefined {
  const lost = unreadableLineWith(model.tree, name);
  if (lost) return `line ${lost} cannot be read, and it holds \`${name}\``;
  if (places.length === 0) return `nothing uses \`${name}\``;
  const elsewhere = places.find(({ file }) => file !== model.file);
  if (elsewhere) return `\`${elsewhere.file}\` uses \`${name}\` too`;
  const spoken = places.find(({ occurrence }) => !occurrence.inExpression || occurrence.statement.broken);
  if (spoken) return `${whereOf(spoken)} speaks of \`${name}\` by its name`;
  const banded = places.find((place) => isInTolerance(model.tree, place));
  if (banded)
    return `a tolerance of ${whereOf(banded)} is written with it, where a share and a number are told apart`;
  if (!value.tolerance && !value.within) return undefined;
  const what = value.tolerance ? "tolerance" : "range";
  if (places.length > 1) {
    return value.tolerance
      ? `its tolerance is one draw for ${places.length} places; written at each of them they would be drawn apart`
      : `its range moves ${places.length} places together`;
  }
  const whole = wholeValue(model.tree, places[0]);
  if (!whole) return `its ${what} cannot stand inside the expression of ${whereOf(places[0])}`;
  if (whole.tolerance || whole.within) return `${whereOf(places[0])} has a tolerance or range of its own`;
  return sharedByCount(places[0], value);
}

function isInTolerance(tree: Tree, { span: at }: SymbolPlace): boolean {
  const item = expressionAt(tree, at.start)?.item;
  const value = item?.kind === "at" ? item.value : item;
  const tolerance = value?.kind === "value" ? value.tolerance : undefined;
  return tolerance !== undefined && tolerance.span.start <= at.start && at.end <= tolerance.span.end;
}

/** With a count each element is drawn for itself, while a `let` is one draw. */
function sharedByCount(
  { occurrence: { statement, detail } }: SymbolPlace,
  value: ValueNode,
): string | undefined {
  const counted = statement.details.some(({ key }) => key.text === "count");
  if (!value.tolerance || !counted || detail?.key.text === "count") return undefined;
  return `its tolerance is one draw for all of \`${nameOf(statement)}\`; written there, each of its count would be drawn apart`;
}

function whereOf({ occurrence: { statement, detail } }: SymbolPlace): string {
  const name = nameOf(statement);
  const head = `\`${statement.keyword.text}${name === "" ? "" : ` ${name}`}\``;
  return detail && statement.keyword.text !== "case" ? `\`${detail.key.text}\` of ${head}` : head;
}

/** The value that consists of the name alone. */
function wholeValue(tree: Tree, { span: at }: SymbolPlace): ValueNode | undefined {
  const place = expressionAt(tree, at.start);
  const item = place?.item;
  if (item?.kind !== "value" || item.expression.kind !== "path") return undefined;
  return item.expression.span.start === at.start && item.expression.span.end === at.end ? item : undefined;
}

function replacements(tree: Tree, value: ValueNode, places: readonly SymbolPlace[]): TextEdit[] {
  return places.map((place) => {
    const whole = wholeValue(tree, place);
    const text = whole ? slice(tree, value.span) : grouped(tree, value.expression, place);
    return { span: place.span, text };
  });
}

/** The expression, in parentheses where it would be read otherwise without. */
function grouped(tree: Tree, expression: Expression, place: SymbolPlace): string {
  const text = slice(tree, expression.span);
  const chain = expressionAt(tree, place.span.start)?.chain ?? [];
  const outer = chain[chain.length - 2];
  const alone =
    outer === undefined || outer.kind === "parenthesis" || outer.kind === "call" || outer.kind === "tuple";
  if (alone || expression.kind === "path" || expression.kind === "call" || expression.kind === "parenthesis")
    return text;
  const isBare = expression.kind === "number" && !expression.unit;
  const isSum = outer.kind === "binary" && (outer.operator === "+" || outer.operator === "-");
  return isBare || (isSum && expression.kind === "number") ? text : `(${text})`;
}

/** The notes of the `let` above each line that takes its number over. */
function notesMoved(tree: Tree, node: StatementNode, places: readonly SymbolPlace[]): TextEdit[] {
  if (node.notes.length === 0) return [];
  const starts = new Set(
    places.map(({ span: at, occurrence }) => {
      const line = tree.lines[lineIndexAt(tree, at.start)];
      // A row has no notes of its own: they stand above its detail.
      const owner = line.role === "row" && occurrence.detail ? occurrence.detail.key.span.start : at.start;
      return tree.lines[lineIndexAt(tree, owner)].span.start;
    }),
  );
  const ending = lineEnding(tree.text);
  return [...starts].map((start) => {
    const blanks = /^[ \t]*/.exec(tree.text.slice(start))?.[0] ?? "";
    const lines = node.notes.map((note) => `${blanks}${slice(tree, note.span)}${ending}`);
    return { span: span(start, start), text: lines.join("") };
  });
}
