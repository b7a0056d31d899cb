/**
 * Where in a value the cursor stands, from the words in front of it. It reads words, not the tree, because what is
 * being typed is broken as a rule.
 */

import type { Span } from "../text/span.ts";
import { functionOf, type ParameterDescription } from "../vocabulary/functions.ts";
import { isUnitWord, type Word } from "./complete-line.ts";

/** What comes next in a value. */
export interface ValuePlace {
  /** An operand, what stands behind one, a name behind a dot, or the unit behind `as`. */
  readonly next: "operand" | "operator" | "member" | "unit";
  /** The innermost call that is open, with the argument that is being typed. */
  readonly call?: OpenCall;
  /** Names in front of the dot, for a member. */
  readonly path: readonly string[];
  /** Text whose kind the operand has to have: the other side of a sum, a comparison or a range. */
  readonly sibling?: Span;
  /** True in a product, where an operand may have any kind. */
  readonly inProduct: boolean;
  /** Where a unit for all of a tuple may stand. */
  readonly behindTuple: boolean;
  /** What part of `VALUE +/- TOLERANCE within A to B`, `X at Y` it is. */
  readonly part: "value" | "tolerance" | "within" | "at";
  /** Items of the list in front, separated by commas, as they are written. */
  readonly listed: readonly string[];
  /** Words of the item in front of the cursor. */
  readonly itemWords: readonly string[];
}

export interface OpenCall {
  readonly callee: string;
  readonly index: number;
  readonly argument?: string;
  /** Where its first argument starts; the texts of the arguments in front. */
  readonly before: readonly string[];
  /** Names of those that were given by name. */
  readonly named: readonly string[];
}

interface Frame {
  readonly kind: "root" | "call" | "group";
  readonly callee?: string;
  index: number;
  argument?: string;
  before: string[];
  named: string[];
  start: number;
  operand: boolean;
  product: boolean;
  sibling?: Span;
  part: ValuePlace["part"];
}

/** Reads the words of a value; `start` is where the value begins, `text` the whole text. */
export function valuePlace(words: readonly Word[], start: number, text: string): ValuePlace {
  return new ValueReader(words, start, text).run();
}

/** The parameter of a function that an open call is at; undefined for a function that the language does not know. */
export function parameterOf(call: OpenCall): ParameterDescription | undefined {
  const parameters = functionOf(call.callee)?.parameters ?? [];
  if (call.argument !== undefined) return parameters.find(({ name }) => name === call.argument);
  const parameter = parameters[call.index];
  if (parameter && !parameter.named) return parameter;
  const last = parameters.at(-1);
  return last?.repeated ? last : undefined;
}

class ValueReader {
  readonly #frames: Frame[];
  readonly #listed: string[] = [];
  #unitWanted = false;
  #value: Span | undefined;
  /** True right behind the parenthesis of a tuple. */
  #behindTuple = false;
  #itemStart: number;
  #index = 0;
  readonly #words: readonly Word[];
  readonly #text: string;

  constructor(words: readonly Word[], start: number, text: string) {
    this.#words = words;
    this.#text = text;
    this.#itemStart = start;
    this.#frames = [frame("root", start)];
  }

  run(): ValuePlace {
    for (; this.#index < this.#words.length; this.#index++) this.#word(this.#words[this.#index]);
    const top = this.#top();
    const last = this.#words.at(-1);
    const path = last?.text === "." ? this.#pathBefore() : [];
    const next =
      path.length > 0 ? "member" : this.#unitWanted ? "unit" : top.operand ? "operand" : "operator";
    const group = this.#frames.findLastIndex(({ kind }) => kind !== "group");
    const inside = this.#frames.slice(group);
    const holder = inside.findLast(({ sibling, product }) => sibling !== undefined || product);
    const call = this.#frames[group];
    return {
      next,
      call: call.kind === "call" ? openCall(call) : undefined,
      path,
      sibling: holder?.product ? undefined : holder?.sibling,
      behindTuple: this.#behindTuple,
      inProduct: inside.some(({ product }) => product),
      part: this.#frames[0].part,
      listed: this.#listed,
      itemWords: this.#words.filter(({ start }) => start >= this.#itemStart).map(({ text }) => text),
    };
  }

  #top(): Frame {
    return this.#frames[this.#frames.length - 1];
  }

