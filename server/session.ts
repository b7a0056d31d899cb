import type { TextDocument } from "vscode-languageserver-textdocument";
import {
  type Diagnostic,
  type FileContent,
  type LineIndex,
  type Model,
  type Span,
  sameMeaning,
} from "../shared-core/index.ts";
import type { Judged, SummaryOfModel } from "./engine.ts";
import { keyOf } from "./uris.ts";
import type { Place } from "./workspace.ts";

/** What is known of a text without any numbers. */
export interface Understood {
  readonly serial: number;
  readonly model: Model;
  readonly lines: LineIndex;
  readonly said: readonly Diagnostic[];
  readonly reads: ReadonlyMap<string, FileContent>;
  /** What can be summed up without numbers. */
  readonly summary: () => SummaryOfModel;
}

/** One replacement of a text, in offsets of the text before it. */
export interface Change {
  readonly span: Span;
  readonly length: number;
}

/** Where the numbers of the text as it stands are. */
export type NumbersState = "awaited" | "modes" | "there" | "stopped";

/**
 * One model that is open, with what is known of it. `serial` counts its states: of its text, of the files it
 * reads. Whatever was computed carries the serial it belongs to.
 */
export class Session implements Place {
  readonly uri: string;
  readonly key: string;
  readonly folder: string;
  readonly file: string;
  /** Not open in the editor: looked at for a while, behind the others. */
  readonly hidden: boolean;
  document: TextDocument;
  serial = 1;
  understood: Understood | undefined;
  numbers: NumbersState = "awaited";
  summary: SummaryOfModel | undefined;
  /** The client knows that the text is another one, and asks by itself what is said of it. */
  edited = true;
  /** Until then the text cannot be spoken of: files or units are on their way. */
  settling: Promise<void> | undefined;
  /** Rounds of asking the client for files that this text leads to. */
  rounds = 0;
  /** How long understanding the text took the last time, in ms. */
  cost = 0;
  /** Where the last edit ended, and when. */
  lastEdit: { readonly end: number; readonly at: number } | undefined;
  #content: FileContent | undefined;
  /** What the newest numbers say, by what it rests on, and what has changed in the text since. */
  #fromModes: readonly Diagnostic[] = [];
  #fromAnswers: readonly Diagnostic[] = [];
  #judged: readonly Diagnostic[] = [];
  #judgedTree: Model["tree"] | undefined;
  #compared:
    | { readonly tree: Model["tree"]; readonly judged: Model["tree"]; readonly same: boolean }
    | undefined;
  #changes: Change[] = [];
  readonly #waiting: (() => void)[] = [];
  readonly #waitingForModes: (() => void)[] = [];

  /** `source`: the text as it was read, of a model that is not open. */
  constructor(document: TextDocument, { folder, file }: Place, source?: FileContent) {
    this.hidden = source !== undefined;
    this.#content = source;
    this.uri = document.uri;
    this.key = keyOf(document.uri);
    this.folder = folder;
    this.file = file;
    this.document = document;
  }

  /** Where somebody is typing, as far as edits tell. */
  cursor(): number | undefined {
    const { lastEdit } = this;
    return lastEdit && performance.now() - lastEdit.at < TYPING ? lastEdit.end : undefined;
  }

  /** As other models read it. */
  get content(): FileContent {
    this.#content ??= { ok: true, text: this.document.getText() };
    return this.#content;
  }

  /** The text, or a file it reads, is another one now. */
  changed(changes: readonly Change[]): void {
    this.serial++;
    this.numbers = "awaited";
    this.#changes.push(...changes);
    this.edited = changes.length > 0 || this.serial === 2;
    const last = changes.at(-1);
    if (last === undefined) return;
    this.#content = undefined;
    this.lastEdit = { end: last.span.start + last.length, at: performance.now() };
  }

