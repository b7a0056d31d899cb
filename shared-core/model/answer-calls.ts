import type { CallNode, Expression, PathNode } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import type { Kind } from "../units/dimension.ts";
import { NUMBER, RATE } from "../units/quantity.ts";
import type { FunctionDescription, ParameterDescription } from "../vocabulary/functions.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { type Bound, bindArguments } from "./arguments.ts";
import { argumentWanted } from "./calls.ts";
import { sayUnknownName } from "./details.ts";
import { type Draft, sayNotYet } from "./draft.ts";
import { check } from "./expression.ts";
import { orList, replaceFix } from "./findings.ts";
import { literalOf } from "./fit.ts";
import { checkGlued } from "./glued.ts";
import { aKeyword } from "./names.ts";
import type { PlannedArgument, PlannedAsk, PlannedCall, PlannedExpression } from "./plan.ts";
import { membersOf, planSeries } from "./quantities.ts";
import { type AnswerCalls, type Checked, type ExpressionContext, type Wanted, wantedKind } from "./typed.ts";

/** What expectations may speak of. */
export interface Asked {
  readonly draft: Draft;
  readonly asks: ReadonlyMap<string, PlannedAsk>;
  readonly expressions: Map<Expression, PlannedExpression | null>;
}

const TIME = dimensionOf("time") ?? NUMBER;

/** Understands answer functions in one expression and keeps its calls, inner ones first. */
export class AnswerCallReader implements AnswerCalls {
  readonly calls: PlannedCall[] = [];

  constructor(readonly asked: Asked) {}

  check(call: CallNode, fn: FunctionDescription, c: ExpressionContext): Checked {
    const bound = bindArguments(call, fn, c);
    if (fn.notYet) {
      sayNotYet(this.asked.draft, call.callee.span, `\`${fn.name}\``);
      return undefined;
    }
    if (bound === undefined) return undefined;
    const args: Record<string, PlannedArgument> = {};
    let sound = true;
    for (const each of bound) {
      if (each.nodes.length === 0) continue;
      const argument = this.#argument(each, each.nodes[0], fn, args, c);
      if (argument === undefined) sound = false;
      else args[each.parameter.name] = argument;
    }
    const kind = sound ? this.#resultKind(fn, args) : undefined;
    if (kind === undefined) return undefined;
    const index = this.calls.length;
    this.calls.push({ call, args, kind });
    return { code: { op: "answer", index, span: call.span }, kind };
  }

