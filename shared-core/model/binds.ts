import type { Expression, PathNode } from "../syntax/tree.ts";
import type { Dimension } from "../units/dimension.ts";
import { divideDimensions, isNumber, kindOf, NUMBER } from "../units/quantity.ts";
import { dimensionOf, wordsOf } from "../vocabulary/measures.ts";
import { binary, type Code, compile, constant } from "./code.ts";
import { type Draft, spoil } from "./draft.ts";
import { check } from "./expression.ts";
import { replaceFix } from "./findings.ts";
import type { Described } from "./names.ts";
import { placeOfSlot, resolvePlace } from "./places.ts";
import type { Place, PlannedBind } from "./plan.ts";
import { type ExpressionContext, type Wanted, wantedKind } from "./typed.ts";

interface Term {
  readonly place: Place;
  readonly node: PathNode;
  /** What the place is multiplied by; undefined: 1. */
  readonly factor: Code;
  readonly dimension: Dimension;
}

/** Takes `bind A = EXPR` into the draft: a sum of multiples of other coordinates. */
export function planBind({ node }: Described, draft: Draft): void {
  const target = placeOfSlot(node, "coordinate", draft, "what a bind moves");
  const [item] = node.value ?? [];
  if (node.broken || item === undefined || target === undefined) {
    spoil(draft, undefined);
    return;
  }
  if (target.is !== "coordinate") {
    draft.findings.say(
      "wrong-kind",
      node.slots.coordinate.span,
      "a bind moves a coordinate; supports and ground are moved by `motion` or not at all",
    );
    spoil(draft, undefined);
    return;
  }
  if (item.kind !== "value" || node.value?.length !== 1 || item.tolerance || item.within) {
    draft.findings.say(
      "wrong-kind",
      item.span,
      "a bind takes one sum of multiples, without tolerance and range",
      {
        hint: "give the ratio a name with `let`, which may have a tolerance",
      },
    );
    spoil(draft, undefined);
    return;
  }
  const c: ExpressionContext = { ...draft.numbers, root: item.expression };
  const terms = linear(item.expression, draft, c);
  const fitting = terms && withDimensions(terms, target, c);
  if (fitting === undefined) {
    spoil(draft, undefined);
    return;
  }
  const bind: PlannedBind = {
    node,
    coordinate: target.index,
    terms: fitting.map(({ place, factor }) => ({ place, code: factor, compute: compile(factor) })),
    span: node.headSpan,
  };
  draft.binds.push(bind);
}

/** The multiples in an expression; undefined where it is none, which is said. */
function linear(node: Expression, draft: Draft, c: ExpressionContext): Term[] | undefined {
  switch (node.kind) {
    case "parenthesis":
      return linear(node.inner, draft, c);
    case "unary":
      return node.operator === "not"
        ? notLinear(node, draft)
        : scaledTerms(linear(node.operand, draft, c), node.operator === "-" ? minusOne(node) : undefined);
    case "path": {
      if (!namesPlace(node, draft))
        return isNumberName(node, draft) ? notLinear(node, draft) : unknownPlace(node, draft);
      const place = resolvePlace(node, draft, "a bound coordinate");
      return place && [{ place, node, factor: constant(1, node.span), dimension: NUMBER.dimension }];
    }
    case "binary":
      return linearBinary(node, draft, c);
    case "broken":
      return undefined;
    default:
      return notLinear(node, draft);
  }
}

const minusOne = (node: Expression) => ({ code: constant(-1, node.span), dimension: NUMBER.dimension });

function linearBinary(
  node: Extract<Expression, { kind: "binary" }>,
  draft: Draft,
  c: ExpressionContext,
): Term[] | undefined {
  const { operator, left, right } = node;
  if (operator === "+" || operator === "-") {
    const [a, b] = [linear(left, draft, c), linear(right, draft, c)];
    return a && b && [...a, ...(operator === "-" ? (scaledTerms(b, minusOne(right)) ?? []) : b)];
  }
  if (operator !== "*" && operator !== "/") return notLinear(node, draft);
  const [inLeft, inRight] = [holdsPlace(left, draft), holdsPlace(right, draft)];
  if (inLeft === inRight || (inRight && operator === "/")) return notLinear(node, draft);
  const factorNode = inLeft ? right : left;
  const factor = check(factorNode, c);
  const terms = linear(inLeft ? left : right, draft, c);
  if (factor === undefined || terms === undefined) return undefined;
  if (factor.kind.rate || factor.logical) return notLinear(factorNode, draft);
  if (operator === "*") return scaledTerms(terms, { code: factor.code, dimension: factor.kind.dimension });
  const inverse = binary("divide", constant(1, factorNode.span), factor.code, factorNode.span);
  return scaledTerms(terms, {
    code: inverse,
    dimension: divideDimensions(NUMBER.dimension, factor.kind.dimension),
  });
}

