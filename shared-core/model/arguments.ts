import type { CallNode, Expression } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import { type FunctionDescription, type ParameterDescription, signature } from "../vocabulary/functions.ts";
import { insertFix, replaceFix } from "./findings.ts";
import type { ExpressionContext } from "./typed.ts";

/** The arguments of one parameter: none where it is left out, several where it is repeated. */
export interface Bound {
  readonly parameter: ParameterDescription;
  readonly nodes: readonly Expression[];
}

/** Brings the arguments of a call to the parameters of its function; undefined where they do not match. */
export function bindArguments(
  node: CallNode,
  fn: FunctionDescription,
  c: Pick<ExpressionContext, "findings">,
): readonly Bound[] | undefined {
  const named = namedArguments(node, fn, c);
  if (named === undefined) return undefined;
  const bound: Bound[] = [];
  let next = 0;
  for (const parameter of fn.parameters) {
    const byName = named.get(parameter.name);
    const nodes: Expression[] = byName === undefined ? [] : [byName];
    if (byName === undefined && parameter.repeated) {
      nodes.push(...node.positional.slice(next));
      next = node.positional.length;
    } else if (byName === undefined && next < node.positional.length && !parameter.named) {
      nodes.push(node.positional[next++]);
    }
    bound.push({ parameter, nodes });
  }
  if (next < node.positional.length) return tooMany(node, fn, node.positional[next], bound, c);
  const missing = bound.find(({ parameter, nodes }) => nodes.length === 0 && !parameter.optional);
  if (missing !== undefined) {
    const needs = missing.parameter.named ? `${missing.parameter.name}: …` : missing.parameter.name;
    c.findings.say(
      "missing-detail",
      node.span,
      `\`${fn.name}\` needs its ${missing.parameter.says}, \`${needs}\``,
      {
        hint: `written: ${signature(fn)}, as in \`${fn.example}\``,
      },
    );
    return undefined;
  }
  return bound;
}

function namedArguments(
  node: CallNode,
  fn: FunctionDescription,
  c: Pick<ExpressionContext, "findings">,
): Map<string, Expression> | undefined {
  const named = new Map<string, Expression>();
  for (const { name, value } of node.named) {
    const parameter = fn.parameters.find((each) => each.name === name.text);
    if (parameter !== undefined && !named.has(name.text)) {
      named.set(name.text, value);
      continue;
    }
    const names = fn.parameters.map((each) => each.name);
    const near = nearest(name.text, names);
    const fixes = near === undefined ? [] : [replaceFix(`Write \`${near}\``, name.span, near)];
    const message =
      parameter === undefined
        ? `\`${fn.name}\` has no argument \`${name.text}\``
        : `\`${name.text}\` is given twice`;
    c.findings.say("wrong-kind", name.span, message, { hint: `written: ${signature(fn)}`, fixes });
    return undefined;
  }
  return named;
}

function tooMany(
  node: CallNode,
  fn: FunctionDescription,
  first: Expression,
  bound: readonly Bound[],
  c: Pick<ExpressionContext, "findings">,
): undefined {
  const unnamed = bound.find(({ parameter, nodes }) => parameter.named && nodes.length === 0)?.parameter;
  const fixes =
    unnamed === undefined
      ? []
      : [insertFix(`Write \`${unnamed.name}: …\``, first.span.start, `${unnamed.name}: `)];
  const count = fn.parameters.filter((parameter) => !parameter.named).length;
  const takes = count === 0 ? "no arguments" : count === 1 ? "1 argument" : `${count} arguments`;
  const message =
    unnamed === undefined
      ? `\`${fn.name}\` takes ${takes}, here it has ${node.positional.length}`
      : `the ${unnamed.says} of \`${fn.name}\` is written with its name, \`${unnamed.name}: …\``;
  c.findings.say("wrong-kind", first.span, message, { hint: `written: ${signature(fn)}`, fixes });
  return undefined;
}
