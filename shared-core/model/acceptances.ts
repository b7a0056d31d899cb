import { CODES, type DiagnosticCode } from "../diagnostics/codes.ts";
import type { StatementNode, Tree } from "../syntax/tree.ts";
import { nearest } from "../text/nearest.ts";
import { type Findings, replaceFix } from "./findings.ts";
import type { Model } from "./model.ts";

/** `> accept CODE: reason` of every statement; errors cannot be accepted. */
export function acceptances(tree: Tree, findings: Findings): Model["accepted"] {
  const accepted = new Map<
    StatementNode,
    { code: string; reason: string; note: StatementNode["notes"][number] }[]
  >();
  for (const statement of tree.statements) {
    const notes = [...statement.notes, ...statement.details.flatMap((detail) => detail.notes)];
    for (const note of notes) {
      if (note.accept === undefined) continue;
      const { code, codeSpan, reason } = note.accept;
      if (!(code in CODES)) {
        const near = nearest(code, Object.keys(CODES));
        findings.say("unused-accept", codeSpan, `there is no message \`${code}\` that could be accepted`, {
          fixes: near === undefined ? [] : [replaceFix(`Write \`${near}\``, codeSpan, near)],
        });
      } else if (CODES[code as DiagnosticCode] === "error") {
        findings.say("wrong-kind", codeSpan, `\`${code}\` is an error, and errors cannot be accepted`, {
          hint: "warnings and hints can, with a reason",
        });
      } else {
        const list = accepted.get(statement) ?? [];
        list.push({ code, reason, note });
        accepted.set(statement, list);
      }
    }
  }
  return accepted;
}
