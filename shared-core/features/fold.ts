import type { StatementNode, TreeLine } from "../syntax/tree.ts";
import type { View } from "./view.ts";

/** Lines that fold into the first of them; both counted from 0. */
export interface FoldingRange {
  readonly first: number;
  readonly last: number;
  readonly kind?: "comment" | "imports";
}

/** What folds: statements under their head, rows under their detail, runs of notes, comments and `use`. */
export function foldingRanges(view: View): readonly FoldingRange[] {
  const { tree } = view.model;
  const found: FoldingRange[] = [];
  const add = (first: number, last: number, kind?: FoldingRange["kind"]) => {
    if (last > first) found.push(kind ? { first, last, kind } : { first, last });
  };
  for (const statement of tree.statements) foldStatement(view, statement, add);
  addRuns(tree.lines, "comment", add);
  addRuns(tree.lines, "note", add);
  addUses(view, add);
  return found.sort((a, b) => a.first - b.first || b.last - a.last);
}

type Add = (first: number, last: number, kind?: FoldingRange["kind"]) => void;

function foldStatement(view: View, statement: StatementNode, add: Add): void {
  const { lines } = view;
  const head = lines.lineAt(statement.headSpan.start);
  add(head, lines.lineAt(statement.span.end));
  for (const { key, span } of statement.details) add(lines.lineAt(key.span.start), lines.lineAt(span.end));
  for (const inner of statement.inner) foldStatement(view, inner, add);
}

function addRuns(lines: readonly TreeLine[], role: TreeLine["role"], add: Add): void {
  let first: number | undefined;
  for (let i = 0; i <= lines.length; i++) {
    if (lines[i]?.role === role) first ??= i;
    else if (first !== undefined) {
      add(first, i - 1, "comment");
      first = undefined;
    }
  }
}

/** `use` lines one behind the other, blank lines between them included. */
function addUses({ model, lines }: View, add: Add): void {
  let run: [number, number] | undefined;
  for (const { keyword, span } of model.tree.statements) {
    const line = lines.lineAt(span.start);
    if (keyword.text === "use") run = [run?.[0] ?? line, line];
    else if (run) {
      add(run[0], run[1], "imports");
      run = undefined;
    }
  }
  if (run) add(run[0], run[1], "imports");
}
