import type { Model } from "../model/model.ts";
import { nodesOf } from "../syntax/expression-nodes.ts";
import { type NameNode, type Node, ROLE, type StatementNode, type Token, type Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Family } from "../vocabulary/description.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";
import { baseOf } from "./navigate.ts";
import { CONSTANTS, type Occurrence, occurrences } from "./navigate-names.ts";
import { everyStatement, rootsOf } from "./navigate-nodes.ts";
import type { View } from "./view.ts";

/** What a word is coloured as, in the order in which the numbers of `encodeTokens` count them. */
export const TOKEN_TYPES = [
  "keyword",
  "word",
  "moves",
  "joins",
  "drives",
  "asks",
  "holds",
  "parameter",
  "case",
  "limit",
  "kit",
  "function",
  "argument",
  "quantity",
  "component",
  "property",
  "choice",
  "constant",
  "number",
  "unit",
  "operator",
  "string",
  "note",
  "tag",
  "comment",
] as const;

/** Where a name is defined; what never changes (ground, pi); what a used file defines. One bit each. */
export const TOKEN_MODIFIERS = ["definition", "readonly", "used"] as const;

export type TokenType = (typeof TOKEN_TYPES)[number];
export type TokenModifier = (typeof TOKEN_MODIFIERS)[number];

/** A coloured stretch of one line, in UTF-16 units. */
export interface SemanticToken {
  readonly span: Span;
  readonly type: TokenType;
  readonly modifiers: readonly TokenModifier[];
}

/** The words of a text by what they mean, in order of place, without overlap; with a range, those that touch it. */
export function semanticTokens(view: View, range?: Span): readonly SemanticToken[] {
  const { model } = view;
  const { tree } = model;
  const context = contextOf(model);
  const found: SemanticToken[] = [];
  for (let i = 0; i < tree.tokens.length; i++) {
    const { offset, length } = tree.tokens[i];
    if (range && (offset + length < range.start || offset > range.end)) continue;
    addToken(tree, i, context, found);
  }
  return found;
}

/**
 * Tokens as editors send them: five numbers each (lines down, characters right of the token before on the same
 * line, length, index of the type, bits of the modifiers).
 */
export function encodeTokens({ lines }: View, tokens: readonly SemanticToken[]): number[] {
  const data: number[] = [];
  let [line, character] = [0, 0];
  for (const { span, type, modifiers } of tokens) {
    const at = lines.position(span.start);
    const right = at.line === line ? at.character - character : at.character;
    const bits = modifiers.reduce((sum, each) => sum | (1 << TOKEN_MODIFIERS.indexOf(each)), 0);
    data.push(at.line - line, right, span.end - span.start, TOKEN_TYPES.indexOf(type), bits);
    [line, character] = [at.line, at.character];
  }
  return data;
}

interface Context {
  readonly model: Model;
  readonly names: ReadonlyMap<number, Occurrence>;
  /** Kind of each inner name of a kit, by key. */
  readonly local: ReadonlyMap<string, TokenType>;
  /** Offsets of words of closed lists, and of names that spell a unit. */
  readonly choices: ReadonlySet<number>;
  readonly units: ReadonlySet<number>;
}

function contextOf(model: Model): Context {
  const all = occurrences(model.tree);
  const { choices, units } = specialWords(model.tree);
  return {
    model,
    names: new Map(all.map((each) => [each.span.start, each])),
    local: new Map(all.filter(isLocal).map((each) => [each.key, localType(each)])),
    choices,
    units,
  };
}

function addToken(tree: Tree, index: number, context: Context, found: SemanticToken[]): void {
  const token = tree.tokens[index];
  const span = { start: token.offset, end: token.offset + token.length };
  const add = (type: TokenType, modifiers: readonly TokenModifier[] = []) =>
    found.push({ span, type, modifiers });
  const role = tree.roles[index];
  if (token.kind === "note") addNote(tree, span, found);
  else if (token.kind === "comment" || token.kind === "string") add(token.kind);
  else if (role === ROLE.unit) add("unit");
  else if (token.kind === "number") add("number");
  else if (token.kind === "operator" && (role === ROLE.infix || role === ROLE.prefix)) add("operator");
  else if (token.kind === "name") {
    const { type, modifiers } = nameToken(tree, token, role, context);
    if (type) add(type, modifiers);
  }
}

