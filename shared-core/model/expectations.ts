import type { BinaryNode, Expression, ValueNode } from "../syntax/tree.ts";
import { type Asked, planAnswerExpression } from "./answer-calls.ts";
import { type Given, givenDetails, nameItem, sayUnknownName, singleValue } from "./details.ts";
import { alike } from "./expression.ts";
import { replaceFix } from "./findings.ts";
import { literalOf } from "./fit.ts";
import type { Expectation } from "./model.ts";
import { aKeyword, type Described } from "./names.ts";
import { planQuantity } from "./places.ts";
import type { PlannedExpression } from "./plan.ts";
import type { ExpressionContext, Typed } from "./typed.ts";

type Comparison = BinaryNode & { operator: Expectation["operator"] };

interface Part {
  readonly suffix: "" | ".low" | ".high";
  readonly left: Expression;
  readonly operator: Expectation["operator"];
  readonly right: Expression;
  readonly comparison: BinaryNode;
}

/** Understands `expect NAME = LEFT <= RIGHT` or `A <= x <= B`; none where it is no comparison, which is said. */
export function planExpectation(statement: Described, asked: Asked): Expectation[] {
  const { node, name } = statement;
  const { draft } = asked;
  const [item] = node.value ?? [];
  const given = givenDetails(statement, draft);
  if (name === undefined || item === undefined || node.value === undefined) return [];
  if (item.kind !== "value" || node.value.length !== 1 || item.tolerance || item.within) {
    draft.findings.say(
      "wrong-kind",
      item.span,
      "an expectation is one comparison, as in `natural_frequency(1) <= 6 Hz`",
    );
    return [];
  }
  const parts = partsOf(item, asked);
  const c: ExpressionContext = { ...draft.numbers, root: item.expression };
  checkSides(parts, asked, c);
  const shared = {
    node,
    margin: marginOf(given.details.get("margin"), asked),
    cases: casesOf(given.details.get("cases"), asked),
    tolerance: toleranceOf(given.details.get("tolerance"), asked),
  };
  return parts.map(({ suffix, ...part }) => ({ name: name + suffix, ...part, ...shared }));
}

/** The one comparison, or the two of `A <= x <= B`: the value on the left, its bound on the right. */
function partsOf(item: ValueNode, asked: Asked): Part[] {
  const whole = inside(item.expression);
  const { findings } = asked.draft;
  if (whole.kind === "broken") return [];
  if (!isComparison(whole)) {
    sayNoComparison(whole, asked);
    return [];
  }
  const { left, operator, right } = whole;
  if (!isComparison(left)) {
    return [{ suffix: "", left, operator, right, comparison: whole }];
  }
  if (isComparison(left.left) || isUpward(left.operator) !== isUpward(operator)) {
    findings.say(
      "wrong-kind",
      whole.span,
      "an expectation is one comparison, or a value between two bounds, as in `A <= x <= B`",
    );
    return [];
  }
  const first: Part = {
    suffix: isUpward(operator) ? ".low" : ".high",
    left: left.right,
    operator: turned(left.operator),
    right: left.left,
    comparison: left,
  };
  const second: Part = {
    suffix: isUpward(operator) ? ".high" : ".low",
    left: left.right,
    operator,
    right,
    comparison: whole,
  };
  return isUpward(operator) ? [first, second] : [second, first];
}

const isUpward = (operator: string): boolean => operator === "<=" || operator === "<";

const turned = (operator: Expectation["operator"]): Expectation["operator"] =>
  ({ "<=": ">=", ">=": "<=", "<": ">", ">": "<" })[operator] as Expectation["operator"];

const inside = (node: Expression): Expression => (node.kind === "parenthesis" ? inside(node.inner) : node);

function isComparison(node: Expression): node is Comparison {
  return node.kind === "binary" && ["<=", ">=", "<", ">"].includes(node.operator);
}

