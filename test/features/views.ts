import type { View } from "../../shared-core/features/view.ts";
import { judge } from "../../shared-core/judgement/judge.ts";
import type { FileReader, Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { applyEdits, LineIndex } from "../../shared-core/text/line-index.ts";
import type { TextEdit } from "../../shared-core/text/span.ts";

/** A reader over files by path. */
export const readerOf = (files: Readonly<Record<string, string>>): FileReader => ({
  read: (path) =>
    path in files ? { ok: true, text: files[path] } : { ok: false, why: "missing", detail: "no such file" },
});

export const FILE = "pier/pump.thrum";

interface Around {
  readonly file?: string;
  /** Further files, by path; those that end in `.thrum` are models of the workspace too. */
  readonly files?: Readonly<Record<string, string>>;
  readonly units?: View["units"];
  /** Whether the numbers are there. */
  readonly judged?: boolean;
}

/** What a feature looks at, for a text. */
export function viewOf(text: string, { file = FILE, files = {}, units, judged }: Around = {}): View {
  const reader = readerOf({ [file]: text, ...files });
  const model = understand(file, text, reader);
  const others: Model[] = Object.entries(files)
    .filter(([path]) => path.endsWith(".thrum"))
    .map(([path, content]) => understand(path, content, reader));
  const report = judged ? judge(model) : undefined;
  return { model, lines: new LineIndex(text), units: units ?? "as-written", report, stale: false, others };
}

/** A text with `|` where the cursor stands. */
export function cursorIn(marked: string): { readonly text: string; readonly offset: number } {
  const offset = marked.indexOf("|");
  if (offset < 0) throw new Error("no cursor in the text");
  return { text: marked.slice(0, offset) + marked.slice(offset + 1), offset };
}

export const edited = (text: string, edits: readonly TextEdit[]): string => applyEdits(text, edits);

/** Undamped natural frequencies of a text, Hz; throws where it has an error. */
export function frequenciesOf(text: string, files: Readonly<Record<string, string>> = {}): readonly number[] {
  const report = judge(viewOf(text, { files }).model, { upTo: "modes" });
  const modes = report.cases[0]?.modes;
  if (!modes?.ok) throw new Error(report.diagnostics.map(({ message }) => message).join("\n"));
  return modes.table.modes.flatMap(({ frequencyHz }) => frequencyHz ?? []);
}

export const errorsOf = (text: string, files: Readonly<Record<string, string>> = {}): readonly string[] =>
  viewOf(text, { files })
    .model.diagnostics.filter(({ severity }) => severity === "error")
    .map(({ code, message }) => `${code}: ${message}`);
