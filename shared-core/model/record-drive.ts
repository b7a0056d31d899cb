import type { Samples } from "../mechanics/assembly.ts";
import {
  type ColumnWish,
  countColumns,
  readColumns,
  readHeader,
  type TableReading,
} from "../records/record.ts";
import type { Item, TextNode } from "../syntax/tree.ts";
import { LineIndex } from "../text/line-index.ts";
import type { Span } from "../text/span.ts";
import { nameItem } from "./details.ts";
import type { Draft } from "./draft.ts";
import { readFile, resolvePath } from "./files.ts";
import { replaceFix } from "./findings.ts";
import { literalOf } from "./fit.ts";

/** What a record drive says of its file. */
export interface RecordWish {
  readonly file: TextNode;
  readonly column?: { readonly item: Item; readonly span: Span };
  readonly timeColumn?: { readonly item: Item; readonly span: Span };
  /** Present: the file has no times. Samples a second. */
  readonly isSampled: boolean;
}

/** The columns of a record as they stand in the file; with `isSampled` the times are left to the caller. */
export function readRecord(wish: RecordWish, draft: Draft): Samples | undefined {
  const { file } = wish;
  const path = resolvePath(draft.path, file.text);
  draft.files.add(path);
  const text = readFile(path, file.text, file.span, draft.reader, draft.findings);
  if (text === undefined) return undefined;
  const wishes = wishesFor(wish, text);
  const ascending = wish.isSampled ? undefined : 0;
  const reading = remembered(path, text, wishes, ascending);
  if (reading.problems.length > 0) {
    sayProblems(wish, path, text, reading, draft);
    return undefined;
  }
  const [first, second] = reading.columns;
  if (first.length < 2) {
    draft.findings.say(
      "record-bad-row",
      file.span,
      `\`${file.text}\` holds 1 sample; a history needs 2 at least`,
    );
    return undefined;
  }
  return wish.isSampled ? { times: new Float64Array(0), values: first } : { times: first, values: second };
}

/** Columns by name or number. Left out: times in the first, values in the second, or in the only one. */
function wishesFor(wish: RecordWish, text: string): ColumnWish[] {
  const single = wish.isSampled || countColumns(text) < 2;
  const values: ColumnWish = {
    what: "value",
    column: columnOf(wish.column?.item) ?? (single ? 1 : 2),
  };
  if (wish.isSampled) return [values];
  return [{ what: "time", column: columnOf(wish.timeColumn?.item) ?? 1 }, values];
}

/** `"z"`, `z` or `3`. */
function columnOf(item: Item | undefined): string | number | undefined {
  if (item?.kind === "text") return /^\d+$/.test(item.text) ? Number(item.text) : item.text;
  const name = nameItem(item);
  if (name !== undefined) return name.text;
  return item?.kind === "value" ? literalOf(item.expression)?.value : undefined;
}

function sayProblems(
  wish: RecordWish,
  path: string,
  text: string,
  reading: TableReading,
  draft: Draft,
): void {
  const { file } = wish;
  const [first] = reading.problems;
  const lost = reading.problems.find(
    (problem) => problem.nearest !== undefined || /column/.test(problem.message),
  );
  const header = readHeader(text);
  if (lost !== undefined && reading.problems.length === 1) {
    const isTime = lost.message.includes("for the time") || lost.message.includes("the time was");
    const place = (isTime ? wish.timeColumn : wish.column)?.span ?? file.span;
    const better = lost.nearest;
    draft.findings.say("unknown-name", place, `\`${file.text}\` ${lost.message}`, {
      hint: lost.hint ?? (header === undefined ? "columns can be counted, from 1" : undefined),
      fixes: better === undefined ? [] : [replaceFix(`Write \`"${better}"\``, place, `"${better}"`)],
    });
    return;
  }
  const lines = new LineIndex(text);
  const related = reading.problems.flatMap((problem) =>
    problem.line === undefined
      ? []
      : [{ file: path, span: lines.lineSpan(problem.line - 1), message: problem.message }],
  );
  const rest = reading.problems.length - 1;
  const last = reading.problems[reading.problems.length - 1];
  const more =
    rest === 0
      ? ""
      : last.line === undefined
        ? `; ${last.message}`
        : `; ${rest} more ${rest === 1 ? "row" : "rows"} likewise`;
  draft.findings.say("record-bad-row", file.span, `\`${file.text}\`, ${first.message}${more}`, {
    hint: first.hint,
    related,
  });
}

/** The last readings, so that a keystroke in the model does not read a long record again. */
const REMEMBERED = 8;
const memory: { path: string; text: string; key: string; reading: TableReading }[] = [];

function remembered(
  path: string,
  text: string,
  wishes: readonly ColumnWish[],
  ascending: number | undefined,
): TableReading {
  const key = JSON.stringify([wishes, ascending]);
  const found = memory.findIndex((each) => each.path === path && each.key === key && each.text === text);
  if (found >= 0) {
    const [entry] = memory.splice(found, 1);
    memory.unshift(entry);
    return entry.reading;
  }
  const reading = readColumns(text, wishes, ascending);
  memory.unshift({ path, text, key, reading });
  memory.length = Math.min(memory.length, REMEMBERED);
  return reading;
}
