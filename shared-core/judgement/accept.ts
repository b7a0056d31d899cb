import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { Model } from "../model/model.ts";
import type { NoteNode } from "../syntax/tree.ts";
import { span } from "../text/span.ts";
import { statementAt } from "./places.ts";
import { RULES } from "./registry.ts";
import type { CostClass } from "./rule.ts";

export interface Sorted {
  readonly said: readonly Diagnostic[];
  readonly accepted: readonly { readonly diagnostic: Diagnostic; readonly reason: string }[];
}

/**
 * Takes out what `> accept CODE: reason` on the same statement silences, and hints at acceptances that silence
 * nothing. The model holds no acceptance of an error: that is said with the text.
 */
export function sortAccepted(
  model: Model,
  diagnostics: readonly Diagnostic[],
  done: ReadonlySet<CostClass>,
): Sorted {
  const said: Diagnostic[] = [];
  const accepted: { diagnostic: Diagnostic; reason: string }[] = [];
  const used = new Set<NoteNode>();
  for (const diagnostic of diagnostics) {
    const statement = statementAt(model, diagnostic.span);
    const acceptance =
      statement === undefined
        ? undefined
        : model.accepted.get(statement)?.find(({ code }) => code === diagnostic.code);
    if (acceptance === undefined || diagnostic.severity === "error") {
      said.push(diagnostic);
      continue;
    }
    used.add(acceptance.note);
    accepted.push({ diagnostic, reason: acceptance.reason });
  }
  said.push(...unusedAccepts(model, used, done));
  return { said, accepted };
}

/** Warnings and hints that come with the text. */
const TEXT_CODES: ReadonlySet<string> = new Set(["loose-note", "version-missing", "unused-number"]);

function unusedAccepts(
  model: Model,
  used: ReadonlySet<NoteNode>,
  done: ReadonlySet<CostClass>,
): readonly Diagnostic[] {
  return [...model.accepted.values()].flat().flatMap(({ code, note }) => {
    const cost = TEXT_CODES.has(code) ? "text" : RULES.find((rule) => rule.code === code)?.cost;
    // What no rule of this version can say is not known to be unused.
    if (used.has(note) || cost === undefined || (!TEXT_CODES.has(code) && !done.has(cost))) return [];
    return [unusedAccept(model, note, code)];
  });
}

function unusedAccept(model: Model, note: NoteNode, code: string): Diagnostic {
  return {
    code: "unused-accept",
    severity: "hint",
    message: `nothing here says \`${code}\`, so there is nothing to accept`,
    hint: "take it out",
    span: note.accept?.codeSpan ?? note.span,
    tag: "unnecessary",
    fixes: [
      { title: "Take the acceptance out", edits: [{ span: wholeLine(model, note), text: "" }], safe: true },
    ],
  };
}

function wholeLine(model: Model, note: NoteNode): { readonly start: number; readonly end: number } {
  const { text } = model.tree;
  const start = text.lastIndexOf("\n", note.span.start - 1) + 1;
  const newline = text.indexOf("\n", note.span.end);
  return span(start, newline < 0 ? text.length : newline + 1);
}
