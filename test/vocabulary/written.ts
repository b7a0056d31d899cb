import type { HeadPart } from "../../shared-core/syntax/grammar.ts";
import { type Parsed, parse } from "../../shared-core/syntax/parser.ts";
import type { Expression, Item, NumberNode } from "../../shared-core/syntax/tree.ts";
import type { Kind } from "../../shared-core/units/dimension.ts";
import { isFault } from "../../shared-core/units/fault.ts";
import { isUnitName } from "../../shared-core/units/lookup.ts";
import { NUMBER } from "../../shared-core/units/quantity.ts";
import { unitOf } from "../../shared-core/units/unit-of.ts";
import type { DetailDescription, StatementDescription } from "../../shared-core/vocabulary/description.ts";
import { grammarTable } from "../../shared-core/vocabulary/registry.ts";

export const read = (text: string): Parsed => parse(text, { grammar: grammarTable(), isUnit: isUnitName });

/** A head as it may be written, from its pattern. */
export function headText(description: StatementDescription): string {
  const parts = description.grammar.head.map((part) => partText(part, description.variant));
  const value = description.grammar.value === "required" ? ["=", "1"] : [];
  return [description.keyword, ...parts, ...value].join(" ");
}

/** A file with one statement and one detail, rows below where the detail holds a table. */
export function withDetail(description: StatementDescription, detail: DetailDescription): string {
  const { key, content, example } = detail;
  const written = content.is === "table" ? `\n        ${example}` : ` ${example}`;
  return `thrum 1\n${headText(description)}\n    ${key} =${written}\n`;
}

/** The kinds of all literals in a detail: of its items, or of one row. */
export function kindsOf(items: readonly Item[]): readonly Kind[] {
  return items.flatMap((item) => {
    if (item.kind === "value") return literals(item.expression);
    if (item.kind === "range") return [...literals(item.from), ...literals(item.to)];
    return item.kind === "at" ? literals(item.value.expression) : [];
  });
}

export function kindOfNumber({ unit }: NumberNode): Kind {
  if (unit === undefined) return NUMBER;
  const meaning = unitOf(unit);
  if (isFault(meaning)) throw new Error(meaning.message);
  return meaning.kind;
}

function literals(expression: Expression): readonly Kind[] {
  switch (expression.kind) {
    case "number":
      return [kindOfNumber(expression)];
    case "unary":
      return literals(expression.operand);
    case "tuple": {
      const { unit } = expression;
      if (unit === undefined) return expression.items.flatMap(literals);
      const meaning = unitOf(unit);
      if (isFault(meaning)) throw new Error(meaning.message);
      return expression.items.map(() => meaning.kind);
    }
    default:
      return [];
  }
}

function partText(part: HeadPart, variant: string | undefined): string {
  switch (part.kind) {
    case "word":
      return part.word;
    case "name":
    case "place":
      return `some_${part.slot}`;
    case "choice":
      return variant ?? part.choices[0];
    case "text":
      return '"some text"';
    case "parameters":
      return "(p, q)";
    case "call":
      return "some_kit(1 kg)";
    case "tuple":
      return "(1, 2, 3) m";
    case "either":
      return part.ways[0].map((each) => partText(each, variant)).join(" ");
  }
}
