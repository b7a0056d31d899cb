import type { CallNode } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import { likelyUnits } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import {
  argumentKinds,
  FUNCTIONS,
  type FunctionDescription,
  functionOf,
  type ParameterDescription,
  resultKind,
} from "../vocabulary/functions.ts";
import { wordsOf } from "../vocabulary/measures.ts";
import { type Bound, bindArguments } from "./arguments.ts";
import { type Code, compile, constant, reads } from "./code.ts";
import { alike, check, checkLogical } from "./expression.ts";
import { type Details, replaceFix } from "./findings.ts";
import { suited } from "./fit.ts";
import { sayMixture } from "./product.ts";
import { type Checked, type ExpressionContext, type Typed, textOf, type Wanted } from "./typed.ts";

/** Understands a call: a function of numbers, a helper of the trade, or where they may stand an answer. */
export function checkCall(node: CallNode, c: ExpressionContext, wanted?: Wanted): Checked {
  const name = node.callee.text;
  if (name === "if") return checkIf(node, c, wanted);
  const fn = functionOf(name);
  if (fn === undefined) return unknownFunction(node, c);
  if (fn.group !== "answer") return checkFunction(node, fn, c, wanted);
  if (c.answers !== undefined) return c.answers.check(node, fn, c);
  c.findings.say("wrong-kind", node.callee.span, `\`${name}\` is computed from the answers`, {
    hint: "it can stand in `expect`; the numbers of the model are known before anything is answered",
  });
  return undefined;
}

function unknownFunction(node: CallNode, c: ExpressionContext): undefined {
  const name = node.callee.text;
  const say = (message: string, details: Details) =>
    c.findings.say("unknown-name", node.callee.span, message, details);
  if (name === "log") {
    const fixes = ["ln", "log10"].map((each) => replaceFix(`Write \`${each}\``, node.callee.span, each));
    say("`log` leaves its base open", {
      hint: "`ln` is the natural logarithm, `log10` that to base 10",
      fixes,
    });
    return undefined;
  }
  if (c.scope.holdsNumber(name)) {
    const text = `${name} * ${textOf(c, { start: node.callee.span.end, end: node.span.end }).trim()}`;
    const fixes = [replaceFix(`Write \`${text}\``, node.span, text)];
    c.findings.say("wrong-kind", node.callee.span, `\`${name}\` is a number, not a function`, { fixes });
    return undefined;
  }
  const known = FUNCTIONS.filter((fn) => fn.group !== "answer" || c.answers !== undefined);
  const near = nearest(name, ["if", ...known.map((fn) => fn.name)]);
  const fixes = near === undefined ? [] : [replaceFix(`Write \`${near}\``, node.callee.span, near)];
  say(`there is no function \`${name}\``, { fixes });
  return undefined;
}

function checkIf(node: CallNode, c: ExpressionContext, wanted: Wanted | undefined): Checked {
  if (node.positional.length !== 3 || node.named.length > 0) {
    const count = node.positional.length + node.named.length;
    c.findings.say("wrong-kind", node.span, `\`if\` takes a condition and two values, here it has ${count}`, {
      hint: "as in `if(speed > 900 rpm, 2 kN, 1 kN)`",
    });
    return undefined;
  }
  const [conditionNode, thenNode, otherwiseNode] = node.positional;
  const single = wanted?.kinds.length === 1 ? wanted : undefined;
  const condition = checkLogical(conditionNode, c);
  const then = check(thenNode, c, single);
  const otherwise = check(otherwiseNode, c, single);
  if (condition === undefined || then === undefined || otherwise === undefined) return undefined;
  if (!alike(thenNode, then, otherwiseNode, otherwise, c)) return undefined;
  const [a, b] = [then.code, otherwise.code];
  const code: Code = { op: "if", condition: condition.code, yes: a, no: b, span: node.span };
  return { code, kind: then.zero ? otherwise.kind : then.kind };
}