  #word(word: Word): void {
    this.#behindTuple = false;
    if (isUnitWord(word)) {
      this.#unitWanted = false;
      return;
    }
    const top = this.#top();
    if (word.kind === "name") this.#name(word, top);
    else if (word.kind === "operator") this.#operator(word, top);
    else top.operand = false;
  }

  #name(word: Word, top: Frame): void {
    switch (word.text) {
      case "from":
      case "to":
        // Both ends of a range have the kind of the value in front of it.
        if (!top.operand && top.part !== "within") top.sibling = this.#since(top);
        this.#restart(top, word.end, top.sibling);
        break;
      case "at":
      case "within":
        if (top.operand) break;
        top.part = word.text;
        this.#restart(top, word.end, word.text === "within" ? this.#valueOf(top) : undefined);
        break;
      case "and":
      case "or":
      case "not":
        this.#restart(top, word.end);
        break;
      case "as":
        this.#unitWanted = !top.operand;
        break;
      default:
        top.operand = false;
    }
  }

  #operator(word: Word, top: Frame): void {
    switch (word.text) {
      case "(":
        this.#open(word, top);
        break;
      case ")":
        this.#close();
        this.#top().operand = false;
        break;
      case ",":
        this.#comma(word, top);
        break;
      case ":":
        top.argument = this.#words[this.#index - 1]?.text;
        this.#restart(top, word.end);
        break;
      case "+/-":
      case "±":
        top.part = "tolerance";
        this.#restart(top, word.end, this.#valueOf(top));
        break;
      case "+":
      case "-":
        if (!top.operand) top.sibling = this.#since(top);
        top.product = false;
        top.operand = true;
        break;
      case ".":
      case "%":
        break;
      default:
        this.#tight(word, top);
    }
  }

  /** Products, and comparisons, behind which the other side has to be like the first. */
  #tight(word: Word, top: Frame): void {
    if (/^[*/·^]$/.test(word.text)) {
      top.product = true;
      top.operand = true;
    } else {
      this.#restart(top, word.end, this.#since(top));
    }
  }

  #open(word: Word, top: Frame): void {
    const before = this.#words[this.#index - 1];
    const isCall = before?.kind === "name" && before.end === word.start && !top.operand;
    top.operand = false;
    this.#frames.push(frame(isCall ? "call" : "group", word.end, isCall ? before.text : undefined));
  }

  #close(): void {
    const closed = this.#frames.length > 1 ? this.#frames.pop() : undefined;
    this.#behindTuple = closed?.kind === "group" && closed.index > 0;
  }

  #comma(word: Word, top: Frame): void {
    const text = this.#text.slice(top.start, word.start).trim();
    if (top.kind === "root") {
      this.#listed.push(this.#text.slice(this.#itemStart, word.start).trim());
      this.#itemStart = word.end;
      this.#value = undefined;
      top.part = "value";
    } else top.before.push(text);
    if (top.argument !== undefined) top.named.push(top.argument);
    top.index++;
    top.argument = undefined;
    this.#restart(top, word.end);
  }

  #restart(top: Frame, start: number, sibling?: Span): void {
    top.start = start;
    top.sibling = sibling;
    top.operand = true;
    top.product = false;
  }

  #since(top: Frame): Span {
    const before = this.#words[this.#index - 1];
    return { start: top.start, end: before?.end ?? top.start };
  }

  /** The value in front of its tolerance and range. */
  #valueOf(top: Frame): Span {
    this.#value ??= this.#since(top);
    return this.#value;
  }

  #pathBefore(): string[] {
    const names: string[] = [];
    for (let i = this.#words.length - 1; i > 0; i -= 2) {
      if (this.#words[i].text !== "." || this.#words[i - 1].kind !== "name") break;
      names.unshift(this.#words[i - 1].text);
    }
    return names;
  }
}

function frame(kind: Frame["kind"], start: number, callee?: string): Frame {
  return {
    kind,
    callee,
    index: 0,
    before: [],
    named: [],
    start,
    operand: true,
    product: false,
    part: "value",
  };
}

const openCall = ({ callee, index, argument, before, named }: Frame): OpenCall => ({
  callee: callee ?? "",
  index,
  argument,
  before,
  named,
});
