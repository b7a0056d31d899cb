import type { NameNode, StatementNode, Tree } from "../syntax/tree.ts";
import { LineIndex } from "../text/line-index.ts";
import type { Span } from "../text/span.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import { describe } from "../vocabulary/registry.ts";
import { type Findings, replaceFix } from "./findings.ts";
import type { Entity } from "./model.ts";

/** A statement with the description of its keyword (of its kind, for an ask). */
export interface Described {
  readonly node: StatementNode;
  readonly description: StatementDescription;
  /** The name by which other lines know it. */
  readonly name?: string;
}

/** Statements that other files take with `use`. */
export const TAKEN_BY_USE: ReadonlySet<string> = new Set(["let", "limit", "kit"]);

/** Every statement whose keyword is known, with its name; an unnamed ask is called by its kind. */
export function describeStatements(tree: Tree): Described[] {
  const counts = new Map<string, number>();
  const described: Described[] = [];
  for (const node of tree.statements) {
    const kind = node.keyword.text === "ask" ? nameIn(node, "kind")?.text : undefined;
    const description = describe(node.keyword.text, kind);
    if (description === undefined) continue;
    const written = nameIn(node, "name")?.text;
    if (kind === undefined) {
      described.push({ node, description, name: written });
      continue;
    }
    const count = (counts.get(kind) ?? 0) + (written === undefined ? 1 : 0);
    counts.set(kind, count);
    described.push({ node, description, name: written ?? (count > 1 ? `${kind}_${count}` : kind) });
  }
  return described;
}

/** The names of a file, own ones and those of the files it uses; the first of two wins. */
export function collectNames(
  statements: readonly Described[],
  used: ReadonlyMap<string, Entity>,
  tree: Tree,
  findings: Findings,
): Map<string, Entity> {
  const names = new Map(used);
  let index: LineIndex | undefined;
  const lineAt = (offset: number): number => {
    index ??= new LineIndex(tree.text);
    return index.lineAt(offset) + 1;
  };
  for (const { node, description, name } of statements) {
    if (name === undefined) continue;
    const entity: Entity = { name, keyword: node.keyword.text, description, node };
    const first = names.get(name);
    if (first === undefined) names.set(name, entity);
    else sayDuplicate(entity, first, names, lineAt, findings);
  }
  return names;
}

function sayDuplicate(
  entity: Entity,
  first: Entity,
  names: ReadonlyMap<string, Entity>,
  lineAt: (offset: number) => number,
  findings: Findings,
): void {
  const { name, node } = entity;
  const place = nameSpan(node);
  const firstPlace = nameSpan(first.node);
  const where = first.file === undefined ? `on line ${lineAt(firstPlace.start)}` : `in \`${first.file}\``;
  const free = freeName(name, names);
  const written = nameIn(node, "name");
  const rename = written
    ? replaceFix(`Call this one \`${free}\``, written.span, free)
    : {
        title: `Call this one \`${free}\``,
        edits: [{ span: { start: place.end, end: place.end }, text: ` ${free}` }],
        safe: false,
      };
  findings.say("duplicate-name", place, `\`${name}\` is ${aKeyword(first.keyword)} already, ${where}`, {
    hint: "all statements share one namespace: give one of the two another name",
    related: [
      {
        span: firstPlace,
        message: `here \`${name}\` is ${aKeyword(first.keyword)}`,
        ...(first.file === undefined ? {} : { file: first.file }),
      },
    ],
    fixes: [rename],
  });
}

function freeName(name: string, names: ReadonlyMap<string, Entity>): string {
  for (let n = 2; ; n++) if (!names.has(`${name}_${n}`)) return `${name}_${n}`;
}

/** "a spring", "an inertia", "a `let`". */
export function aKeyword(keyword: string): string {
  if (keyword === "let" || keyword === "case" || keyword === "ask" || keyword === "expect") {
    return { let: "a number", case: "a case", ask: "an ask", expect: "an expectation" }[keyword];
  }
  return `${/^[aeiou]/.test(keyword) ? "an" : "a"} ${keyword}`;
}

export function nameIn(node: StatementNode, slot: string): NameNode | undefined {
  const value = node.slots[slot];
  return value?.kind === "name" ? value : undefined;
}

/** Where a statement gets its name; the kind of an unnamed ask, else the keyword. */
export function nameSpan(node: StatementNode): Span {
  return (nameIn(node, "name") ?? nameIn(node, "kind") ?? node.keyword).span;
}
