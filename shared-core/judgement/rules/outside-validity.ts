import { nodesOf } from "../../syntax/expression-nodes.ts";
import type { CallNode, Expression, Item, StatementNode } from "../../syntax/tree.ts";
import { functionOf } from "../../vocabulary/functions.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";

/** A helper function given numbers outside the range in which its formula holds. */
export const outsideValidity: Rule = {
  code: "outside-validity",
  cost: "text",
  check: (context) =>
    context.model.tree.statements.flatMap((statement) =>
      expressionsOf(statement).flatMap((expression) =>
        [...nodesOf(expression)].flatMap((node) => (node.kind === "call" ? finding(context, node) : [])),
      ),
    ),
};

function finding(context: RuleContext, call: CallNode): readonly Finding[] {
  const described = functionOf(call.callee.text);
  if (described?.outside === undefined) return [];
  const numbers = argumentsOf(context, call, described.parameters);
  const why = numbers === undefined ? undefined : described.outside(numbers);
  if (why === undefined) return [];
  return [
    {
      span: call.span,
      message: `${call.callee.text} is outside the range in which its formula holds: ${why}`,
      hint: described.validity === undefined ? undefined : `it holds for ${described.validity}`,
    },
  ];
}

/** SI values in the order of the parameters; undefined where one cannot be known here, as inside a kit. */
function argumentsOf(
  { evaluate }: RuleContext,
  call: CallNode,
  parameters: readonly { readonly name: string; readonly standard?: number; readonly named?: boolean }[],
): readonly number[] | undefined {
  const positional = [...call.positional];
  const numbers: number[] = [];
  for (const { name, standard, named } of parameters) {
    const given = call.named.find((argument) => argument.name.text === name)?.value;
    const expression = given ?? (named ? undefined : positional.shift());
    const value = expression === undefined ? undefined : evaluate(expression);
    if (value !== undefined && !value.ok) return undefined;
    const number = value?.value.value ?? standard;
    if (number === undefined) return undefined;
    numbers.push(number);
  }
  return numbers;
}

function expressionsOf(statement: StatementNode): readonly Expression[] {
  const items = [...(statement.value ?? []), ...statement.details.flatMap((detail) => detail.items)];
  return items.flatMap(expressionsOfItem);
}

function expressionsOfItem(item: Item): readonly Expression[] {
  switch (item.kind) {
    case "value":
      return [item.expression];
    case "range":
      return [item.from, item.to];
    case "at":
      return [item.value.expression, item.at];
    case "text":
      return [];
  }
}
