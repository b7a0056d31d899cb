import type { TimeFunction } from "../mechanics/assembly.ts";
import { type Code, children, compile, type Frame, VARIABLE_SLOTS } from "./code.ts";

/**
 * A law in t as a function of time. Its kinks are the times at which a condition, a size, a sign or the larger of
 * two changes over, where that can be solved exactly: where what is compared is linear in t. The frame is copied,
 * so that laws do not disturb each other.
 */
export function timeFunction(code: Code, frame: Frame): TimeFunction {
  const own = frame.slice();
  const run = compile(code);
  return {
    at(time) {
      own[VARIABLE_SLOTS.t] = time;
      return run(own);
    },
    kinks: kinksOf(code, own),
    fastestHz: fastestHz(code, own),
  };
}

/** `constant + slope * t`; undefined for what is not linear in t. */
type Line = { readonly constant: number; readonly slope: number } | undefined;

function lineOf(code: Code, frame: Frame): Line {
  switch (code.op) {
    case "constant":
      return { constant: code.value, slope: 0 };
    case "slot":
      return code.slot === VARIABLE_SLOTS.t
        ? { constant: 0, slope: 1 }
        : { constant: frame[code.slot], slope: 0 };
    case "negate": {
      const a = lineOf(code.a, frame);
      return a && { constant: -a.constant, slope: -a.slope };
    }
    case "add":
    case "subtract": {
      const [a, b] = [lineOf(code.a, frame), lineOf(code.b, frame)];
      const sign = code.op === "add" ? 1 : -1;
      return a && b && { constant: a.constant + sign * b.constant, slope: a.slope + sign * b.slope };
    }
    case "multiply":
    case "divide":
      return scaledLine(code.op, lineOf(code.a, frame), lineOf(code.b, frame));
    default:
      return fixedLine(code, frame);
  }
}

function scaledLine(op: "multiply" | "divide", a: Line, b: Line): Line {
  if (a === undefined || b === undefined) return undefined;
  if (b.slope === 0) {
    const factor = op === "multiply" ? b.constant : 1 / b.constant;
    return { constant: a.constant * factor, slope: a.slope * factor };
  }
  return op === "multiply" && a.slope === 0 ? scaledLine(op, b, a) : undefined;
}

/** Anything whose parts do not move with t. */
function fixedLine(code: Code, frame: Frame): Line {
  const parts = children(code).map((child) => lineOf(child, frame));
  const fixed = parts.every((part) => part !== undefined && part.slope === 0);
  return fixed ? { constant: compile(code)(frame), slope: 0 } : undefined;
}

function kinksOf(code: Code, frame: Frame): readonly number[] {
  const times = new Set<number>();
  walk(code, (node) => {
    for (const [a, b] of switchesOf(node)) {
      const [lineA, lineB] = [lineOf(a, frame), b && lineOf(b, frame)];
      if (lineA === undefined || (b !== undefined && lineB === undefined)) continue;
      const constant = lineA.constant - (lineB?.constant ?? 0);
      const slope = lineA.slope - (lineB?.slope ?? 0);
      const time = -constant / slope;
      if (slope !== 0 && Number.isFinite(time) && time > 0) times.add(time);
    }
  });
  return [...times].sort((x, y) => x - y);
}

/** Pairs whose difference changes sign where the node has a kink; a single one against zero. */
function switchesOf(node: Code): readonly (readonly [Code, Code?])[] {
  switch (node.op) {
    case "less":
    case "less-equal":
    case "equal":
    case "unequal":
      return [[node.a, node.b]];
    case "call":
      if (node.name === "abs" || node.name === "sign") return [[node.args[0]]];
      if (node.name === "min" || node.name === "max") return pairs(node.args);
      return [];
    default:
      return [];
  }
}

const pairs = (codes: readonly Code[]): (readonly [Code, Code])[] =>
  codes.flatMap((a, i) => codes.slice(i + 1).map((b) => [a, b] as const));

function fastestHz(code: Code, frame: Frame): number {
  let fastest = 0;
  walk(code, (node) => {
    if (node.op !== "call" || (node.name !== "sin" && node.name !== "cos")) return;
    const line = lineOf(node.args[0], frame);
    if (line !== undefined) fastest = Math.max(fastest, Math.abs(line.slope) / (2 * Math.PI));
  });
  return fastest;
}

function walk(code: Code, see: (node: Code) => void): void {
  see(code);
  for (const child of children(code)) walk(child, see);
}
