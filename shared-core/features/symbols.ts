import type { Model } from "../model/model.ts";
import { pathText } from "../model/places.ts";
import type { NameNode, SlotValue, StatementNode, Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Family } from "../vocabulary/description.ts";
import { describe } from "../vocabulary/registry.ts";
import type { View } from "./view.ts";

/** A statement as an outline shows it. */
export interface DocumentSymbol {
  readonly name: string;
  readonly keyword: string;
  readonly family: Family;
  /** `between unit and slab, 26.5 N/mm`. */
  readonly detail: string;
  /** With its notes. */
  readonly span: Span;
  /** The name, inside the span. */
  readonly nameSpan: Span;
  /** Statements inside a kit. */
  readonly children: readonly DocumentSymbol[];
}

export interface WorkspaceSymbol {
  readonly name: string;
  readonly keyword: string;
  readonly family: Family;
  readonly file: string;
  readonly span: Span;
  /** Title of its model, or its file where it has none. */
  readonly container: string;
}

/** The named statements of a text in order, those of a kit below it. */
export function documentSymbols({ model }: View): readonly DocumentSymbol[] {
  return symbolsOf(model.tree, model.tree.statements);
}

/** Names of several models that hold the letters of the query in order, the best match first, at most 200. */
export function workspaceSymbols(models: readonly Model[], query: string): readonly WorkspaceSymbol[] {
  return searchSymbols(models.flatMap(symbolIndex), query);
}

/** Every name of a model, for searches: far smaller than the model, so that it may be kept. */
export function symbolIndex(model: Model): readonly WorkspaceSymbol[] {
  const container = model.title ?? model.file;
  return documentSymbols({ model } as View).flatMap(({ name, keyword, family, nameSpan, children }) =>
    [
      { name, keyword, family, nameSpan },
      ...children.map((each) => ({ ...each, name: `${name}.${each.name}` })),
    ]
      .filter((each) => each.keyword !== "title" && each.keyword !== "use")
      .map((each) => ({
        name: each.name,
        keyword: each.keyword,
        family: each.family,
        file: model.file,
        span: each.nameSpan,
        container,
      })),
  );
}

/** Of an index, the names that hold the letters of the query in order, the best match first, at most 200. */
export function searchSymbols(index: readonly WorkspaceSymbol[], query: string): readonly WorkspaceSymbol[] {
  const found: { readonly symbol: WorkspaceSymbol; readonly score: number }[] = [];
  for (const symbol of index) {
    const score = matchScore(symbol.name, query);
    if (score !== undefined) found.push({ symbol, score });
  }
  found.sort(
    (a, b) =>
      a.score - b.score || compare(a.symbol.name, b.symbol.name) || compare(a.symbol.file, b.symbol.file),
  );
  return found.slice(0, MOST_SYMBOLS).map(({ symbol }) => symbol);
}

/** More would not be read. */
const MOST_SYMBOLS = 200;

const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

/** How far a name is from a query whose letters it holds in order; undefined where it does not. */
function matchScore(name: string, query: string): number | undefined {
  const [text, wanted] = [name.toLowerCase(), query.toLowerCase().replaceAll(/\s/g, "")];
  if (text === wanted) return 0;
  if (text.startsWith(wanted)) return 1;
  const at = text.indexOf(wanted);
  if (at > 0) return text[at - 1] === "_" || text[at - 1] === "." ? 2 : 3;
  let gaps = 4;
  let from = 0;
  for (const letter of wanted) {
    const next = text.indexOf(letter, from);
    if (next < 0) return undefined;
    gaps += next - from;
    from = next + 1;
  }
  return gaps;
}

function symbolsOf(tree: Tree, statements: readonly StatementNode[]): readonly DocumentSymbol[] {
  return statements.flatMap((statement) => symbolOf(tree, statement) ?? []);
}

function symbolOf(tree: Tree, statement: StatementNode): DocumentSymbol | undefined {
  const { keyword, slots, span } = statement;
  const kind = slots.kind?.kind === "name" ? slots.kind : undefined;
  const description = describe(keyword.text, kind?.text);
  if (description === undefined) return undefined;
  const named = nameOf(statement);
  const { name, nameSpan } = named ?? { name: keyword.text, nameSpan: keyword.span };
  return {
    name: name === "" ? keyword.text : name,
    keyword: keyword.text,
    family: description.family,
    detail: detailText(tree, statement, kind),
    span,
    nameSpan,
    children: symbolsOf(tree, statement.inner),
  };
}

function nameOf({ slots, keyword }: StatementNode): { name: string; nameSpan: Span } | undefined {
  for (const slot of ["name", "kind", "key", "text", "path", "coordinate"]) {
    const value = slots[slot];
    if (value?.kind === "name") return { name: value.text, nameSpan: value.span };
    if (value?.kind === "text") return { name: value.text, nameSpan: value.span };
    if (value?.kind === "path") return { name: `${keyword.text} ${pathText(value)}`, nameSpan: value.span };
  }
  return undefined;
}

/** The rest of the head in a few words. */
function detailText(
  tree: Tree,
  { slots, value, keyword }: StatementNode,
  kind: NameNode | undefined,
): string {
  const parts: string[] = [];
  if (kind && slots.name) parts.push(kind.text);
  if (isPlace(slots.a) && isPlace(slots.b))
    parts.push(`between ${placeText(slots.a)} and ${placeText(slots.b)}`);
  for (const word of ["on", "of", "in", "from", "to"]) {
    const slot = slots[word];
    if (isPlace(slot)) parts.push(`${word} ${placeText(slot)}`);
  }
  if (value && value.length > 0 && keyword.text !== "title") {
    parts.push(tree.text.slice(value[0].span.start, value[value.length - 1].span.end));
  }
  return parts.join(", ");
}

type Place = Extract<SlotValue, { kind: "path" | "name" }>;

const isPlace = (slot: SlotValue | undefined): slot is Place =>
  slot?.kind === "path" || slot?.kind === "name";

const placeText = (slot: Place): string => (slot.kind === "path" ? pathText(slot) : slot.text);