  /** Numbers of the text as it stands. */
  accept(judged: Judged): void {
    const text = this.understood?.said ?? [];
    const beyond = (list: readonly Diagnostic[], known: readonly Diagnostic[]) => {
      const said = new Set(known.map(identity));
      return list.filter((each) => !said.has(identity(each)));
    };
    if (judged.upTo === "modes") {
      this.#fromAnswers = this.#carried(this.#fromAnswers);
      this.#fromModes = beyond(judged.diagnostics, text);
      this.numbers = "modes";
    } else {
      const modes = this.numbers === "modes" ? this.#fromModes : [];
      this.#fromModes = modes;
      this.#fromAnswers = beyond(judged.diagnostics, [...text, ...modes]);
      this.numbers = "there";
    }
    this.#changes = [];
    this.#judged = judged.diagnostics;
    this.#judgedTree = this.understood?.model.tree;
    this.summary = judged.summary;
    if (judged.upTo === "answers") this.#done();
    else this.#begin();
  }

  /** There will be no numbers of the text as it stands: it has errors, or somebody stopped them. */
  withoutNumbers(state: "there" | "stopped"): void {
    this.numbers = state;
    this.#judged = this.understood?.said ?? [];
    this.summary = this.understood?.summary();
    this.#fromModes = [];
    this.#fromAnswers = [];
    this.#changes = [];
    this.#done();
  }

  /**
   * What there is to say about the text as it stands. While numbers are awaited, the last ones stand at the places
   * to which the edits moved them, and say so; those whose place was edited are gone.
   */
  diagnostics(): readonly Diagnostic[] {
    if (this.numbers === "there" || this.numbers === "stopped") return this.#judged;
    if (this.numbers === "modes") return inOrder([...this.#judged, ...this.#fromAnswers]);
    const said = this.understood?.said ?? [];
    if (this.understood?.model.buildable === false) return said;
    return inOrder([...said, ...this.#carried(this.#fromModes), ...this.#carried(this.#fromAnswers)]);
  }

  /** Resolves when the numbers of the text as it stands then are there, or will never be. */
  settled(): Promise<void> {
    if (this.numbers === "there" || this.numbers === "stopped") return Promise.resolve();
    return new Promise((done) => this.#waiting.push(done));
  }

  /** Resolves when the first numbers of the text as it stands then are there, or will never be. */
  begun(): Promise<void> {
    if (this.numbers !== "awaited") return Promise.resolve();
    return new Promise((done) => this.#waitingForModes.push(done));
  }

  close(): void {
    this.#done();
  }

  #begin(): void {
    for (const done of this.#waitingForModes.splice(0)) done();
  }

  #done(): void {
    this.#begin();
    for (const done of this.#waiting.splice(0)) done();
  }

  /** Whether the text means what the newest numbers are of; looked at once for each pair of texts. */
  #meansAsJudged(): boolean {
    const [tree, judged] = [this.understood?.model.tree, this.#judgedTree];
    if (tree === undefined || judged === undefined) return false;
    if (this.#compared?.tree !== tree || this.#compared.judged !== judged) {
      this.#compared = { tree, judged, same: sameMeaning(tree, judged) };
    }
    return this.#compared.same;
  }

  #carried(list: readonly Diagnostic[]): readonly Diagnostic[] {
    if (list.length === 0) return list;
    // Numbers of a text that means the same are not of an earlier one.
    const same = this.#meansAsJudged();
    return list.flatMap((each) => {
      const span = moved(each.span, this.#changes);
      if (span === undefined) return [];
      const { related: _related, fixes: _fixes, ...rest } = each;
      const message = same || each.message.endsWith(EARLIER) ? each.message : `${each.message}${EARLIER}`;
      return [{ ...rest, span, message }];
    });
  }
}

/** So long after an edit the cursor is taken to stand there, in ms. */
export const TYPING = 700;

/** An answer that is not of the text shown says so. */
const EARLIER = " (before the last edit)";

/** Where a place is after the changes; undefined when one of them touched it. */
export function moved(span: Span, changes: readonly Change[]): Span | undefined {
  let { start, end } = span;
  for (const { span: of, length } of changes) {
    const by = length - (of.end - of.start);
    if (of.end <= start) {
      start += by;
      end += by;
    } else if (of.start < end) return undefined;
  }
  return { start, end };
}

const identity = ({ code, span, message, case: of }: Diagnostic): string =>
  `${code} ${span.start} ${span.end} ${of ?? ""} ${message}`;

const inOrder = (list: readonly Diagnostic[]): readonly Diagnostic[] =>
  [...list].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
