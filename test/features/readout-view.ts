import { type Hover, hover } from "../../shared-core/features/hover.ts";
import type { View } from "../../shared-core/features/view.ts";
import { judge } from "../../shared-core/judgement/judge.ts";
import type { JudgeOptions } from "../../shared-core/judgement/report.ts";
import type { FileReader, Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { LineIndex } from "../../shared-core/text/line-index.ts";
import { modelsOf, referenceCases, unitFactor } from "../reference/cases.ts";

export interface ViewOptions {
  readonly units?: View["units"];
  readonly upTo?: JudgeOptions["upTo"] | "nothing";
  /** Other files by path. */
  readonly files?: Readonly<Record<string, string>>;
  /** The text whose numbers are there, when it is an earlier one. */
  readonly earlier?: string;
  readonly others?: readonly Model[];
}

export const FILE = "model.thrum";

export function understood(text: string, files: Readonly<Record<string, string>> = {}, path = FILE): Model {
  const reader: FileReader = {
    read: (name) =>
      name in files
        ? { ok: true, text: files[name] }
        : { ok: false, why: "missing", detail: "there is none" },
  };
  return understand(path, text, reader);
}

export function viewOf(text: string, options: ViewOptions = {}): View {
  const { units = "as-written", upTo = "answers", files, earlier, others = [] } = options;
  const model = understood(text, files);
  const judged = earlier === undefined ? model : understood(earlier, files);
  const report = upTo === "nothing" ? undefined : judge(judged, { upTo });
  return { model, lines: new LineIndex(text), units, report, stale: earlier !== undefined, others };
}

/** The hover at the first place of a word, or at `^` in it: `mass ^unit`. */
export function hoverAt(view: View, needle: string): Hover | undefined {
  return hover(view, offsetOf(view, needle));
}

export function offsetOf(view: View, needle: string): number {
  const start = view.model.tree.text.indexOf(needle.replace("^", ""));
  if (start < 0) throw new Error(`there is no ${needle}`);
  return start + Math.max(0, needle.indexOf("^"));
}

/** The plain text of a hover; throws where there is none. */
export function said(view: View, needle: string): string {
  const found = hoverAt(view, needle);
  if (found === undefined) throw new Error(`nothing is said at ${needle}`);
  return found.text;
}

/** The only model of a reference case, or that part of it. */
export function referenceText(id: string, part = ""): string {
  const found = modelsOf(id).find((each) => each.part === part);
  if (found === undefined) throw new Error(`no model ${id} ${part}`);
  return found.text;
}

/** An expected number of a reference case in SI (rates in Hz). */
export function expectedOf(id: string, quantity: string): number {
  const found = referenceCases
    .find((each) => each.id === id)
    ?.expected.find((each) => each.quantity === quantity);
  if (found === undefined) throw new Error(`no expected number ${quantity} in ${id}`);
  return found.value * unitFactor(id, found.unit);
}

/** Cells of the table row that starts with these cells. */
export function row(text: string, ...first: readonly string[]): readonly string[] {
  const rows = text.split("\n").map((line) => line.trim().split(/ {2,}/));
  const found = rows.find((cells) => first.every((cell, i) => cells[i] === cell));
  if (found === undefined) throw new Error(`no row ${first.join(", ")} in:\n${text}`);
  return found;
}

/** The number behind a word, with its unit: `["4.135", "Hz"]` of `alone: 4.135 Hz`. */
export function numberBehind(text: string, word: string): { readonly value: number; readonly unit: string } {
  const at = text.indexOf(word);
  if (at < 0) throw new Error(`no ${word} in:\n${text}`);
  return numberOf(text.slice(at + word.length));
}

export function numberOf(text: string): { readonly value: number; readonly unit: string } {
  const [, sign, digits, unit] = /([-−]?)(\d[\d.]*(?:e-?\d+)?) ?([^\s,)(]*)/.exec(text) ?? [];
  return { value: Number(digits) * (sign === "" ? 1 : -1), unit: unit ?? "" };
}

/** What is shown has four digits (shares three, parts two): half a unit of the last one, as a share of the least mantissa. */
export const FOUR_DIGITS = 5e-4;
export const THREE_DIGITS = 5e-3;
export const TWO_DIGITS = 5e-2;

export const near = (value: number, expected: number, share: number): boolean =>
  Math.abs(value - expected) <= share * Math.abs(expected);
