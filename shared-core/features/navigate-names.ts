/**
 * Every name of a file with what it stands for. Works on the text alone, so that it also reads files which are only
 * used; a name inside a kit hides an outer one.
 */
import { describeStatements } from "../model/names.ts";
import type {
  DetailNode,
  Expression,
  Item,
  NameNode,
  PathNode,
  SlotValue,
  StatementNode,
  Tree,
} from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { DetailContent, StatementDescription } from "../vocabulary/description.ts";
import { functionOf } from "../vocabulary/functions.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";

export interface Occurrence {
  readonly span: Span;
  readonly text: string;
  /** `mount`, or `foot/rubber` for the name `rubber` of the kit `foot`. */
  readonly key: string;
  readonly role: "definition" | "reference";
  /** Where an unnamed ask is called by its kind: the name is not written. */
  readonly implicit?: boolean;
  readonly statement: StatementNode;
  readonly detail?: DetailNode;
  /** The whole `unit.velocity` of which it is a name. */
  readonly path?: PathNode;
  /** True where a value stands, so that an expression could stand in its place. */
  readonly inExpression?: boolean;
}

/** All names of a tree in order of place. */
export function occurrences(tree: Tree): readonly Occurrence[] {
  let known = CACHE.get(tree);
  if (known === undefined) {
    known = new NameReader(tree).run();
    CACHE.set(tree, known);
  }
  return known;
}

/** The name at an offset, both ends included. */
export function occurrenceAt(tree: Tree, offset: number): Occurrence | undefined {
  const all = occurrences(tree);
  let lo = 0;
  let hi = all.length;
  while (lo < hi) {
    const middle = (lo + hi) >> 1;
    if (all[middle].span.end < offset) lo = middle + 1;
    else hi = middle;
  }
  const [first, second] = [all[lo], all[lo + 1]];
  const holds = (each: Occurrence | undefined) =>
    each !== undefined && each.span.start <= offset && offset <= each.span.end;
  if (holds(second) && offset > (first?.span.end ?? -1)) return second;
  return holds(first) ? first : undefined;
}

/** Number, from 1, of a line that holds a name and cannot be read, so that it is not known what it means there. */
export function unreadableLineWith(tree: Tree, name: string): number | undefined {
  const index = tree.lines.findIndex(
    ({ first, last, readable }) =>
      !readable &&
      tree.tokens.slice(first, last).some(({ kind, offset, length }) => {
        return kind === "name" && length === name.length && tree.text.startsWith(name, offset);
      }),
  );
  return index < 0 ? undefined : index + 1;
}

/** Names that stand for themselves wherever a value stands. */
export const CONSTANTS: ReadonlySet<string> = new Set(["pi", "e", "t", "travel", "rate"]);

/** A tree never changes, so its names may be kept as long as it is. */
const CACHE = new WeakMap<Tree, readonly Occurrence[]>();

/** What the walk knows of where it is. */
interface Place {
  readonly statement: StatementNode;
  readonly detail?: DetailNode;
  readonly kit?: { readonly name: string; readonly locals: ReadonlySet<string> };
}

class NameReader {
  readonly #found: Occurrence[] = [];
  readonly #tree: Tree;
  readonly #kitOfPart = new Map<string, string>();

  constructor(tree: Tree) {
    this.#tree = tree;
    for (const { slots } of tree.statements) {
      if (slots.name?.kind === "name" && slots.kit?.kind === "call") {
        this.#kitOfPart.set(slots.name.text, slots.kit.callee.text);
      }
    }
  }

  run(): readonly Occurrence[] {
    const described = new Map(describeStatements(this.#tree).map((each) => [each.node, each]));
    for (const statement of this.#tree.statements) {
      const known = described.get(statement);
      this.#statement({ statement }, known?.description, known?.name);
    }
    return this.#found.sort((a, b) => a.span.start - b.span.start);
  }

  #statement(place: Place, description: StatementDescription | undefined, name?: string): void {
    const { statement } = place;
    const { slots } = statement;
    const kitName =
      statement.keyword.text === "kit" && slots.name?.kind === "name" ? slots.name.text : undefined;
    const inside = kitName === undefined ? undefined : { name: kitName, locals: localsOf(statement) };
    if (slots.name?.kind === "name") this.#define(slots.name, place);
    else if (name !== undefined && slots.kind?.kind === "name") this.#implicit(slots.kind, name, place);
    for (const [slot, value] of Object.entries(slots)) {
      if (slot === "name" || slot === "kind" || slot === "key") continue;
      if (inside) this.#kitSlot(value, { ...place, kit: inside });
      else this.#slot(value, place);
    }
    if (statement.value) this.#items(statement.value, headContent(statement, description), place);
    for (const detail of statement.details) this.#detail(detail, description, { ...place, detail });
    for (const inner of statement.inner) {
      this.#statement({ statement: inner, kit: inside }, describe(inner.keyword.text));
    }
  }

  #detail(detail: DetailNode, description: StatementDescription | undefined, place: Place): void {
    if (place.statement.keyword.text === "case") {
      this.#add(detail.key, place);
      this.#items(detail.items, { is: "expressions" }, place);
      return;
    }
    const content = description && detailOf(description, detail.key.text)?.content;
    if (content) this.#items(detail.items, content, place);
  }

