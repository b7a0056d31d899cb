/** A drive: where it runs, and how near to the modes. */
import { excitesMode, magnification, separationFrom } from "../judgement/drives.ts";
import { elasticModes } from "../judgement/shapes.ts";
import { factor } from "../judgement/wording.ts";
import type { DriveInfo } from "../mechanics/assembly.ts";
import { formatNumber } from "../units/show.ts";
import { type Block, lines, numeric, type Phrase, wordy } from "./readout.ts";
import type { ElasticMode } from "./readout-modes.ts";
import { type Numbers, sharePercent, show, showHz } from "./readout-numbers.ts";

/** The nearest modes, at most so many. */
const MOST = 3;
/** Beyond this an amplification tells that nothing damps, and its digits tell nothing. */
const BOUNDLESS = 1000;

export function driveReadout(numbers: Numbers, name: string): readonly Block[] {
  const { instance, modes } = numbers.asWritten;
  const drive = instance.assembly.drives.find((each) => each.name === name);
  if (drive === undefined) return [];
  const band = bandOf(drive);
  const runs = lines(...runLines(numbers, drive, band));
  if (band === undefined) return [runs];
  if (!modes.ok) return [runs, lines(`no modes: ${modes.reason}`)];
  const nearest = elasticModes(modes.table)
    .toSorted((a, b) => distance(band, a.frequencyHz) - distance(band, b.frequencyHz))
    .slice(0, MOST);
  return [
    runs,
    {
      kind: "table",
      columns: [
        numeric("mode"),
        numeric("frequency"),
        numeric("ratio"),
        numeric("separation"),
        numeric("amplification"),
        wordy("excites it"),
      ],
      rows: nearest.map((mode) => row(numbers, drive, band, mode)),
    },
  ];
}

function bandOf({ bandHz, writtenHz }: DriveInfo): readonly [number, number] | undefined {
  const band = bandHz ?? (writtenHz === undefined ? undefined : ([writtenHz, writtenHz] as const));
  if (band === undefined || !(band[0] > 0 && band[1] > 0)) return undefined;
  return band[0] <= band[1] ? band : [band[1], band[0]];
}

/** On a log axis, as frequencies are compared. */
function distance([low, high]: readonly [number, number], modeHz: number): number {
  if (low <= modeHz && modeHz <= high) return 0;
  return Math.min(Math.abs(Math.log(low / modeHz)), Math.abs(Math.log(high / modeHz)));
}

function row(
  numbers: Numbers,
  drive: DriveInfo,
  band: readonly [number, number],
  mode: ElasticMode,
): Phrase[] {
  const { instance, analysis, modes } = numbers.asWritten;
  const index = modes.ok ? modes.table.modes.indexOf(mode) : -1;
  const closest = Math.min(Math.max(mode.frequencyHz, band[0]), band[1]);
  const ratio = closest / mode.frequencyHz;
  return [
    String(mode.number),
    showHz(numbers, mode.frequencyHz),
    formatNumber(ratio, 3),
    sharePercent(separationFrom(band, mode.frequencyHz)),
    amplification(ratio, mode.dampingRatio),
    excitesMode(analysis, instance.assembly, drive, index) ? "yes" : "no",
  ];
}

/** Of one oscillator with the damping of the mode, steady over static. */
function amplification(ratio: number, damping: number | null): Phrase {
  if (damping === null || damping < 0) return "–";
  const times = magnification(ratio, damping);
  return times < BOUNDLESS ? factor(times) : `over ${BOUNDLESS}`;
}

function runLines(
  numbers: Numbers,
  drive: DriveInfo,
  band: readonly [number, number] | undefined,
): readonly (Phrase | undefined)[] {
  if (band === undefined) return ["it has no one frequency"];
  const [low, high] = band;
  const runs =
    low === high
      ? `runs at ${showHz(numbers, low)}`
      : `runs from ${showHz(numbers, low)} to ${showHz(numbers, high)}`;
  return [runs, unbalanceLine(numbers, drive, high)];
}

/** unbalance (2 pi speed)^2. */
function unbalanceLine(numbers: Numbers, { shape, unit }: DriveInfo, hertz: number): Phrase | undefined {
  if (shape.kind !== "unbalance") return undefined;
  const amplitude = shape.unbalance * (2 * Math.PI * hertz) ** 2;
  return `its amplitude at ${showHz(numbers, hertz)}: ${show(numbers, unit, amplitude)}`;
}
