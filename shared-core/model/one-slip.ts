import type { Diagnostic, Fix } from "../diagnostics/diagnostic.ts";
import type { StatementNode, Tree, TreeLine } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { type Described, nameIn, nameSpan } from "./names.ts";

/**
 * One slip, one message: of what was found in a text, what is not merely the consequence of another finding.
 * `syntax` is what the parser said, `found` what the text was then found to mean.
 */
export function withoutConsequences(
  tree: Tree,
  statements: readonly Described[],
  syntax: readonly Diagnostic[],
  found: readonly Diagnostic[],
): readonly Diagnostic[] {
  if (syntax.length === 0 && !found.some(({ severity }) => severity === "error")) return found;
  const hasErrors = [...syntax, ...found].some(({ severity }) => severity === "error");
  const lost = lostNames(tree, statements);
  const defined = new Set(statements.map(({ node }) => nameSpan(node)));
  const taken = found.filter(({ code, span }) => code === "duplicate-name" && defined.has(span));
  const twice = new Set(taken.map(({ span }) => textAt(tree, span)));
  const nameless = taken.length > 0 || statements.some(isNameless);
  const unreadable = lineLookup(tree.lines.filter((line) => !line.readable && line.role !== "conflict"));
  return found.filter(({ code, span, fixes = [] }) => {
    const name = textAt(tree, span);
    if (code === "unused-number") return !hasErrors;
    if (code === "unknown-name" && lost.has(name)) return false;
    if (code === "unknown-name" && nameless && fixes.every((fix) => replacesBy(fix, twice))) return false;
    if (code === "wrong-kind" && twice.has(name)) return false;
    return code === "duplicate-name" || !unreadable(span.start);
  });
}

const textAt = (tree: Tree, { start, end }: Span): string => tree.text.slice(start, end);

/** Whether a fix offers a name that is taken twice, which nobody can choose between. */
const replacesBy = ({ edits }: Fix, names: ReadonlySet<string>): boolean =>
  edits.some(({ text }) => names.has(text));

/** A head without the name it needs may define any name that is missed. */
const isNameless = ({ node, name, description }: Described): boolean =>
  node.broken && name === undefined && DEFINES.has(description.family);

const DEFINES: ReadonlySet<string> = new Set(["numbers", "moves", "joins", "drives", "asks"]);

/** Every name in a head that could not be read so far as to say what it defines. */
function lostNames(tree: Tree, statements: readonly Described[]): ReadonlySet<string> {
  const read = new Set<StatementNode>(statements.filter(isNamed).map(({ node }) => node));
  const heads = tree.statements.filter((node) => !read.has(node)).map(({ headSpan }) => headSpan);
  const names = new Set<string>();
  for (const span of heads) {
    for (const [name] of textAt(tree, span).matchAll(/[\p{L}_][\p{L}\p{N}_]*/gu)) names.add(name);
  }
  return names;
}

const isNamed = ({ node }: Described): boolean => !node.broken || nameIn(node, "name") !== undefined;

/** Whether a place lies on one of these lines, which stand in order. */
function lineLookup(lines: readonly TreeLine[]): (offset: number) => boolean {
  return (offset) => {
    let [low, high] = [0, lines.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (lines[middle].span.end < offset) low = middle + 1;
      else high = middle;
    }
    return low < lines.length && lines[low].span.start <= offset;
  };
}
