import { visit } from "../../syntax/expression-nodes.ts";
import type { CallNode, Expression, Item } from "../../syntax/tree.ts";
import { functionOf } from "../../vocabulary/functions.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";

/** A helper function given numbers outside the range in which its formula holds. */
export const outsideValidity: Rule = {
  code: "outside-validity",
  cost: "text",
  check(context) {
    const found: Finding[] = [];
    const look = (node: Expression): void => {
      if (node.kind === "call") found.push(...finding(context, node));
    };
    for (const statement of context.model.tree.statements) {
      for (const item of statement.value ?? []) lookInto(item, look);
      for (const { items } of statement.details) for (const item of items) lookInto(item, look);
    }
    return found;
  },
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

function lookInto(item: Item, look: (node: Expression) => void): void {
  if (item.kind === "value") visit(item.expression, look);
  else if (item.kind !== "text") {
    visit(item.kind === "range" ? item.from : item.value.expression, look);
    visit(item.kind === "range" ? item.to : item.at, look);
  }
}
