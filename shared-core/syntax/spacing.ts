import { ROLE, type Token, type Tree } from "./tree.ts";

/** The blanks that the canonical layout puts between two tokens of a line, neither of them a blank. */
export function gapBetween(tree: Tree, before: number, after: number): string {
  const { tokens, roles } = tree;
  const left = wordOf(tree, before);
  const right = wordOf(tree, after);
  if (tokens[after].kind === "comment") return "  ";
  if (roles[before] === ROLE.unit && roles[after] === ROLE.unit) return "";
  if (left === "," || left === ":") return " ";
  if (CLOSES.has(right) || left === "(" || left === "." || right === ".") return "";
  if (roles[before] === ROLE.prefix) return left === "not" ? " " : "";
  if (roles[before] === ROLE.infix) return gapAtInfix(tree, before, left);
  if (roles[after] === ROLE.infix) return gapAtInfix(tree, after, right);
  if (right === "(" && (roles[before] === ROLE.callee || roles[before] === ROLE.definition)) return "";
  if (startsCell(tree, after) && endsCell(tokens[before], roles[before])) return "  ";
  return " ";
}

/** Behind these no blank was ever wanted. */
const CLOSES: ReadonlySet<string> = new Set([",", ":", ")"]);
/** Operators that may stand tight; all others have a blank on each side. */
const MAY_BE_TIGHT: ReadonlySet<string> = new Set(["*", "·", "/", "^"]);

/**
 * Tight operators stay tight and wide ones become even, because there blanks carry meaning: in `12 Hz * t` a
 * blank parts the unit from the factor, and none may be taken away.
 */
function gapAtInfix(tree: Tree, index: number, operator: string): string {
  if (!MAY_BE_TIGHT.has(operator)) return " ";
  const { tokens } = tree;
  const isBlank = (token: Token | undefined) => token?.kind === "blank";
  return isBlank(tokens[index - 1]) || isBlank(tokens[index + 1]) ? " " : "";
}

/** Two values side by side without an operator: cells of a table row. */
function startsCell(tree: Tree, index: number): boolean {
  const role = tree.roles[index];
  return role === ROLE.prefix || (tree.tokens[index].kind === "number" && role !== ROLE.unit);
}

const endsCell = (token: Token, role: number): boolean => role === ROLE.unit || token.kind === "number";

function wordOf({ text, tokens }: Tree, index: number): string {
  const { kind, offset, length } = tokens[index];
  return kind === "operator" || kind === "name" ? text.slice(offset, offset + length) : "";
}