  #argument(
    { parameter }: Bound,
    node: Expression,
    fn: FunctionDescription,
    args: Readonly<Record<string, PlannedArgument>>,
    c: ExpressionContext,
  ): PlannedArgument | undefined {
    const { content } = parameter;
    switch (content.is) {
      case "number":
        return this.#number(node, parameter, fn, args, c);
      case "range":
        return this.#range(node, c);
      case "list":
        return this.#list(node, c);
      case "ask":
        return this.#ask(node, content.kinds, fn, c);
      case "series":
        return this.#series(node);
      case "element":
        return this.#element(node, c);
      case "let":
        return this.#let(node, c);
      case "limit":
        return this.#limit(node, c);
      case "word":
        return this.#word(node, content.words, parameter, c);
      case "expression":
        return this.#expression(node, c);
      case "pendulum":
        return undefined;
    }
  }

  #number(
    node: Expression,
    parameter: ParameterDescription,
    fn: FunctionDescription,
    args: Readonly<Record<string, PlannedArgument>>,
    c: ExpressionContext,
  ): PlannedArgument | undefined {
    const wanted = argumentWanted(parameter, fn) ?? this.#wantedBy(parameter, args, node);
    const typed = check(node, { ...c, turning: false }, wanted);
    return typed && { is: "number", code: typed.code, kind: typed.kind };
  }

  /** `at` is a rate in a sweep and a time in a history; a band is a share or has the unit of the quantity. */
  #wantedBy(
    parameter: ParameterDescription,
    args: Readonly<Record<string, PlannedArgument>>,
    node: Expression,
  ): Wanted | undefined {
    const { ask } = args;
    if (parameter.name === "at" && ask?.is === "ask") {
      const isHistory = this.asked.asks.get(ask.name)?.kind === "history";
      return wantedKind(
        isHistory ? TIME : RATE,
        isHistory ? `\`${ask.name}\` runs in time` : `\`${ask.name}\` runs over frequency`,
      );
    }
    const kind = seriesKind(args.quantity);
    if (parameter.name !== "band" || kind === undefined) return undefined;
    const isShare = literalOf(node)?.unit?.text === "%" || isBare(node);
    return isShare ? wantedKind(NUMBER) : { ...wantedKind(kind), kinds: [kind, NUMBER] };
  }

  /** A rate, a range of rates, or the name of a drive that runs through one. */
  #range(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const wanted = wantedKind(RATE);
    if (node.kind === "range") {
      const [from, to] = [check(node.from, c, wanted), check(node.to, c, wanted)];
      return from && to && { is: "range", from, to };
    }
    const name = singleName(node);
    if (name !== undefined && this.asked.draft.driveByName.has(name)) return { is: "band", drive: name };
    if (name !== undefined && this.asked.draft.unsound.has(name)) return undefined;
    const typed = check(node, { ...c, turning: false }, wanted);
    return typed && { is: "number", code: typed.code, kind: typed.kind };
  }

  #list(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const items = node.kind === "tuple" ? node.items : node.kind === "parenthesis" ? [node.inner] : [node];
    const wanted = wantedKind(NUMBER);
    const typed = items.map((item) => check(item, { ...c, turning: false }, wanted));
    if (typed.some((each) => each === undefined)) return undefined;
    return { is: "list", codes: typed.flatMap((each) => each?.code ?? []) };
  }

  #ask(
    node: Expression,
    kinds: readonly string[],
    fn: FunctionDescription,
    c: ExpressionContext,
  ): PlannedArgument | undefined {
    const name = singleName(node);
    const { asks, draft } = this.asked;
    const fitting = [...asks.values()].filter((ask) => kinds.includes(ask.kind)).map((ask) => ask.name);
    const reads = `\`${fn.name}\` reads ${kinds.map((kind) => `a ${kind.replace("_", " ")}`).join(" or ")}`;
    if (name === undefined) {
      c.findings.say("wrong-kind", node.span, `expected the name of an ask; ${reads}`, {
        hint: fitting.length > 0 ? `there are ${fitting.join(", ")}` : undefined,
      });
      return undefined;
    }
    const ask = asks.get(name);
    const path = node as PathNode;
    if (ask === undefined) {
      const entity = draft.main.names.get(name);
      if (entity === undefined) {
        const hint =
          fitting.length > 0 ? `there are ${fitting.join(", ")}` : `${reads}, and the file asks for none`;
        sayUnknownName(path.names[0], fitting, c.findings, hint);
      } else if (!draft.unsound.has(name)) {
        c.findings.say("wrong-kind", node.span, `\`${name}\` is ${aKeyword(entity.keyword)}; ${reads}`);
      }
      return undefined;
    }
    if (kinds.includes(ask.kind)) return ask.resolve && { is: "ask", name };
    c.findings.say("wrong-kind", node.span, `\`${name}\` asks for ${ask.kind}; ${reads}`, {
      hint: fitting.length > 0 ? `there are ${fitting.join(", ")}` : undefined,
    });
    return undefined;
  }

  #series(node: Expression): PlannedArgument | undefined {
    const name = singleName(node);
    const { draft } = this.asked;
    if (name !== undefined && (draft.elements.has(name) || draft.main.names.get(name)?.keyword === "group")) {
      return this.#elementNamed(name, node);
    }
    const quantity = planSeries(node, draft);
    return quantity && { is: "series", quantity };
  }

  #element(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const name = singleName(node);
    const { draft } = this.asked;
    if (name === undefined) {
      c.findings.say("wrong-kind", node.span, "expected the name of a joining element or group");
      return undefined;
    }
    if (draft.elements.has(name) || draft.main.names.get(name)?.keyword === "group")
      return this.#elementNamed(name, node);
    const entity = draft.main.names.get(name);
    if (entity === undefined) sayUnknownName((node as PathNode).names[0], draft.elements.keys(), c.findings);
    else if (!draft.unsound.has(name)) {
      c.findings.say(
        "wrong-kind",
        node.span,
        `\`${name}\` is ${aKeyword(entity.keyword)}; expected a joining element or group`,
      );
    }
    return undefined;
  }

  #elementNamed(name: string, node: Expression): PlannedArgument | undefined {
    const { draft } = this.asked;
    const force = planSeries(node, draft, true);
    const members = draft.elements.has(name) ? [name] : membersOf(name, draft)?.map((member) => member.name);
    return force && members && { is: "element", name, elements: members, force };
  }

  #let(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const name = singleName(node);
    if (name !== undefined && c.scope.holdsNumber(name)) {
      const meaning = c.scope.find((node as PathNode).names[0]);
      return meaning?.is === "number" && meaning.typed ? { is: "let", name } : undefined;
    }
    if (name !== undefined && this.asked.draft.main.names.get(name) === undefined) {
      sayUnknownName((node as PathNode).names[0], c.scope.numberNames(), c.findings);
      return undefined;
    }
    c.findings.say("wrong-kind", node.span, "expected the name of a number that `let` defines", {
      hint: "give the number a name with `let`",
    });
    return undefined;
  }

  #limit(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const name = singleName(node);
    const { draft } = this.asked;
    const entity = name === undefined ? undefined : draft.main.names.get(name);
    if (name !== undefined && entity?.keyword === "limit") {
      return draft.limits.has(name) ? { is: "limit", name } : undefined;
    }
    if (name !== undefined && entity === undefined) {
      sayUnknownName((node as PathNode).names[0], draft.limits.keys(), c.findings);
    } else {
      c.findings.say("wrong-kind", node.span, "expected the name of a limit", {
        hint: "a limit is defined by `limit NAME = VALUE`, or with `rows`",
      });
    }
    return undefined;
  }

  #word(
    node: Expression,
    words: readonly string[],
    parameter: ParameterDescription,
    c: ExpressionContext,
  ): PlannedArgument | undefined {
    const name = singleName(node);
    if (name !== undefined && words.includes(name)) return { is: "word", word: name };
    const near = name === undefined ? undefined : nearest(name, words);
    c.findings.say("wrong-kind", node.span, `the ${parameter.name} is ${orList(words)}`, {
      fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, node.span, near)],
    });
    return undefined;
  }

  /** Understood by itself, since it is evaluated again with other numbers. */
  #expression(node: Expression, c: ExpressionContext): PlannedArgument | undefined {
    const planned = planAnswerExpression(node, this.asked, { ...c, root: node });
    return planned && { is: "expression", expression: node };
  }

  #resultKind(fn: FunctionDescription, args: Readonly<Record<string, PlannedArgument>>): Kind | undefined {
    const { result } = fn;
    if (result.is === "measure") {
      const element = Object.values(args).find((each) => each.is === "element");
      const motion =
        element?.is === "element"
          ? this.asked.draft.plannedByName.get(element.elements[0])?.motion
          : undefined;
      return dimensionOf(result.measure, result.motion ?? motion ?? "sliding");
    }
    if (result.is === "series") return seriesKind(args.quantity);
    if (result.is !== "place" || args.ask?.is !== "ask") return undefined;
    return this.asked.asks.get(args.ask.name)?.kind === "history" ? TIME : RATE;
  }
}

/** Understands an expression with answers in it, and keeps it under its node. */
export function planAnswerExpression(
  node: Expression,
  asked: Asked,
  c: ExpressionContext,
  wanted?: Wanted,
): PlannedExpression | undefined {
  const readers = new Map<Checked, AnswerCallReader>();
  const typed = checkGlued(node, c, wanted, (each, inner, wish) => {
    const answers = new AnswerCallReader(asked);
    const read = check(each, { ...inner, answers }, wish);
    readers.set(read, answers);
    return read;
  });
  const calls = readers.get(typed)?.calls ?? [];
  const planned = typed && { code: typed.code, kind: typed.kind, calls, zero: typed.zero };
  asked.expressions.set(node, planned ?? null);
  return planned;
}

function seriesKind(argument: PlannedArgument | undefined): Kind | undefined {
  if (argument?.is === "series") return argument.quantity.kind;
  return argument?.is === "element" ? argument.force.kind : undefined;
}

function singleName(node: Expression): string | undefined {
  return node.kind === "path" && node.names.length === 1 ? node.names[0].text : undefined;
}

const isBare = (node: Expression): boolean => {
  const literal = literalOf(node);
  return literal !== undefined && literal.unit === undefined;
};
