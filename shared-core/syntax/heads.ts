import { span } from "../text/span.ts";
import { type Cursor, shorten } from "./cursor.ts";
import { callArguments, name, parenthesis, path } from "./expressions.ts";
import type { HeadPart, StatementGrammar } from "./grammar.ts";
import { type CallNode, type NameNode, ROLE, type SlotValue, type TupleNode } from "./tree.ts";
import { text } from "./values.ts";
import { RESERVED } from "./words.ts";

export type Slots = Record<string, SlotValue>;

/** Reads the parts of a head behind its keyword into slots; a slot that cannot be read stays missing. */
export function headParts(c: Cursor, grammar: StatementGrammar, slots: Slots): void {
  parts(c, grammar.head, slots, writtenAs(grammar));
}

/** The hint of an error in a head. */
export function writtenAs(grammar: StatementGrammar): string {
  let hint = HINTS.get(grammar);
  if (hint === undefined) {
    hint = `written: ${formOf(grammar)}`;
    HINTS.set(grammar, hint);
  }
  return hint;
}

/** How a statement is written, for messages and hovers: `spring NAME between A and B = VALUE`. */
export function formOf(grammar: StatementGrammar): string {
  const value = { none: "", optional: " [= VALUE]", required: " = VALUE" }[grammar.value];
  return `${grammar.keyword}${grammar.head.map((part) => ` ${shapeOf(part)}`).join("")}${value}`;
}

/** Takes a name where it is defined; words that mean something already are refused. */
export function definingName(c: Cursor, hint?: string): NameNode | undefined {
  if (c.kind !== "name") {
    c.expected("a name", c.kind === "number" ? { hint: "a name starts with a letter or `_`" } : { hint });
    return undefined;
  }
  const reserved = RESERVED.get(c.word);
  if (reserved !== undefined) {
    c.failAt(c.span, `\`${c.word}\` cannot be a name: it is ${reserved}`);
    return undefined;
  }
  const hyphenated = hyphenatedName(c);
  if (hyphenated) return hyphenated;
  return name(c, ROLE.definition);
}

/** Derived from the grammar alone, so it may outlive a parse. */
const HINTS = new WeakMap<StatementGrammar, string>();

function parts(c: Cursor, list: readonly HeadPart[], slots: Slots, hint: string): void {
  for (let i = 0; i < list.length; i++) {
    const part = list[i];
    if (c.failed) return;
    if (part.kind === "either") {
      parts(c, chosenWay(c, part.ways, hint), slots, hint);
    } else if (part.kind === "word") {
      if (!c.accept(part.word, ROLE.word)) c.expected(`\`${part.word}\``, { hint });
    } else if (!(part.kind === "name" && part.optional && isLeftOut(c, list[i + 1]))) {
      const slot = slotOf(c, part, hint);
      if (slot && !c.failed) slots[part.slot] = slot;
    }
  }
}

function isLeftOut(c: Cursor, next: HeadPart | undefined): boolean {
  return c.kind !== "name" || (next?.kind === "word" && c.word === next.word);
}

function chosenWay(c: Cursor, ways: readonly (readonly HeadPart[])[], hint: string): readonly HeadPart[] {
  const way = ways.find(([first]) => first?.kind !== "word" || first.word === c.word);
  if (way) return way;
  const words = ways.map(([first]) => (first?.kind === "word" ? `\`${first.word}\`` : ""));
  c.expected(words.join(" or "), { hint });
  return [];
}

type SlotPart = Exclude<HeadPart, { kind: "word" } | { kind: "either" }>;

function slotOf(c: Cursor, part: SlotPart, hint: string): SlotValue | undefined {
  switch (part.kind) {
    case "name":
      return definingName(c, hint);
    case "place":
      if (c.kind === "name") return path(c);
      c.expected("the name of a thing in the model", { hint });
      return undefined;
    case "choice":
      return choice(c, part.choices, hint);
    case "text":
      if (c.kind === "string") return text(c);
      c.expected('a text in quotes, "…"', { hint });
      return undefined;
    case "parameters":
      return parameters(c);
    case "call":
      return call(c, hint);
    case "tuple":
      return tuple(c, hint);
  }
}