function scaledTerms(
  terms: Term[] | undefined,
  by: { readonly code: Code; readonly dimension: Dimension } | undefined,
): Term[] | undefined {
  if (terms === undefined || by === undefined) return terms;
  return terms.map((term) => ({
    ...term,
    factor:
      term.factor.op === "constant" && term.factor.value === 1
        ? by.code
        : binary("multiply", by.code, term.factor, by.code.span),
    dimension: term.dimension.map((exponent, i) => exponent + by.dimension[i]) as unknown as Dimension,
  }));
}

/** Each multiple has the kind of what it moves: a displacement is a length per angle times an angle. */
function withDimensions(
  terms: readonly Term[],
  target: Place,
  c: ExpressionContext,
): readonly Term[] | undefined {
  if (target.is === "ground") return undefined;
  const travel = dimensionOf("travel", target.motion)?.dimension ?? NUMBER.dimension;
  let sound = true;
  for (const { place, dimension, node, factor } of terms) {
    if (place.is === "ground") continue;
    const own = dimensionOf("travel", place.motion)?.dimension ?? NUMBER.dimension;
    const wanted = kindOf(divideDimensions(travel, own));
    const found = kindOf(dimension);
    if (wanted.dimension.every((exponent, i) => Math.abs(exponent - found.dimension[i]) < 1e-9)) continue;
    sound = false;
    const per = isNumber(wanted) ? "a bare number" : wantedKind(wanted).says;
    const span = factor.op === "constant" && factor.value === 1 ? node.span : factor.span;
    c.findings.say(
      "unit-mismatch",
      span,
      `expected ${per} as the multiple of \`${node.names.map(({ text }) => text).join(".")}\`, found ${describeFound(wantedKind(found))}`,
      {
        hint: `it makes ${wordsOf("travel", target.motion)} of ${wordsOf("travel", place.motion)}`,
      },
    );
  }
  return sound ? terms : undefined;
}

const describeFound = (wanted: Wanted): string => wanted.says;

function notLinear(node: Expression, draft: Draft): undefined {
  draft.findings.say(
    "wrong-kind",
    node.span,
    "a bind is a sum of multiples of coordinates, as in `-3.2 * wheel` or `a + 0.3 m * b`",
  );
  return undefined;
}

const namesPlace = (node: PathNode, draft: Draft): boolean => {
  const [first] = node.names;
  if (first === undefined) return false;
  if (first.text === "ground") return true;
  const entity = draft.main.names.get(first.text);
  return entity !== undefined && entity.description.family === "moves";
};

const isNumberName = (node: PathNode, draft: Draft): boolean => {
  const [first] = node.names;
  return (
    first?.text === "pi" || first?.text === "e" || draft.main.names.get(first?.text ?? "")?.keyword === "let"
  );
};

function unknownPlace(node: PathNode, draft: Draft): undefined {
  const [first] = node.names;
  if (first === undefined) return undefined;
  const entity = draft.main.names.get(first.text);
  if (entity !== undefined) return notLinear(node, draft);
  const near = draft.findings.suggest(first.text, boundNames(draft));
  draft.findings.say("unknown-name", first.span, `nothing is called \`${first.text}\``, {
    about: first.text,
    fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, first.span, near)],
  });
  return undefined;
}

function* boundNames(draft: Draft): Iterable<string> {
  yield* draft.coordinateByName.keys();
  yield* draft.numbers.scope.numberNames();
}

function holdsPlace(node: Expression, draft: Draft): boolean {
  switch (node.kind) {
    case "parenthesis":
      return holdsPlace(node.inner, draft);
    case "unary":
      return holdsPlace(node.operand, draft);
    case "as":
      return holdsPlace(node.operand, draft);
    case "binary":
      return holdsPlace(node.left, draft) || holdsPlace(node.right, draft);
    case "call":
      return [...node.positional, ...node.named.map(({ value }) => value)].some((each) =>
        holdsPlace(each, draft),
      );
    case "path":
      return namesPlace(node, draft);
    default:
      return false;
  }
}
