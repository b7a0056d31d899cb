import { placeAt, tokenIndexAt } from "../syntax/search.ts";
import type { Item, Node, Tree } from "../syntax/tree.ts";
import { contains, cover, type Span, span } from "../text/span.ts";
import { expressionAt } from "./navigate-nodes.ts";
import type { View } from "./view.ts";

/**
 * What a selection grows through at each offset, smallest first: word, literal or name, each expression around it,
 * the value, the detail, the statement without and with its notes, its paragraph, the file.
 */
export function selectionRanges(view: View, offsets: readonly number[]): readonly (readonly Span[])[] {
  return offsets.map((offset) => growing(view.model.tree, offset));
}

function growing(tree: Tree, offset: number): readonly Span[] {
  const whole = span(0, tree.text.length);
  const spans = [
    ...wordAt(tree, offset),
    ...expressionSpans(tree, offset),
    ...statementSpans(tree, offset),
    whole,
  ];
  const grown: Span[] = [];
  for (const each of spans) {
    const last = grown.at(-1);
    const holds = contains(each, offset) && (!last || (each.start <= last.start && last.end <= each.end));
    const grows = !last || each.start < last.start || last.end < each.end;
    if (holds && grows) grown.push(each);
  }
  return grown;
}

/** The word that touches the offset, rather than the blank before or behind it. */
function wordAt(tree: Tree, offset: number): Span[] {
  const index = tokenIndexAt(tree, offset);
  const [here, before] = [tree.tokens[index], tree.tokens[index - 1]];
  const isWord = (kind: string | undefined) => kind !== undefined && kind !== "blank" && kind !== "newline";
  const touches = before !== undefined && here?.offset === offset && isWord(before.kind);
  const token = isWord(here?.kind) ? here : touches ? before : undefined;
  return token ? [span(token.offset, token.offset + token.length)] : [];
}

function expressionSpans(tree: Tree, offset: number): Span[] {
  const place = expressionAt(tree, offset);
  if (place === undefined) return [];
  const last = place.chain.at(-1);
  const names =
    last?.kind === "path" ? last.names.filter((name) => contains(name.span, offset)).map(spanOf) : [];
  const unit =
    last && "unit" in last && last.unit && contains(last.unit.span, offset) ? [last.unit.span] : [];
  return [
    ...names,
    ...unit,
    ...place.chain.map(spanOf).reverse(),
    ...(place.item ? itemSpans(place.item) : []),
  ];
}

function itemSpans(item: Item): Span[] {
  return item.kind === "at" ? [item.value.span, item.span] : [item.span];
}

function statementSpans(tree: Tree, offset: number): Span[] {
  const place = placeAt(tree, offset);
  if (place === undefined) return paragraph(tree, offset);
  const { statement, innermost, detail } = place;
  const inner = detail
    ? [listSpan(detail.items), span(detail.key.span.start, detail.span.end), detail.span]
    : [listSpan(innermost.value ?? []), innermost.headSpan];
  const bare = (each: typeof statement) => span(each.headSpan.start, each.span.end);
  return [
    ...inner.filter((each) => each !== undefined),
    bare(innermost),
    innermost.span,
    bare(statement),
    statement.span,
    ...paragraph(tree, offset),
  ];
}

const listSpan = (items: readonly Item[]): Span | undefined =>
  items.length > 1 ? cover(items[0].span, items[items.length - 1].span) : items[0]?.span;

/** Lines without a blank one between them. */
function paragraph({ lines }: Tree, offset: number): Span[] {
  const at = lines.findLastIndex((line) => line.span.start <= offset);
  if (at < 0 || lines[at].role === "blank") return [];
  let [first, last] = [at, at];
  while (first > 0 && lines[first - 1].role !== "blank") first--;
  while (last < lines.length - 1 && lines[last + 1].role !== "blank") last++;
  return [span(lines[first].span.start, lines[last].span.end)];
}

const spanOf = ({ span: of }: Node): Span => of;
