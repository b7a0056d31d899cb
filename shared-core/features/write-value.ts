import type { Model } from "../model/model.ts";
import { tokenAt } from "../syntax/search.ts";
import type { Expression, NumberNode } from "../syntax/tree.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { isFault } from "../units/fault.ts";
import { formatNumber } from "../units/show.ts";
import { unitOf } from "../units/unit-of.ts";

export type WrittenValue = { readonly edits: readonly TextEdit[] } | { readonly refused: string };

/**
 * The edit that gives a `let` another value, SI (rates in Hz). Only the digits change: unit, tolerance and range
 * stay as they are written. Refused where the value is computed from others.
 */
export function writeValue(model: Model, name: string, value: number): WrittenValue {
  const entity = model.entities.get(name);
  if (entity?.keyword !== "let") return { refused: `there is no \`let ${name}\`` };
  if (entity.file !== undefined) return { refused: `\`${name}\` stands in \`${entity.file}\`` };
  if (!Number.isFinite(value)) return { refused: `\`${name}\` needs a finite value` };
  const [item] = entity.node.value ?? [];
  const literal = item?.kind === "value" ? literalOf(item.expression) : undefined;
  if (literal === undefined) {
    return { refused: `\`${name}\` is computed from other numbers; those can be changed` };
  }
  const meaning = literal.number.unit === undefined ? undefined : unitOf(literal.number.unit);
  if (meaning !== undefined && isFault(meaning)) return { refused: `the unit of \`${name}\` cannot be read` };
  const digits = tokenAt(model.tree, literal.number.span.start);
  if (digits === undefined) return { refused: `\`${name}\` has no number that can be changed` };
  const text = formatNumber(value / (meaning?.factor ?? 1), DIGITS);
  const place: Span = span(literal.start, digits.offset + digits.length);
  return { edits: model.tree.text.slice(place.start, place.end) === text ? [] : [{ span: place, text }] };
}

/** More digits than a knob can be set to, fewer than rounding would show. */
const DIGITS = 6;

/** `4.2 t`, `-4 mm`: a number with its sign. */
function literalOf(
  expression: Expression,
): { readonly number: NumberNode; readonly start: number } | undefined {
  if (expression.kind === "number") return { number: expression, start: expression.span.start };
  if (expression.kind === "unary" && expression.operand.kind === "number" && expression.operator !== "not") {
    return { number: expression.operand, start: expression.span.start };
  }
  return undefined;
}
