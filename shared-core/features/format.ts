import { formatBlocks } from "../syntax/formatter.ts";
import { lineIndexAt } from "../syntax/search.ts";
import type { Tree } from "../syntax/tree.ts";
import type { Span, TextEdit } from "../text/span.ts";
import type { View } from "./view.ts";

/** The edits that lead to the canonical layout. */
export function formatDocument({ model }: View): readonly TextEdit[] {
  return formatBlocks(model.tree).flatMap(({ edits }) => edits);
}

export function formatRange(view: View, range: Span): readonly TextEdit[] {
  return formatRanges(view, [range]);
}

/**
 * The edits of the lines that the ranges touch. Indentation means something only together, so where one touched line
 * of a statement is indented anew all of its lines are. A range that ends at the start of a line does not touch it.
 */
export function formatRanges({ model }: View, ranges: readonly Span[]): readonly TextEdit[] {
  const { tree } = model;
  const touched = touchedLines(tree, ranges);
  return formatBlocks(tree).flatMap(({ edits }) => {
    const isTouched = ({ span }: TextEdit) => linesOf(tree, span).some((line) => touched.has(line));
    const isIndent = ({ span }: TextEdit) =>
      tree.lines[lineIndexAt(tree, span.start)].span.start === span.start;
    const indents = edits.some((edit) => isIndent(edit) && isTouched(edit));
    return edits.filter((edit) => (isIndent(edit) ? indents : isTouched(edit)));
  });
}

function touchedLines(tree: Tree, ranges: readonly Span[]): ReadonlySet<number> {
  return new Set(ranges.flatMap((range) => linesOf(tree, range)));
}

/** The line at whose start a span of several lines ends is not part of it. */
function linesOf(tree: Tree, { start, end }: Span): number[] {
  const first = lineIndexAt(tree, start);
  const last = lineIndexAt(tree, end);
  const stops = last > first && tree.lines[last].span.start === end ? last - 1 : last;
  return Array.from({ length: stops - first + 1 }, (_, i) => first + i);
}