  #items(items: readonly Item[], content: DetailContent, place: Place): void {
    if (WITHOUT_NAMES.has(content.is)) return;
    const inExpression = content.is !== "names" && content.is !== "quantities" && content.is !== "changes";
    for (const item of items) {
      if (item.kind === "text") continue;
      if (item.kind === "range") {
        if (item.name) this.#path(item.name, place, false);
        this.#expression(item.from, place, true);
        this.#expression(item.to, place, true);
        continue;
      }
      const value = item.kind === "at" ? item.value : item;
      if (item.kind === "at") this.#expression(item.at, place, true);
      this.#expression(value.expression, place, inExpression);
      if (value.tolerance) this.#expression(value.tolerance.amount, place, true);
      if (value.within) {
        this.#expression(value.within.from, place, true);
        this.#expression(value.within.to, place, true);
      }
    }
  }

  #slot(value: SlotValue, place: Place): void {
    if (value.kind === "path") this.#path(value, place, false);
    else if (value.kind === "tuple") this.#expression(value, place, true);
    else if (value.kind === "call") this.#part(value, place);
  }

  /** `KIT(values)`: named values name parameters of the kit. */
  #part(call: Extract<SlotValue, { kind: "call" }>, place: Place): void {
    this.#add(call.callee, place);
    for (const each of call.positional) this.#expression(each, place, true);
    for (const { name, value } of call.named) {
      this.#push(name, `${call.callee.text}/${name.text}`, "reference", place);
      this.#expression(value, place, true);
    }
  }

  /** The two places and the parameters of a kit are defined in its head. */
  #kitSlot(value: SlotValue, place: Place): void {
    const names = value.kind === "name" ? [value] : value.kind === "parameters" ? value.items : [];
    for (const name of names) this.#define(name, place);
  }

  #expression(node: Expression, place: Place, inExpression: boolean): void {
    switch (node.kind) {
      case "path":
        this.#path(node, place, inExpression);
        break;
      case "parenthesis":
        this.#expression(node.inner, place, inExpression);
        break;
      case "unary":
      case "as":
        this.#expression(node.operand, place, inExpression);
        break;
      case "binary":
        this.#expression(node.left, place, inExpression);
        this.#expression(node.right, place, inExpression);
        break;
      case "tuple":
        for (const each of node.items) this.#expression(each, place, inExpression);
        break;
      case "range":
        this.#expression(node.from, place, true);
        this.#expression(node.to, place, true);
        break;
      case "call":
        this.#call(node, place);
        break;
      default:
    }
  }

  #call(node: Extract<Expression, { kind: "call" }>, place: Place): void {
    const parameters = functionOf(node.callee.text)?.parameters ?? [];
    const isNumber = (is: string | undefined) =>
      is === undefined || is === "number" || is === "list" || is === "range";
    for (const [i, argument] of node.positional.entries()) {
      const content = (parameters[i] ?? parameters.at(-1))?.content.is;
      if (content !== "word") this.#expression(argument, place, isNumber(content));
    }
    for (const { name, value } of node.named) {
      const content = parameters.find((each) => each.name === name.text)?.content.is;
      if (content !== "word") this.#expression(value, place, isNumber(content));
    }
  }

  #path(path: PathNode, place: Place, inExpression: boolean): void {
    const [first, second] = path.names;
    if (first === undefined || (path.names.length === 1 && CONSTANTS.has(first.text))) return;
    this.#add(first, place, { path, inExpression: inExpression && path.names.length === 1 });
    const kit = place.kit?.locals.has(first.text) ? undefined : this.#kitOfPart.get(first.text);
    if (kit !== undefined && second !== undefined) {
      this.#push(second, `${kit}/${second.text}`, "reference", place, { path });
    }
  }

  #define(name: NameNode, place: Place): void {
    this.#push(name, keyIn(place, name.text), "definition", place);
  }

  #implicit(kind: NameNode, name: string, place: Place): void {
    const { span } = kind;
    this.#found.push({ span, text: name, key: name, role: "definition", implicit: true, ...only(place) });
  }

  #add(name: NameNode, place: Place, more: Partial<Occurrence> = {}): void {
    this.#push(name, keyIn(place, name.text), "reference", place, more);
  }

  #push(
    { span, text }: NameNode,
    key: string,
    role: Occurrence["role"],
    place: Place,
    more: Partial<Occurrence> = {},
  ): void {
    this.#found.push({ span, text, key, role, ...only(place), ...more });
  }
}

const only = ({ statement, detail }: Place) => (detail ? { statement, detail } : { statement });

const keyIn = ({ kit }: Place, name: string): string =>
  kit?.locals.has(name) ? `${kit.name}/${name}` : name;

function localsOf(kit: StatementNode): ReadonlySet<string> {
  const { a, b, parameters } = kit.slots;
  const names = [a, b, ...kit.inner.map(({ slots }) => slots.name)];
  const locals = new Set(names.flatMap((each) => (each?.kind === "name" ? [each.text] : [])));
  if (parameters?.kind === "parameters") for (const { text } of parameters.items) locals.add(text);
  return locals;
}

/** Details whose words are no names of the file. */
const WITHOUT_NAMES: ReadonlySet<string> = new Set(["word", "words", "unit", "tolerance", "text", "table"]);

/** What stands behind `=` in a head. */
function headContent(statement: StatementNode, description: StatementDescription | undefined): DetailContent {
  if (statement.keyword.text === "group") return { is: "names", families: ["joins"] };
  const principal = description?.principal && detailOf(description, description.principal)?.content;
  return principal || { is: "expressions" };
}