function checkFunction(
  node: CallNode,
  fn: FunctionDescription,
  c: ExpressionContext,
  wanted: Wanted | undefined,
): Checked {
  const bound = bindArguments(node, fn, c);
  if (bound === undefined) return undefined;
  const turning = fn.name === "sin" || fn.name === "cos";
  const handedDown = fn.result.is === "same" && wanted?.kinds.length === 1 ? wanted : undefined;
  const inside = { ...c, turning };
  const checked = bound.map((each) =>
    each.nodes.map((arg) => check(arg, inside, argumentWanted(each.parameter, fn) ?? handedDown)),
  );
  if (checked.some((args) => args.includes(undefined))) return undefined;
  const typed = checked as Typed[][];
  if (!areNumbers(bound, typed, c) || !areAlike(bound, typed, fn, c)) return undefined;
  if (fn.result.is === "root" && typed[0][0].kind.rate) {
    sayMixture(node, bound[0].nodes[0], typed[0][0], c);
    return undefined;
  }
  const leading = typed.map((args) => (args.find((arg) => !arg.zero) ?? args[0])?.kind);
  const kind = resultKind(fn, leading as Kind[]);
  if (kind === undefined) return undefined;
  const code = callCode(node, fn, bound, typed);
  sayOutside(node, fn, code, c);
  return { code, kind };
}

/** What a number argument wants; undefined where any kind will do. */
export function argumentWanted(parameter: ParameterDescription, fn: FunctionDescription): Wanted | undefined {
  const { content } = parameter;
  if (content.is !== "number" || content.measure === "any") return undefined;
  const kinds = argumentKinds(content);
  if (kinds.length === 0) return undefined;
  const turns = fn.name === "sin" || fn.name === "cos";
  const hint = turns
    ? `\`${fn.name}\` takes an angle, or a rate times a time: one cycle is one turn`
    : `\`${fn.name}\` takes ${parameter.says}`;
  const units = kinds.flatMap((kind) => likelyUnits(kind).slice(0, kinds.length === 1 ? undefined : 1));
  const isBare = content.measure === "number";
  return { kinds, says: wordsOf(content.measure), units: isBare ? [] : units, hint };
}

function areNumbers(bound: readonly Bound[], typed: readonly Typed[][], c: ExpressionContext): boolean {
  return bound.every(({ nodes }, i) =>
    nodes.every((arg, k) => !typed[i][k].logical || suited(arg, typed[i][k], undefined, c) !== undefined),
  );
}

/** Arguments of any kind, and repeated ones, are of one kind. */
function areAlike(
  bound: readonly Bound[],
  typed: readonly Typed[][],
  fn: FunctionDescription,
  c: ExpressionContext,
): boolean {
  const free = bound.flatMap(({ parameter, nodes }, i) => {
    const any = parameter.content.is === "number" && parameter.content.measure === "any";
    return any || parameter.repeated ? nodes.map((arg, k) => ({ arg, typed: typed[i][k] })) : [];
  });
  if (fn.parameters.length === 1 && !fn.parameters[0].repeated) return true;
  return free.every((each, i) => i === 0 || alike(free[0].arg, free[0].typed, each.arg, each.typed, c));
}

function callCode(
  node: CallNode,
  fn: FunctionDescription,
  bound: readonly Bound[],
  typed: readonly Typed[][],
): Code {
  const args = bound.flatMap(({ parameter }, i) =>
    typed[i].length > 0 ? typed[i].map((arg) => arg.code) : [constant(parameter.standard ?? 0, node.span)],
  );
  const run = fn.evaluate ?? (() => Number.NaN);
  return { op: "call", name: fn.name, run, args, span: node.span };
}

/** A helper fed with numbers outside the range in which its formula holds. */
function sayOutside(node: CallNode, fn: FunctionDescription, code: Code, c: ExpressionContext): void {
  if (fn.outside === undefined || code.op !== "call") return;
  if (reads(code, (slot) => slot < 3)) return;
  const numbers = code.args.map((arg) => compile(arg)(c.nominal()));
  if (!numbers.every(Number.isFinite)) return;
  const why = fn.outside(numbers);
  if (why !== undefined)
    c.findings.say("outside-validity", node.span, `${fn.name}: ${why}`, { hint: fn.validity });
}
