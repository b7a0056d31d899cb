/** Short readouts behind numbers of the text, where it does not already say them. */
import { evaluateExpression } from "../model/instantiate.ts";
import type { Instance } from "../model/model.ts";
import { fail } from "../numerics/outcome.ts";
import { saysItself } from "../syntax/says-itself.ts";
import type { Expression, Item, StatementNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { coordinatesOf, heldFrequency } from "./readout-modes.ts";
import { currentInstance, type Numbers, numbersOf, showHz, showQuantity } from "./readout-numbers.ts";
import {
  type CaseVerdict,
  marginText,
  valueText,
  verdictPhrase,
  verdictsOf,
  worstOf,
} from "./readout-verdicts.ts";
import type { View } from "./view.ts";

/** Each kind is switched by itself. */
export type InlayKind =
  /** Natural frequency behind what moves, everything else held still. */
  | "frequency"
  /** Value behind an expression. */
  | "value"
  /** Value and margin behind an expectation. */
  | "margin"
  /** Its value alone, where something else says the margin. */
  | "found";

export interface InlayHint {
  readonly kind: InlayKind;
  /** It stands in front of the character at this offset. */
  readonly offset: number;
  readonly label: string;
  /** What the number is. */
  readonly says: string;
  /** Of an earlier text; the label ends with `…`. */
  readonly stale: boolean;
}

export interface InlayOptions {
  /** Default: all. */
  readonly kinds?: ReadonlySet<InlayKind>;
  /** Offset of the cursor: nothing is put between the start of its line and the cursor. */
  readonly cursor?: number;
}

const ALL: ReadonlySet<InlayKind> = new Set(["frequency", "value", "margin"]);

/** Hints of the statements that touch a range, in order of place. */
export function inlayHints(view: View, range: Span, options: InlayOptions = {}): readonly InlayHint[] {
  const { kinds = ALL, cursor } = options;
  const numbers = numbersOf(view);
  const statements = view.model.tree.statements.filter(
    ({ span }) => span.start <= range.end && range.start <= span.end,
  );
  // Values belong to the text as it stands, so they never wait for a report.
  const instance = kinds.has("value") && statements.length > 0 ? currentInstance(view) : undefined;
  const hints = statements.flatMap((statement) => [
    ...(instance === undefined ? [] : valueHints(view, instance, statement)),
    ...(numbers !== undefined && kinds.has("frequency") ? frequencyHints(numbers, statement) : []),
    ...(numbers !== undefined && kinds.has("margin") ? verdictHints(view, numbers, statement, "margin") : []),
    ...(numbers !== undefined && kinds.has("found") ? verdictHints(view, numbers, statement, "found") : []),
  ]);
  return hints.filter(
    ({ offset }) => range.start <= offset && offset <= range.end && !pushes(view, offset, cursor),
  );
}

/** Whether a hint would move what stands at the cursor while somebody types there. */
function pushes({ lines }: View, offset: number, cursor: number | undefined): boolean {
  return cursor !== undefined && offset <= cursor && lines.lineAt(offset) === lines.lineAt(cursor);
}

const MASSES: ReadonlySet<string> = new Set(["mass", "inertia", "body", "pendulum"]);

function frequencyHints(numbers: Numbers, statement: StatementNode): readonly InlayHint[] {
  const name = statement.slots.name;
  if (!MASSES.has(statement.keyword.text) || name?.kind !== "name") return [];
  const { assembly } = numbers.asWritten.instance;
  const own = coordinatesOf(assembly, name.text);
  // A body has a frequency in every direction: its hover lists them.
  if (own.length !== 1) return [];
  const held = heldFrequency(assembly, own[0]);
  if (held === undefined) return [];
  return [
    hint("frequency", statement.headSpan.end, `${showHz(numbers, held)} alone`, {
      says: `natural frequency of ${name.text} with everything else held still`,
      stale: numbers.stale,
    }),
  ];
}

/** Values of the head and of the details, behind each expression that is more than a literal. */
function valueHints(view: View, instance: Instance, statement: StatementNode): readonly InlayHint[] {
  if (SILENT.has(statement.keyword.text)) return [];
  const items = [...(statement.value ?? []), ...statement.details.flatMap((detail) => detail.items)];
  return items.flatMap((item) => itemHints(view, instance, statement, item));
}

/** Their values are no numbers of one instance, or are said in a hint of their own. */
const SILENT: ReadonlySet<string> = new Set(["kit", "part", "bind", "group", "use", "title"]);

function itemHints(
  view: View,
  instance: Instance,
  statement: StatementNode,
  item: Item,
): readonly InlayHint[] {
  switch (item.kind) {
    case "value":
      return expressionHints(view, instance, judged(statement, item.expression));
    case "at":
      return [
        ...expressionHints(view, instance, [item.value.expression]),
        ...expressionHints(view, instance, [item.at]),
      ];
    case "range":
      return expressionHints(view, instance, [item.from, item.to]);
    default:
      return [];
  }
}

/** Of an expectation its limits; its value is part of the margin. */
function judged({ keyword }: StatementNode, expression: Expression): readonly Expression[] {
  if (keyword.text !== "expect") return [expression];
  if (expression.kind !== "binary") return [];
  const { left, right } = expression;
  return left.kind === "binary" && COMPARISONS.has(left.operator) ? [left.left, right] : [right];
}

const COMPARISONS: ReadonlySet<string> = new Set(["<", "<=", ">", ">="]);

function expressionHints(
  view: View,
  instance: Instance,
  expressions: readonly Expression[],
): readonly InlayHint[] {
  return expressions.flatMap((expression) => {
    if (saysItself(expression)) return [];
    const label = valueLabel(view, instance, expression);
    return label === undefined
      ? []
      : [hint("value", expression.span.end, `= ${label}`, { says: "value as written", stale: false })];
  });
}

function valueLabel({ units }: View, instance: Instance, expression: Expression): string | undefined {
  const value = evaluateExpression(instance, expression, () => fail("it is read from the answers"));
  return value.ok ? showQuantity(value.value, units, instance, expression) : undefined;
}

function verdictHints(
  view: View,
  numbers: Numbers,
  statement: StatementNode,
  kind: "margin" | "found",
): readonly InlayHint[] {
  if (statement.keyword.text !== "expect") return [];
  const worst = worstOf(verdictsOf(numbers, view.model, statement));
  if (worst === undefined) return [];
  return [
    hint(kind, statement.headSpan.end, verdictLabel(numbers, worst, kind), {
      says: `${worst.verdict.name}: ${verdictPhrase(worst)}`,
      stale: numbers.stale,
    }),
  ];
}

/** `3.95 Hz, 29 % left`; with the case, where that is nearest to failing. */
function verdictLabel(numbers: Numbers, worst: CaseVerdict, kind: "margin" | "found"): string {
  const { verdict, report, asWritten } = worst;
  const where = asWritten ? "" : ` in ${report.name}`;
  if (verdict.value === null) return `open${where}`;
  if (kind === "found") return `${valueText(numbers, worst)}${where}`;
  const margin = marginText(verdict);
  const said = margin === "" ? (verdict.holds ? "holds" : "fails") : margin;
  return `${valueText(numbers, worst)}, ${said}${where}`;
}

function hint(
  kind: InlayKind,
  offset: number,
  label: string,
  { says, stale }: { readonly says: string; readonly stale: boolean },
): InlayHint {
  return {
    kind,
    offset,
    label: stale ? `${label} …` : label,
    says: stale ? `${says}, of an earlier text` : says,
    stale,
  };
}