/** `> key: text` in two: the tag with its sign, and the text. */
function addNote(tree: Tree, span: Span, found: SemanticToken[]): void {
  const text = tree.text.slice(span.start, span.end);
  const tag = /^>[ \t]*(?:accept[ \t]+[a-z-]+|[\p{L}_][\p{L}\p{M}\d_]*)[ \t]*:/u.exec(text);
  const middle = span.start + (tag?.[0].length ?? 0);
  if (tag) found.push({ span: { start: span.start, end: middle }, type: "tag", modifiers: [] });
  if (middle < span.end) found.push({ span: { start: middle, end: span.end }, type: "note", modifiers: [] });
}

interface Coloured {
  readonly type?: TokenType;
  readonly modifiers?: readonly TokenModifier[];
}

function nameToken(tree: Tree, token: Token, role: number, context: Context): Coloured {
  const { offset, length } = token;
  const text = tree.text.slice(offset, offset + length);
  const occurrence = context.names.get(offset);
  if (occurrence && !occurrence.implicit) return occurrenceToken(occurrence, context);
  switch (role) {
    case ROLE.keyword:
      return { type: "keyword" };
    case ROLE.word:
    case ROLE.prefix:
    case ROLE.infix:
      return { type: "word" };
    case ROLE.key:
      return { type: "property" };
    case ROLE.callee:
      return { type: "function" };
    case ROLE.argument:
      return { type: "argument" };
    case ROLE.choice:
      return { type: "choice" };
    case ROLE.reference:
      return referenceToken(text, offset, context);
    default:
      return {};
  }
}

/** A word that refers to something without being a name of the file. */
function referenceToken(text: string, offset: number, { choices, units, names }: Context): Coloured {
  if (choices.has(offset)) return { type: "choice" };
  if (units.has(offset)) return { type: "unit" };
  const isFirst = !names.has(offset) && CONSTANTS.has(text);
  if (isFirst) return { type: "constant", modifiers: ["readonly"] };
  return { type: /^r?[xyz]$/.test(text) ? "component" : "quantity" };
}

function occurrenceToken({ key, role, text }: Occurrence, { model, local }: Context): Coloured {
  const definition: readonly TokenModifier[] = role === "definition" ? ["definition"] : [];
  const inner = local.get(key);
  if (inner) return { type: inner, modifiers: definition };
  if (text === "ground" && key === "ground") return { type: "moves", modifiers: ["readonly"] };
  const entity = model.entities.get(baseOf(key));
  if (entity === undefined || key.includes("/")) return {};
  const used: readonly TokenModifier[] = entity.file === undefined ? [] : ["used"];
  return { type: typeOf(entity.keyword, entity.description.family), modifiers: [...definition, ...used] };
}

function typeOf(keyword: string, family: Family): TokenType | undefined {
  if (keyword === "let") return "parameter";
  if (keyword === "case" || keyword === "limit" || keyword === "kit") return keyword;
  return family === "file" || family === "numbers" ? undefined : family;
}

const isLocal = ({ key, role }: Occurrence): boolean => role === "definition" && key.includes("/");

/** The places of a kit move, its parameters are numbers, and its statements are what they are anywhere. */
function localType({ statement, text, span }: Occurrence): TokenType {
  const { a, b, name } = statement.slots;
  const isHere = (node: typeof a) =>
    node?.kind === "name" && node.span.start === span.start && node.text === text;
  if (statement.keyword.text === "kit") return isHere(a) || isHere(b) ? "moves" : "parameter";
  const family = describe(statement.keyword.text)?.family ?? "moves";
  return (isHere(name) ? typeOf(statement.keyword.text, family) : undefined) ?? "parameter";
}

/** Where words of closed lists and unit names stand as values. */
function specialWords(tree: Tree): { choices: Set<number>; units: Set<number> } {
  const [choices, units] = [new Set<number>(), new Set<number>()];
  for (const statement of everyStatement(tree)) {
    const description = describe(statement.keyword.text, kindOf(statement));
    for (const detail of statement.details) {
      const is = description && detailOf(description, detail.key.text)?.content.is;
      const into =
        is === "unit" ? units : is === "word" || is === "words" || is === "tolerance" ? choices : undefined;
      if (into === undefined) continue;
      for (const item of detail.items) {
        for (const root of rootsOf(item)) for (const name of namesIn(root)) into.add(name.span.start);
      }
    }
  }
  return { choices, units };
}

function kindOf({ slots }: StatementNode): string | undefined {
  return slots.kind?.kind === "name" ? slots.kind.text : undefined;
}

function namesIn(root: Parameters<typeof nodesOf>[0]): NameNode[] {
  return [...nodesOf(root)].flatMap((each) => (each.kind === "path" ? each.names : [])) as (NameNode &
    Node)[];
}
