/** What sets the drawing in motion. */
import type { CaseReport } from "../judgement/report.ts";
import type { QuantityRef } from "../mechanics/assembly.ts";
import type { HistoryAsk } from "../model/model.ts";
import { type Numbers, showHz } from "./readout-numbers.ts";
import type { SheetMotion } from "./sheet.ts";

/** More modes than anybody looks at one by one. */
const MOST_MODES = 20;
/** Frames of a history times coordinates; what is longer is played more coarsely. */
const MOST_VALUES = 6_000;
const MOST_FRAMES = 400;

/** @param chosen id of the motion that is shown; frames of a history take long and are many */
export function motionsOf(numbers: Numbers, report: CaseReport, chosen: string | undefined): SheetMotion[] {
  return [...modeMotions(numbers, report), ...historyMotions(report, chosen)];
}

function modeMotions(numbers: Numbers, { modes }: CaseReport): SheetMotion[] {
  if (!modes.ok) return [];
  let free = 0;
  return modes.table.modes
    .filter(({ number }) => number !== null)
    .slice(0, MOST_MODES)
    .map((mode) => {
      const isFree = mode.number === 0;
      const { re, im } = scaled(mode.complexShape ?? mode.shape);
      const name = isFree ? `free mode ${++free}` : `mode ${mode.number}`;
      return {
        kind: "mode",
        id: isFree ? `free:${free}` : `mode:${mode.number}`,
        label: isFree || mode.frequencyHz === null ? name : `${name} · ${showHz(numbers, mode.frequencyHz)}`,
        re,
        im,
      };
    });
}

function scaled({ re, im }: { readonly re: Float64Array; readonly im: Float64Array }): {
  re: Float64Array;
  im: Float64Array;
} {
  const largest = re.reduce((most, part, i) => Math.max(most, Math.hypot(part, im[i])), 0) || 1;
  return { re: re.map((part) => part / largest), im: im.map((part) => part / largest) };
}

function historyMotions(report: CaseReport, chosen: string | undefined): SheetMotion[] {
  if (report.instance.assembly.coordinates.length === 0) return [];
  return report.instance.asks.flatMap((ask) => {
    if (ask.kind !== "history" || report.answers.get(ask.name)?.ok !== true) return [];
    const named = { kind: "history", id: `history:${ask.name}`, label: `history ${ask.name}` } as const;
    if (named.id !== chosen) return { ...named, frames: 0, stepS: 0, values: new Float64Array() };
    const frames = historyFrames(report, ask);
    return frames === undefined ? [] : { ...named, ...frames };
  });
}

type Frames = Pick<Extract<SheetMotion, { kind: "history" }>, "frames" | "stepS" | "values">;

/** Displacements of all coordinates at equal steps; undefined where one of them cannot be followed. */
function historyFrames({ analysis, instance }: CaseReport, ask: HistoryAsk): Frames | undefined {
  const response = analysis.timeResponse(ask);
  const { coordinates } = instance.assembly;
  if (!response.ok) return undefined;
  const frames = Math.max(2, Math.min(MOST_FRAMES, Math.floor(MOST_VALUES / coordinates.length)));
  const values = new Float64Array(frames * coordinates.length);
  let largest = 0;
  for (let c = 0; c < coordinates.length; c++) {
    const quantity: QuantityRef = {
      text: `${coordinates[c].name}.displacement`,
      terms: [{ of: "coordinate", coordinate: c, derivative: 0, factor: 1 }],
      unit: coordinates[c].motion === "turning" ? "rad" : "m",
    };
    for (let frame = 0; frame < frames; frame++) {
      const value = response.value.at(quantity, (ask.lasting * frame) / (frames - 1));
      if (!value.ok || !Number.isFinite(value.value)) return undefined;
      values[frame * coordinates.length + c] = value.value;
      largest = Math.max(largest, Math.abs(value.value));
    }
  }
  return {
    frames,
    stepS: ask.lasting / (frames - 1),
    values: largest > 0 ? values.map((value) => value / largest) : values,
  };
}
