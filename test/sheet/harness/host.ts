/** The other side of a sheet without an editor: holds a text, computes what the page asks for, keeps what it says. */
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import {
  type FromSheet,
  judge,
  LineIndex,
  packContent,
  readFromSheet,
  SHEET_VERSION,
  sheetContent,
  type ToSheet,
  type UnitSystem,
  understand,
  type View,
} from "../../../shared-core/index.ts";
import { root } from "../../house/files.ts";

const NO_FILES = { read: () => ({ ok: false, why: "missing", detail: "no other files here" }) as const };

export interface Choice {
  readonly case?: string;
  readonly units?: UnitSystem;
  readonly knobs?: Readonly<Record<string, number>>;
  /** Id of a revision. */
  readonly earlier?: string | null;
  readonly motion?: string | null;
}

/** A text as it was. */
export interface Revision {
  readonly id: string;
  readonly label: string;
  readonly text: string;
}

/** Names of the examples, without their ending. */
export const EXAMPLES: readonly string[] = readdirSync(join(root, "examples"))
  .filter((file) => file.endsWith(".thrum"))
  .map((file) => file.replace(/\.thrum$/, ""))
  .sort();

export const example = (name: string): string =>
  readFileSync(join(root, "examples", `${name}.thrum`), "utf8");

export class SheetHost {
  readonly file: string;
  /** Everything the page has said, oldest first. */
  readonly said: FromSheet[] = [];
  /** What the page said that was no message. */
  readonly strange: unknown[] = [];
  readonly revisions: readonly Revision[];
  post: (message: ToSheet) => Promise<void> = async () => undefined;
  #view: View;
  #version = 1;

  constructor(file: string, text: string, revisions: readonly Revision[] = []) {
    this.file = file;
    this.revisions = revisions;
    this.#view = viewOf(file, text);
  }

  hear(data: unknown): void {
    const message = readFromSheet(data);
    if (message === undefined) {
      this.strange.push(data);
      return;
    }
    this.said.push(message);
    if (message.type === "ready") {
      void this.show({});
      const list = this.revisions.map(({ id, label }) => ({ id, label }));
      void this.post({ type: "revisions", protocol: SHEET_VERSION, list });
    }
    if (message.type === "show") void this.show(message);
  }

  last<T extends FromSheet["type"]>(type: T): Extract<FromSheet, { type: T }> | undefined {
    return this.said.findLast((message) => message.type === type) as never;
  }

  message(choice: Choice): ToSheet {
    const view = { ...this.#view, units: choice.units ?? "as-written" } as const;
    const revision = this.revisions.find(({ id }) => id === choice.earlier);
    const earlier = revision && {
      label: revision.label,
      model: understand(this.file, revision.text, NO_FILES),
    };
    const { motion, ...rest } = choice;
    const content = packContent(sheetContent(view, { ...rest, ...(motion && { motion }) }, earlier));
    return {
      type: "content",
      protocol: SHEET_VERSION,
      uri: `file:///${this.file}`,
      version: this.#version,
      content,
    };
  }

  show(choice: Choice): Promise<void> {
    return this.post(this.message(choice));
  }

  /** Another text; a broken one keeps the numbers of the last that could be computed. */
  edit(text: string): Promise<void> {
    const next = viewOf(this.file, text);
    this.#view = next.report ? next : { ...next, report: this.#view.report, stale: true };
    this.#version++;
    return this.show({});
  }
}

function viewOf(file: string, text: string): View {
  const model = understand(file, text, NO_FILES);
  const report = model.buildable ? judge(model) : undefined;
  return {
    model,
    lines: new LineIndex(text),
    units: "as-written",
    stale: false,
    others: [],
    ...(report && { report }),
  };
}
