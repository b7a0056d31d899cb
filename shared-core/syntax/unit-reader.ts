import { span } from "../text/span.ts";
import type { Cursor } from "./cursor.ts";
import { ROLE, type UnitNode } from "./tree.ts";
import { VALUE_WORDS } from "./words.ts";

/**
 * Reads the unit behind a number or a tuple, or nothing. It starts (blanks allowed) with a name of the unit
 * table, also behind `(`, or with `1/`; it runs as far as there is no blank and each next factor is in the table.
 */
export function unitBehind(c: Cursor): UnitNode | undefined {
  return startsUnit(c) ? unitRun(c) : undefined;
}

/** Reads the unit behind `as`; says what is wrong when there is none. */
export function requiredUnit(c: Cursor): UnitNode | undefined {
  const unit = unitBehind(c);
  if (!unit && c.kind === "name" && !VALUE_WORDS.has(c.word)) unknownUnit(c);
  else if (!unit) c.expected("a unit, as in `x as rad/s`");
  return unit;
}

export function unknownUnit(c: Cursor): void {
  const near = c.state.options.nearestUnit?.(c.word);
  c.failAt(c.span, `\`${c.word}\` is not a unit`, {
    code: "unknown-unit",
    fixes: near ? [{ title: `Write \`${near}\``, edits: [{ span: c.span, text: near }], safe: false }] : [],
  });
}

/** Whether the current token may be the name of a unit here: not a call and not the start of a path. */
export function isUnitHere(c: Cursor): boolean {
  if (c.kind !== "name") return c.word === "%" && c.state.isUnit("%");
  if (VALUE_WORDS.has(c.word) || !c.state.isUnit(c.word)) return false;
  const next = c.tokenAhead(1);
  if (!next || next.offset !== c.offset + c.word.length) return true;
  const sign = c.state.text[next.offset];
  return sign !== "(" && sign !== ".";
}

type Factor = UnitNode["factors"][number];

/** Deeper parentheses in a unit are no unit anybody wrote. */
const DEEPEST_UNIT = 8;
const LARGEST_POWER = 99;

function startsUnit(c: Cursor): boolean {
  if (c.kind === "number") return c.word === "1" && c.wordAhead(1) === "/";
  return c.word === "(" || isUnitHere(c);
}

function unitRun(c: Cursor): UnitNode | undefined {
  const start = c.offset;
  const before = c.mark();
  const factors: Factor[] = [];
  if (!product(c, 1, factors, 0)) {
    c.reset(before);
    return undefined;
  }
  const end = c.failed ? start : c.taken;
  for (let i = before.at; i < c.index && !c.failed; i++) {
    if (c.state.tokens[i].offset < end) c.state.roles[i] = ROLE.unit;
  }
  return { kind: "unit", span: span(start, end), text: c.state.text.slice(start, end), factors };
}

/** FACTOR { ("*" | "·" | "/") FACTOR }; stops before an operator whose factor is not a unit. */
function product(c: Cursor, sign: number, into: Factor[], depth: number): boolean {
  const needsMore = c.kind === "number";
  if (!factor(c, sign, into, depth)) return false;
  let count = 1;
  while (c.glued && (c.word === "*" || c.word === "·" || c.word === "/")) {
    const mark = c.mark();
    const power = c.word === "/" ? -sign : sign;
    c.take();
    if (!c.glued || !factor(c, power, into, depth)) {
      c.reset(mark);
      break;
    }
    count++;
  }
  // `1` alone is a number, not a unit.
  return !needsMore || count > 1;
}

/** (NAME | "(" UNIT ")") ["^" ["-"] INTEGER] | "1"; leaves `into` as it was when there is none. */
function factor(c: Cursor, sign: number, into: Factor[], depth: number): boolean {
  if (c.word === "1") {
    c.take();
    return true;
  }
  const length = into.length;
  if (c.word === "(") {
    if (depth < DEEPEST_UNIT && group(c, sign, into, depth)) return exponent(c, into, length);
    into.length = length;
    return false;
  }
  if (!isUnitHere(c)) return false;
  into.push({ name: c.word, power: sign, span: c.span });
  c.take();
  return exponent(c, into, length);
}

function group(c: Cursor, sign: number, into: Factor[], depth: number): boolean {
  c.take();
  if (!c.glued || !product(c, sign, into, depth + 1) || !c.glued || c.word !== ")") return false;
  c.take();
  return true;
}

/** Raises the factors from `first` on to the power written behind them. */
function exponent(c: Cursor, into: Factor[], first: number): boolean {
  if (!c.glued || c.word !== "^") return true;
  const next = c.tokenAhead(1);
  if (!next || next.offset !== c.offset + 1) return true;
  c.take();
  const start = c.offset;
  const negative = c.accept("-");
  const power = Number(c.word);
  const whole = c.kind === "number" && /^\d+$/.test(c.word) && power <= LARGEST_POWER;
  if (!whole || (negative && !c.glued)) {
    const place = span(start, Math.max(start + 1, c.span.end));
    const hint = "a power of the whole number is written behind parentheses, (3 m)^n";
    c.failAt(place, "the power of a unit is a whole number, as in `m^2`", { hint });
    return true;
  }
  c.take();
  for (let i = first; i < into.length; i++) {
    into[i] = { ...into[i], power: into[i].power * (negative ? -power : power) };
  }
  return true;
}