function choice(c: Cursor, choices: readonly string[], hint: string): NameNode | undefined {
  if (c.kind === "name" && choices.includes(c.word)) return name(c, ROLE.choice);
  if (c.kind !== "name") {
    c.expected(`one of ${choices.join(", ")}`, { hint });
    return undefined;
  }
  const near = c.state.suggest(c.word, choices);
  const edits = near ? [{ span: c.span, text: near }] : [];
  c.failAt(c.span, `\`${shorten(c.word)}\` is none of ${choices.join(", ")}`, {
    fixes: near ? [{ title: `Write \`${near}\``, edits, safe: false }] : [],
  });
  return undefined;
}

/** `(p, q)`; without a parenthesis there are none. */
function parameters(c: Cursor): SlotValue {
  const start = c.offset;
  const items: NameNode[] = [];
  if (!c.accept("(")) return { kind: "parameters", span: span(start, start), items };
  while (!c.atEnd && c.word !== ")") {
    const parameter = definingName(c);
    if (parameter) items.push(parameter);
    if (!c.accept(",")) break;
  }
  if (!c.accept(")")) c.expected("`,` or `)` behind a parameter");
  return { kind: "parameters", span: c.from(start), items };
}

/** `KIT(values)`; a kit without parameters may stand alone. */
function call(c: Cursor, hint: string): CallNode | undefined {
  if (c.kind !== "name") {
    c.expected("the name of a kit", { hint });
    return undefined;
  }
  const callee = name(c, ROLE.callee);
  if (c.word === "(") return callArguments(c, callee);
  return { kind: "call", span: callee.span, callee, positional: [], named: [] };
}

function tuple(c: Cursor, hint: string): TupleNode | undefined {
  const start = c.offset;
  const node = c.word === "(" ? parenthesis(c) : undefined;
  if (node?.kind === "tuple") return node;
  if (node) c.failAt(c.from(start), "expected a place of three numbers, as in (0 m, 0.2 m, 0 m)", { hint });
  else c.expected("a place of three numbers, as in (0 m, 0.2 m, 0 m)", { hint });
  return undefined;
}

/** `run-up`: one name in the writer's mind, three tokens here. */
function hyphenatedName(c: Cursor): NameNode | undefined {
  if (c.tokenAhead(1)?.length !== 1) return undefined;
  const [first, hyphen, rest] = c.ahead(3);
  if (rest === undefined || c.state.textOf(hyphen) !== "-") return undefined;
  const glued = first.offset + first.length === hyphen.offset && hyphen.offset + 1 === rest.offset;
  if (!glued || (rest.kind !== "name" && rest.kind !== "number")) return undefined;
  const whole = span(first.offset, rest.offset + rest.length);
  const edits = [{ span: span(hyphen.offset, hyphen.offset + 1), text: "_" }];
  const better = `${c.word}_${c.state.textOf(rest)}`;
  c.failAt(whole, "a name holds letters, digits and `_`, no hyphen", {
    fixes: [{ title: `Write \`${shorten(better)}\``, edits, safe: false }],
  });
  return undefined;
}

function shapeOf(part: HeadPart): string {
  switch (part.kind) {
    case "word":
      return part.word;
    case "name":
      return part.optional ? "[NAME]" : "NAME";
    case "place":
      return part.slot.toUpperCase();
    case "choice":
      return part.slot.toUpperCase();
    case "text":
      return '"…"';
    case "parameters":
      return "(p, q, …)";
    case "call":
      return "KIT(values)";
    case "tuple":
      return "(x, y, z)";
    case "either":
      return part.ways.map((way) => way.map(shapeOf).join(" ")).join(" | ");
  }
}
