/** Everything that the response sheet shows, from a view and what was chosen on the page. */
import { rulerOf } from "../drawing/ruler-of.ts";
import { shownValues } from "../drawing/shown-values.ts";
import { systemScene } from "../drawing/system-scene.ts";
import { plainCase } from "../judgement/plain-case.ts";
import type { CaseReport } from "../judgement/report.ts";
import { currentInstance, type Numbers, numbersOf, show } from "./readout-numbers.ts";
import type { SheetContent, SheetEarlier } from "./sheet.ts";
import { cardsOf } from "./sheet-cards.ts";
import { type Earlier, type EarlierCase, earlierCase } from "./sheet-earlier.ts";
import { knobsOf, ledgerOf } from "./sheet-ledger.ts";
import { motionsOf } from "./sheet-motions.ts";
import { caseStateText, stateText, summaryOf } from "./summary.ts";
import type { View } from "./view.ts";

export interface SheetChoice {
  /** Name of a case; default and unknown: as written. */
  readonly case?: string;
  /** Moved knobs: SI values of lets, rates in Hz. */
  readonly knobs?: Readonly<Record<string, number>>;
  /** Id of the motion that is shown. */
  readonly motion?: string;
}

const CAUTIONS = [
  "Results are as good as the model.",
  "Where people can be hurt (lifting, fall arrest, structures, vehicles, human exposure), local codes and licensed practice decide.",
];

/**
 * Moved knobs are judged anew here, and so is an earlier revision, once; everything else is in the view.
 * @param earlier the revision whose answer is drawn under today's
 */
export function sheetContent(view: View, choice: SheetChoice = {}, earlier?: Earlier): SheetContent {
  const { model } = view;
  const numbers = numbersOf(view);
  const chosen = numbers?.report.cases.find(({ name }) => name === choice.case) ?? numbers?.asWritten;
  const base = {
    title: model.title ?? model.file,
    file: model.file,
    units: view.units,
    cases: model.cases.map(({ name }) => name),
    case: chosen?.name ?? model.cases[0].name,
    stale: view.stale,
    cautions: CAUTIONS,
  };
  if (numbers === undefined || chosen === undefined) return { ...base, ...withoutNumbers(view) };
  const knobs = knobsThatMove(chosen, choice.knobs ?? {});
  const moved =
    knobs.size === 0
      ? undefined
      : plainCase(numbers.report.model, caseIndex(numbers, chosen), { parameters: knobs });
  const shown = moved?.instance.sound === true ? moved : chosen;
  const before = earlier && earlierCase(earlier, chosen.name);
  return {
    ...base,
    ...noticeOf(view, knobs, moved),
    summary: stateText(summaryOf(numbers.report, view.units)),
    ...(shown === chosen ? {} : { moved: caseStateText(shown, numbers, isAlone(model)) }),
    ...(before && { earlier: saidOfEarlier(before, numbers, isAlone(model)) }),
    scene: systemScene(
      view.stale ? numbers.report.model : model,
      shown.instance.assembly,
      shownValues(shown.instance, view.units, (si, value) => show(numbers, si, value)),
    ),
    ruler: rulerOf(shown, before?.ok ? before.report : undefined),
    motions: motionsOf(numbers, shown, choice.motion),
    cards: cardsOf({
      view,
      numbers,
      shown,
      ...(shown === chosen ? {} : { written: chosen }),
      ...(before?.ok && { earlier: before.report }),
    }),
    ledger: ledgerOf(view, numbers, shown, before),
    knobs: knobsOf(view, chosen.instance, knobs),
  };
}

const isAlone = ({ cases }: View["model"]): boolean => cases.length < 2;

const saidOfEarlier = (before: EarlierCase, numbers: Numbers, alone: boolean): SheetEarlier =>
  before.ok
    ? { label: before.label, summary: caseStateText(before.report, numbers, alone) }
    : { label: before.label, summary: "", reason: before.reason };

const caseIndex = ({ report }: Numbers, { name }: CaseReport): number =>
  Math.max(
    0,
    report.model.cases.findIndex((each) => each.name === name),
  );

/** Names that are lets, values that are numbers other than the written ones. */
function knobsThatMove(
  { instance }: CaseReport,
  knobs: Readonly<Record<string, number>>,
): Map<string, number> {
  const usable = Object.entries(knobs).filter(([name, value]) => {
    const written = instance.parameters.get(name)?.value;
    return written !== undefined && Number.isFinite(value) && value !== written;
  });
  return new Map(usable);
}

function noticeOf(
  { stale }: View,
  knobs: ReadonlyMap<string, number>,
  moved: CaseReport | undefined,
): { readonly notice?: string } {
  if (knobs.size > 0 && moved?.instance.sound !== true) {
    const why = moved?.instance.diagnostics[0]?.message ?? "they cannot be put in";
    return { notice: `the moved numbers leave nothing to compute: ${why}` };
  }
  return stale ? { notice: "numbers of an earlier text; new ones are awaited" } : {};
}

function withoutNumbers(
  view: View,
): Omit<SheetContent, "title" | "file" | "units" | "cases" | "case" | "stale" | "cautions"> {
  const { model } = view;
  const assembly = model.buildable ? currentInstance(view).assembly : undefined;
  return {
    notice: model.buildable
      ? "numbers are awaited"
      : "no numbers: an error in what moves, joins or drives leaves no system to compute",
    summary: "",
    scene: systemScene(model, assembly, () => undefined),
    ruler: null,
    motions: [],
    cards: [],
    ledger: [],
    knobs: [],
  };
}
