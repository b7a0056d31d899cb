import {
  type CompletionItem,
  CompletionItemKind,
  CompletionTriggerKind,
  InsertTextFormat,
  MarkupKind,
  type SignatureHelp,
} from "vscode-languageserver";
import {
  type Completion,
  type CompletionKind,
  complete,
  type LineIndex,
  signatureHelp,
} from "../../shared-core/index.ts";
import { toOffset, toRange } from "../convert.ts";
import { ofThisText, type Serving, sessionOf } from "../serving.ts";
import type { Session } from "../session.ts";
import { keyOf } from "../uris.ts";

/** Never a blank, a comma or a line end: what is typed there is meant. */
export const COMPLETION_TRIGGERS = [".", '"', "/"];
export const SIGNATURE_TRIGGERS = ["(", ","];

export function registerCompletion(serving: Serving): void {
  const { connection, schedule, guard } = serving;
  connection.onCompletion(
    guard("textDocument/completion", null, async ({ textDocument, position, context }) => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      const offset = toOffset(view.lines, position);
      const line = view.lines.lineText(view.lines.lineAt(offset));
      const files = await ofThisText(session, filesFor(serving, session, line));
      const found = complete(view, offset, {
        explicit: context?.triggerKind === CompletionTriggerKind.Invoked && !typedLast(session, offset),
        files,
      });
      const likely = mostLikely(found, view.model.tree.text, offset);
      const items = likely.map((each) => toItem(each, view.lines, serving));
      return { isIncomplete: likely.length < found.length, items };
    }),
  );
  connection.onSignatureHelp(
    guard("textDocument/signatureHelp", null, ({ textDocument, position }): SignatureHelp | null => {
      const session = sessionOf(serving, textDocument);
      if (session === undefined) return null;
      const view = schedule.view(session);
      const found = signatureHelp(view, toOffset(view.lines, position));
      if (found === undefined) return null;
      const { label, documentation, parameters, active } = found;
      const signature = {
        label,
        documentation: { kind: MarkupKind.Markdown, value: documentation },
        parameters: parameters.map(({ span, documentation: value }) => ({
          label: [span.start, span.end] as [number, number],
          documentation: { kind: MarkupKind.Markdown, value },
        })),
      };
      return { signatures: [signature], activeSignature: 0, activeParameter: active };
    }),
  );
}

/** Longer lists nobody reads, and a client takes longer to show them than this takes to answer the next letter. */
const MOST_ITEMS = 400;

/** Of a list that is too long, what fits the letters in front of the cursor: first what begins with them. */
function mostLikely(found: readonly Completion[], text: string, offset: number): readonly Completion[] {
  if (found.length <= MOST_ITEMS) return found;
  const begins = ({ label, insertSpan }: Completion): boolean =>
    label.toLowerCase().startsWith(text.slice(insertSpan.start, offset).toLowerCase());
  const key = (each: Completion): string => `${begins(each) ? 0 : 1} ${each.sort} ${each.label}`;
  return found
    .filter(({ label, insertSpan }) => fits(label, text.slice(insertSpan.start, offset)))
    .sort((a, b) => (key(a) < key(b) ? -1 : 1))
    .slice(0, MOST_ITEMS);
}

/** Whether the letters stand in the label in their order, as clients ask it. */
function fits(label: string, letters: string): boolean {
  const lower = label.toLowerCase();
  let at = 0;
  for (const letter of letters.toLowerCase()) {
    at = lower.indexOf(letter, at) + 1;
    if (at === 0) return false;
  }
  return true;
}

/** Clients say "invoked" for typing too; an edit that ended right here a moment ago was typing. */
function typedLast({ lastEdit }: Session, offset: number): boolean {
  return lastEdit !== undefined && lastEdit.end === offset && performance.now() - lastEdit.at < JUST_NOW;
}
const JUST_NOW = 1000;

/** Models behind `use`, records behind a detail whose value is a text. */
async function filesFor({ closed }: Serving, session: Session, line: string): Promise<readonly string[]> {
  const files = /^use\b/.test(line) ? await closed.files() : line.includes('"') ? await closed.records() : [];
  return files.filter(({ folder }) => keyOf(folder) === keyOf(session.folder)).map(({ file }) => file);
}

function toItem(found: Completion, lines: LineIndex, { client }: Serving): CompletionItem {
  const { label, kind, detail, documentation, insert, snippet, insertSpan, replaceSpan, sort, notYet } =
    found;
  const usesSnippet = client.snippets && snippet !== undefined;
  const newText = usesSnippet ? snippet : insert;
  const replaces =
    client.capabilities.textDocument?.completion?.completionItem?.insertReplaceSupport === true;
  const item: CompletionItem = {
    label,
    kind: KINDS[kind],
    sortText: sort,
    textEdit: replaces
      ? { newText, insert: toRange(lines, insertSpan), replace: toRange(lines, replaceSpan) }
      : { newText, range: toRange(lines, insertSpan) },
    insertTextFormat: usesSnippet ? InsertTextFormat.Snippet : InsertTextFormat.PlainText,
  };
  if (detail !== undefined) item.detail = notYet ? `${detail} (read, not yet computed)` : detail;
  if (documentation !== undefined) item.documentation = { kind: MarkupKind.Markdown, value: documentation };
  return item;
}

/** The nearest in the icons that editors show. */
const KINDS: Readonly<Record<CompletionKind, CompletionItemKind>> = {
  keyword: CompletionItemKind.Keyword,
  word: CompletionItemKind.Keyword,
  moves: CompletionItemKind.Variable,
  joins: CompletionItemKind.Interface,
  drives: CompletionItemKind.Event,
  asks: CompletionItemKind.Method,
  holds: CompletionItemKind.Value,
  parameter: CompletionItemKind.Constant,
  case: CompletionItemKind.EnumMember,
  limit: CompletionItemKind.Constant,
  kit: CompletionItemKind.Class,
  detail: CompletionItemKind.Property,
  unit: CompletionItemKind.Unit,
  constant: CompletionItemKind.Constant,
  function: CompletionItemKind.Function,
  quantity: CompletionItemKind.Field,
  component: CompletionItemKind.Field,
  file: CompletionItemKind.File,
  tag: CompletionItemKind.Text,
};
