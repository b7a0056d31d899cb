/** What the author wrote beside a statement: notes, tags, acceptances. */

import { statementAt } from "../judgement/places.ts";
import type { FileReport } from "../judgement/report.ts";
import type { Model } from "../model/model.ts";
import type { NoteNode, StatementNode } from "../syntax/tree.ts";
import { type Block, lines, type Phrase } from "./readout.ts";

/** Notes of a statement and of its details, then what it accepts and what that silences. */
export function notesOf(
  statement: StatementNode,
  model: Model,
  report: FileReport | undefined,
): readonly Block[] {
  const written = [
    ...noteLines(statement.notes),
    ...statement.details.flatMap(({ key, notes }) =>
      noteLines(notes).map((line): Phrase => `\`${key.text}\`: ${line}`),
    ),
  ];
  return [{ kind: "notes", lines: written }, lines(...acceptanceLines(statement, model, report))];
}

function noteLines(notes: readonly NoteNode[]): readonly Phrase[] {
  return notes.flatMap((note) => {
    if (note.accept !== undefined || note.text.trim() === "") return [];
    return [note.tag === undefined ? note.text : `${note.tag.key}: ${note.tag.text}`];
  });
}

function acceptanceLines(
  statement: StatementNode,
  model: Model,
  report: FileReport | undefined,
): readonly Phrase[] {
  return (model.accepted.get(statement) ?? []).map(({ code, reason }) => {
    const silenced = silencedBy(statement, code, report);
    const what = silenced.length === 0 ? "" : `, which silences: ${silenced.join("; ")}`;
    return `accepted \`${code}\`: ${reason}${what}`;
  });
}

/** Messages that an acceptance silences. A report of an earlier text holds other statements, so it tells nothing. */
export function silencedBy(
  statement: StatementNode,
  code: string,
  report: FileReport | undefined,
): readonly string[] {
  if (report === undefined) return [];
  return report.accepted
    .filter(({ diagnostic }) => diagnostic.code === code)
    .filter(({ diagnostic }) => statementAt(report.model, diagnostic.span) === statement)
    .map(({ diagnostic }) => diagnostic.message);
}
