import type { QuantityRef } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { CallNode, Expression } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import { planAnswerExpression } from "./answer-calls.ts";
import { type Code, children, compile, type Frame, numberFault } from "./code.ts";
import { Findings } from "./findings.ts";
import type { AnswerArgument, AnswerArguments, AnswerFunction, Instance } from "./model.ts";
import type { PlannedArgument, PlannedCall, PlannedExpression, PlannedQuantity } from "./plan.ts";

/** What evaluating needs of an instance beyond its interface. */
interface Put extends Instance {
  readonly frame: Frame;
  quantity(of: PlannedQuantity): QuantityRef;
}

/**
 * Value of an expression in an instance, SI with rates in Hz: a side of an expectation, or any other expression
 * of the model's file. Calls of answer functions are given to `answer`, inner ones first. Fails with the reason of
 * the first call that fails, or where the expression has an error or no finite value.
 */
export function evaluateExpression(
  instance: Instance,
  expression: Expression,
  answer: AnswerFunction,
): Outcome<Quantity> {
  const put = instance as Put;
  const planned = plannedFor(expression, put);
  if (planned === undefined) return fail("it has an error, which is said at its place");
  const answers: number[] = [];
  for (const call of planned.calls) {
    const args = argumentsOf(call, put, answers);
    if (!args.ok) return fail(args.reason);
    const value = answer(call.call, args.value);
    if (!value.ok) return fail(value.reason);
    answers.push(value.value.value);
  }
  const code = withAnswers(planned.code, answers);
  const value = compile(code)(put.frame);
  if (Number.isFinite(value)) return succeed({ ...planned.kind, value });
  return fail(numberFault(code, put.frame)?.message ?? "it is no finite number");
}

/** Understood with the model; any other expression is understood now, and what is wrong in it is not said. */
function plannedFor(expression: Expression, put: Put): PlannedExpression | undefined {
  const { plan } = put.model;
  const known = plan.expressions.get(expression);
  if (known !== undefined) return known ?? undefined;
  const quiet = new Findings();
  const asked = { ...plan.asked, draft: { ...plan.asked.draft, findings: quiet } };
  return planAnswerExpression(expression, asked, { ...plan.numbers, findings: quiet, root: expression });
}

function argumentsOf(call: PlannedCall, put: Put, answers: readonly number[]): Outcome<AnswerArguments> {
  const args: Record<string, AnswerArgument> = {};
  for (const [name, planned] of Object.entries(call.args)) {
    const argument = argumentOf(planned, call.call, put, answers);
    if (!argument.ok) return fail(argument.reason);
    args[name] = argument.value;
  }
  return succeed(args);
}

function argumentOf(
  planned: PlannedArgument,
  call: CallNode,
  put: Put,
  answers: readonly number[],
): Outcome<AnswerArgument> {
  const value = (code: Code): number => compile(withAnswers(code, answers))(put.frame);
  switch (planned.is) {
    case "number":
      return finite({ ...planned.kind, value: value(planned.code) }, call, (quantity) => ({
        is: "number",
        quantity,
      }));
    case "range": {
      const [from, to] = [planned.from, planned.to].map(({ code, kind }) => ({
        ...kind,
        value: value(code),
      }));
      return succeed({ is: "range", from, to });
    }
    case "band":
      return bandOf(planned.drive, put);
    case "list":
      return succeed({ is: "list", values: planned.codes.map(value) });
    case "ask": {
      const ask = put.asks.find((each) => each.name === planned.name);
      return ask === undefined
        ? fail(`${planned.name} has an error, which is said at its place`)
        : succeed({ is: "ask", ask });
    }
    case "series":
      return succeed({ is: "series", quantity: put.quantity(planned.quantity) });
    case "element": {
      const elements = planned.elements.map((name) => put.model.plan.elements.get(name) ?? -1);
      return succeed({ is: "element", name: planned.name, elements, force: put.quantity(planned.force) });
    }
    case "limit": {
      const limit = put.limits.get(planned.name);
      return limit === undefined
        ? fail(`${planned.name} has an error, which is said at its place`)
        : succeed({ is: "limit", limit });
    }
    default:
      return succeed(planned);
  }
}

function finite(
  quantity: Quantity,
  call: CallNode,
  make: (quantity: Quantity) => AnswerArgument,
): Outcome<AnswerArgument> {
  if (Number.isFinite(quantity.value)) return succeed(make(quantity));
  return fail(`an argument of ${call.callee.text} is no finite number`);
}

/** The band of rates that a drive runs through. */
function bandOf(name: string, put: Put): Outcome<AnswerArgument> {
  const drive = put.assembly.drives.find((each) => each.name === name);
  if (drive?.bandHz === undefined) return fail(`${name} has no rate and no range of rates`);
  const [from, to] = drive.bandHz.map((value) => ({ dimension: PER_TIME, rate: true, value }));
  return succeed({ is: "range", from, to });
}

const PER_TIME = [0, 0, -1, 0, 0, 0, 0] as const;

/** The answers in the place of their calls. */
function withAnswers(code: Code, answers: readonly number[]): Code {
  if (code.op === "answer")
    return { op: "constant", value: answers[code.index] ?? Number.NaN, span: code.span };
  if (!children(code).some(holdsAnswer)) return code;
  const inside = (child: Code): Code => withAnswers(child, answers);
  switch (code.op) {
    case "negate":
    case "not":
      return { ...code, a: inside(code.a) };
    case "if":
      return { ...code, condition: inside(code.condition), yes: inside(code.yes), no: inside(code.no) };
    case "call":
      return { ...code, args: code.args.map(inside) };
    case "constant":
    case "slot":
      return code;
    default:
      return { ...code, a: inside(code.a), b: inside(code.b) };
  }
}

const holdsAnswer = (code: Code): boolean => code.op === "answer" || children(code).some(holdsAnswer);