function sayNoComparison(node: Expression, { draft: { findings } }: Asked): void {
  if (node.kind === "binary" && (node.operator === "==" || node.operator === "!=")) {
    findings.say(
      "wrong-kind",
      node.operatorSpan,
      `an expectation compares with \`<=\` or \`>=\`, found \`${node.operator}\``,
      {
        hint: "a computed number is never exactly another; write a band, `A <= x <= B`",
      },
    );
  } else if (node.kind === "binary" && (node.operator === "and" || node.operator === "or")) {
    findings.say(
      "wrong-kind",
      node.operatorSpan,
      `an expectation is exactly one comparison, found \`${node.operator}\``,
      {
        hint: "two conditions are two `expect` lines, each with its own verdict",
      },
    );
  } else {
    findings.say(
      "wrong-kind",
      node.span,
      "an expectation is a comparison, as in `natural_frequency(1) <= 6 Hz`",
    );
  }
}

/** Both sides are understood once, and held to each other. */
function checkSides(parts: readonly Part[], asked: Asked, c: ExpressionContext): void {
  const planned = new Map<Expression, PlannedExpression | undefined>();
  for (const { left, right } of parts) {
    for (const side of [left, right]) {
      if (!planned.has(side)) planned.set(side, planAnswerExpression(side, asked, { ...c, root: side }));
    }
  }
  for (const { left, right } of parts) {
    const [a, b] = [planned.get(left), planned.get(right)];
    if (a === undefined || b === undefined) continue;
    if (alike(left, asTyped(a), right, asTyped(b), { ...c, root: right })) continue;
    asked.expressions.set(left, null);
    asked.expressions.set(right, null);
  }
}

function asTyped({ code, kind, zero }: PlannedExpression): Typed {
  return zero ? { code, kind, zero } : { code, kind };
}

function marginOf(given: Given | undefined, { draft }: Asked): number | undefined {
  if (given === undefined) return undefined;
  const margin = planQuantity(given, "sliding", "margin", draft);
  return margin?.compute(draft.lets.frame);
}

function casesOf(given: Given | undefined, { draft }: Asked): readonly string[] | undefined {
  if (given === undefined) return undefined;
  const names: string[] = [];
  const cases = draft.statements
    .filter(({ node }) => node.keyword.text === "case")
    .map((each) => each.name ?? "");
  for (const item of given.items) {
    const name = nameItem(item);
    if (name !== undefined && cases.includes(name.text)) names.push(name.text);
    else if (item.kind === "text" && item.text === "as written") names.push(item.text);
    else if (name === undefined) {
      draft.findings.say("wrong-kind", item.span, "`cases` takes names of cases", {
        hint: cases.length > 0 ? `there are ${cases.join(", ")}` : "a case is defined by `case NAME`",
      });
    } else {
      const entity = draft.main.names.get(name.text);
      if (entity === undefined)
        sayUnknownName(name, cases, draft.findings, "a case is defined by `case NAME`");
      else
        draft.findings.say(
          "wrong-kind",
          name.span,
          `\`${name.text}\` is ${aKeyword(entity.keyword)}, no case`,
        );
    }
  }
  return names;
}

/** `nominal`, `worst_case`, or the share of draws that must hold. */
function toleranceOf(given: Given | undefined, { draft }: Asked): Expectation["tolerance"] {
  if (given === undefined) return "nominal";
  const word = nameItem(given.items[0])?.text;
  if (given.items.length === 1 && (word === "nominal" || word === "worst_case")) return word;
  const value = singleValue(given, draft.findings);
  const literal = value && literalOf(value.expression);
  const share = literal && shareOf(literal);
  if (share !== undefined && share > 0 && share <= 1) return { share };
  if (value === undefined) return "nominal";
  const near = word?.startsWith("w") ? "worst_case" : word?.startsWith("n") ? "nominal" : undefined;
  draft.findings.say(
    "wrong-kind",
    value.span,
    "`tolerance` is `nominal`, `worst_case` or a share of draws, as `99 %`",
    {
      fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, value.span, near)],
    },
  );
  return "nominal";
}

function shareOf({
  value,
  unit,
}: {
  readonly value: number;
  readonly unit?: { readonly text: string };
}): number | undefined {
  if (unit === undefined) return value;
  return unit.text === "%" ? value / 100 : undefined;
}
