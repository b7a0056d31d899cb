/** The value that is being typed: what it belongs to and where in it the cursor stands. */
import { kindOfLet } from "../model/inspect.ts";
import { placeAt } from "../syntax/search.ts";
import type { StatementNode } from "../syntax/tree.ts";
import type { DetailContent, DetailDescription, StatementDescription } from "../vocabulary/description.ts";
import { describe, detailOf } from "../vocabulary/registry.ts";
import { headSpot } from "./complete-head.ts";
import { isUnitWord, ownersOf, type TypedLine, type Word } from "./complete-line.ts";
import type { Names } from "./complete-names.ts";
import { type ValuePlace, valuePlace } from "./complete-value.ts";
import type { ValueContext } from "./complete-wanted.ts";
import type { View } from "./view.ts";

/** The value that a line is in the middle of, with the words of the line up to the cursor. */
export function valueAt(
  line: TypedLine,
  view: View,
  words: readonly Word[],
): { context: ValueContext; place: ValuePlace } | undefined {
  const { statement, kit, detailLine } = ownersOf(line);
  const names: Names = { model: view.model, kit };
  const { text } = line.tree;
  const isRow = statement && detailLine && line.indent > detailLine.indent && words[1]?.text !== "=";
  if (statement && isRow) {
    const content = rowContent(statement, line, detailLine.span.start);
    if (content === undefined) return undefined;
    const description = descriptionOf(statement);
    const context = contextOf(names, statement, description, rowCells(content, words), text);
    return {
      context,
      place: valuePlace(content.is === "table" ? [] : words, words[0]?.start ?? line.offset, text),
    };
  }
  if (statement) return detailValue(statement, words, names, text);
  return line.words.length > 0 || words.length > 0 ? headValue(line, words, names) : undefined;
}

/** A cell of a table is a number of its column. */
function rowCells(content: DetailContent, words: readonly Word[]): DetailContent {
  if (content.is !== "table") return content;
  const cells = words.filter(({ kind, role }) => kind === "number" && !isUnitWord({ role } as Word)).length;
  const column = content.columns[Math.min(cells, content.columns.length - 1)];
  return { is: "quantity", measure: column.measure };
}

function detailValue(statement: StatementNode, words: readonly Word[], names: Names, text: string) {
  const equals = words.findIndex((word) => word.text === "=");
  if (equals < 0) return undefined;
  const description = descriptionOf(statement);
  const key = words[0].text;
  const kind = statement.keyword.text === "case" ? kindOfLet(names.model, key) : undefined;
  const content: ValueContext["content"] | undefined = kind
    ? { is: "like", kind }
    : description && detailOf(description, key)?.content;
  if (content === undefined) return undefined;
  const context = contextOf(names, statement, description, content, text);
  return { context, place: valuePlace(words.slice(equals + 1), words[equals].end, text) };
}

function headValue(line: TypedLine, words: readonly Word[], names: Names) {
  const description = headDescription(line);
  if (description === undefined || words.length === 0) return undefined;
  const spot = headSpot(description, words.slice(1));
  const { text } = line.tree;
  const node = placeAt(line.tree, words[0].start)?.innermost;
  if (spot.is === "inside" && spot.part.kind !== "parameters") {
    const content: DetailContent =
      spot.part.kind === "tuple"
        ? { is: "tuple", measure: "length", components: ["x", "y", "z"] }
        : { is: "expressions" };
    const context = { ...contextOf(names, node, description, content, text), answers: false };
    return { context, place: valuePlace(spot.words, spot.words[0].start, text) };
  }
  if (spot.is !== "value") return undefined;
  const content = headContent(description, words);
  const context = contextOf(names, node, description, content, text);
  const start = words[words.length - spot.words.length - 1].end;
  return {
    context: { ...context, answers: description.keyword === "expect" },
    place: valuePlace(spot.words, start, text),
  };
}

function headContent(description: StatementDescription, words: readonly Word[]): ValueContext["content"] {
  const { keyword, principal, keys } = description;
  if (keyword === "group") return { is: "names", families: ["joins"] };
  if (keyword === "bind") return { is: "bind" };
  const key: DetailDescription | undefined = keys?.find((each) => each.key === words[1]?.text);
  return (
    (key ?? (principal ? detailOf(description, principal) : undefined))?.content ?? { is: "expressions" }
  );
}

function contextOf(
  names: Names,
  statement: StatementNode | undefined,
  description: StatementDescription | undefined,
  content: ValueContext["content"],
  text: string,
): ValueContext {
  const keyword = description?.keyword ?? "";
  const answers = content.is === "expressions" && description?.family === "asks";
  return { names, statement, keyword, askKind: description?.variant, content, answers, text };
}

export function rowContent(
  statement: StatementNode,
  line: TypedLine,
  detailStart: number,
): DetailContent | undefined {
  const key = /[^\s=]+/.exec(line.tree.text.slice(detailStart))?.[0];
  const description = descriptionOf(statement);
  return description && key !== undefined ? detailOf(description, key)?.content : undefined;
}

export const descriptionOf = ({ keyword, slots }: StatementNode): StatementDescription | undefined =>
  describe(keyword.text, slots.kind?.kind === "name" ? slots.kind.text : undefined);

export const headDescription = ({ words }: TypedLine): StatementDescription | undefined =>
  words[0]?.kind === "name" ? describe(words[0].text, words[1]?.text) : undefined;
