import type { HistoryAnswer, ModeTable, SweepAnswer } from "../answers/answer.ts";
import type { Model } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Kind } from "../units/dimension.ts";
import { unitFromText } from "../units/known-kinds.ts";
import { NUMBER } from "../units/quantity.ts";
import { unitToShow } from "../units/show.ts";
import { type CodeAction, freeName, linesBehind, nameOf, refused, statementAt } from "./refactor-edits.ts";
import type { View } from "./view.ts";

const KIND = "refactor.rewrite";
/** A band round today's natural frequency; chosen so that rounding and small mends do not leave it. */
const FREQUENCY_BAND = 0.03;
const MOST_OFFERS = 4;

/** Holds today's answer of the ask under the cursor: its peaks, or its first natural frequencies. */
export function expectActions(view: View, range: Span): readonly CodeAction[] {
  const { model, report, stale } = view;
  const ask = statementAt(model.tree, range);
  if (ask?.keyword.text !== "ask" || ask.broken) return [];
  const kind = ask.slots.kind?.kind === "name" ? ask.slots.kind.text : "";
  if (!["modes", "sweep", "history"].includes(kind)) return [];
  const title = "Expect today's answer";
  const today = report?.cases[0];
  if (!today || stale) return [refused(title, KIND, "the answer of this text is not computed yet")];
  if (kind === "modes") {
    return today.modes.ok ? ofModes(view, today.modes.table) : [refused(title, KIND, today.modes.reason)];
  }
  const name = askName(model, ask);
  const answer = today.answers.get(name);
  if (answer === undefined) return [refused(title, KIND, "the answer of this text is not computed yet")];
  if (!answer.ok) return [refused(title, KIND, answer.reason)];
  return ofPeaks(view, name, answer.value);
}

function ofModes(view: View, { modes }: ModeTable): readonly CodeAction[] {
  const elastic = modes.filter(({ number, frequencyHz }) => number && frequencyHz).slice(0, MOST_OFFERS);
  return elastic.map(({ number, frequencyHz }) => {
    const low = rounded((frequencyHz ?? 0) * (1 - FREQUENCY_BAND), "down");
    const high = rounded((frequencyHz ?? 0) * (1 + FREQUENCY_BAND), "up");
    const call = `natural_frequency(${number})`;
    return expectation(view, `mode_${number}_stays`, `${low} Hz <= ${call} <= ${high} Hz`);
  });
}

function ofPeaks(view: View, ask: string, answer: SweepAnswer | HistoryAnswer): readonly CodeAction[] {
  return [...answer.peaks].slice(0, MOST_OFFERS).map(([quantity, peak]) => {
    const call = `peak(${ask}, ${quantity})`;
    if ("reason" in peak) return refused(`Expect today's ${call}`, KIND, peak.reason);
    const si = meaningOf(answer.series.get(quantity)?.unit ?? "1");
    const value = { ...si.kind, value: Math.abs(peak.value) * si.factor };
    const { text, factor } = unitToShow(value, { system: view.units });
    const limit = `${rounded(value.value / factor, "up")}${text === "1" ? "" : ` ${text}`}`;
    const name = `${ask}_${quantity.replaceAll(/[^\p{L}\p{M}\d_]+/gu, "_")}`;
    return expectation(view, name, `${call} <= ${limit}`);
  });
}

/** Unit of an answer: SI, rad/s for a turning speed, 1 for a bare number. */
const meaningOf = (unit: string): { readonly kind: Kind; readonly factor: number } =>
  unit === "1" ? { kind: NUMBER, factor: 1 } : unitFromText(unit);

function expectation({ model }: View, wanted: string, text: string): CodeAction {
  const { tree } = model;
  const line = `expect ${freeName(model, wanted)} = ${text}`;
  const last = tree.statements.findLast(({ keyword }) => keyword.text === "expect");
  const behind = last ?? tree.statements[tree.statements.length - 1];
  const lines = last ? [line] : ["", line];
  return { title: `Expect ${text}`, kind: KIND, edits: [linesBehind(tree, behind, lines)], safe: false };
}

/** Three digits, away from the value, so that today's answer holds. */
function rounded(value: number, way: "up" | "down"): string {
  if (value === 0 || !Number.isFinite(value)) return "0";
  const step = 10 ** (Math.floor(Math.log10(value)) - 2);
  const steps = way === "up" ? Math.ceil(value / step) : Math.floor(value / step);
  return String(Number((steps * step).toPrecision(3)));
}

/** The name by which an ask is called: an unnamed one by its kind. */
function askName(model: Model, ask: StatementNode): string {
  const written = nameOf(ask);
  if (written !== "") return written;
  return [...model.entities.values()].find(({ node }) => node === ask)?.name ?? "";
}
