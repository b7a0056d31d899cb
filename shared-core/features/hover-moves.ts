/** What moves: the modes it takes part in, its frequency alone, how far it sinks. */
import { percent } from "../judgement/wording.ts";
import { equilibrium, positiveGravity } from "../mechanics/equilibrium.ts";
import { formValue } from "../mechanics/forms.ts";
import { type Block, lines, numeric, type Phrase } from "./readout.ts";
import {
  coordinatesOf,
  type ElasticMode,
  elasticModes,
  heldFrequency,
  modesWorthSaying,
  motionShare,
} from "./readout-modes.ts";
import { type Numbers, partPercent, showHz, showMeasure } from "./readout-numbers.ts";

/** Modes in which it moves most, at most so many. */
const MOST = 3;

/** Numbers of a statement that moves, in the case as written; empty while it has no coordinate there. */
export function movesReadout(numbers: Numbers, name: string): readonly Block[] {
  const { assembly } = numbers.asWritten.instance;
  const coordinates = coordinatesOf(assembly, name);
  if (coordinates.length === 0) return [];
  return [
    modeTable(numbers, name, coordinates),
    lines(...coordinates.map((index) => heldLine(numbers, index)), ...deflectionLines(numbers, coordinates)),
  ];
}

/** `420 kg`; undefined where it has no inertia of its own. */
export function inertiaTail(numbers: Numbers, name: string): Phrase | undefined {
  const { assembly } = numbers.asWritten.instance;
  const [index] = coordinatesOf(assembly, name);
  const own = assembly.inertias.filter(({ owner, relative }) => owner === name && !relative);
  if (index === undefined || own.length !== 1) return undefined;
  const { motion } = assembly.coordinates[index];
  const measure = motion === "turning" ? "inertia" : motion === "charge" ? "inductance" : "mass";
  return showMeasure(numbers, measure, motion, own[0].value);
}

function modeTable(numbers: Numbers, name: string, coordinates: readonly number[]): Block {
  const { instance, modes } = numbers.asWritten;
  if (!modes.ok) return lines(`no modes: ${modes.reason}`);
  const { assembly } = instance;
  const elastic = elasticModes(modes.table);
  const massless = coordinates.every((index) => assembly.coordinates[index].massless);
  const share = (mode: ElasticMode): number =>
    massless ? largestAmplitude(mode, coordinates) : motionShare(assembly, mode, name);
  return {
    kind: "table",
    columns: [
      numeric("mode"),
      numeric("frequency"),
      numeric("damping"),
      numeric(massless ? "amplitude" : "share of its motion"),
    ],
    rows: modesWorthSaying(elastic, share, { first: 0, most: MOST })
      .toSorted((a, b) => share(b) - share(a))
      .map((mode) => [
        String(mode.number),
        showHz(numbers, mode.frequencyHz),
        dampingText(mode.dampingRatio),
        partPercent(share(mode)),
      ]),
  };
}

/** The ratio as the mode table has it. */
export const dampingText = (ratio: number | null): Phrase => {
  if (ratio === null) return "–";
  return ratio < 0 ? `−${percent(-ratio)}, it grows` : percent(ratio);
};

/** A massless place holds no energy: its amplitude, of the largest in the shape. */
function largestAmplitude(mode: ElasticMode, coordinates: readonly number[]): number {
  return Math.max(...coordinates.map((index) => Math.hypot(mode.shape.re[index], mode.shape.im[index])));
}

function heldLine(numbers: Numbers, index: number): Phrase | undefined {
  const { assembly } = numbers.asWritten.instance;
  const held = heldFrequency(assembly, index);
  if (held === undefined) return undefined;
  const which = nameAmong(numbers, index);
  return `${which}natural frequency with everything else held still: ${showHz(numbers, held)}`;
}

/** Where gravity, acting on every mass in its positive direction, moves it. */
function deflectionLines(numbers: Numbers, coordinates: readonly number[]): readonly Phrase[] {
  const { assembly } = numbers.asWritten.instance;
  const sliding = coordinates.filter((index) => assembly.coordinates[index].motion === "sliding");
  if (sliding.length === 0) return [];
  const solved = equilibrium(assembly, positiveGravity(assembly));
  if (!solved.ok) return [`no static deflection: ${solved.reason}`];
  const { q, looseIn } = solved.value;
  return sliding.map((index) => {
    const { form, motion } = assembly.coordinates[index];
    const loose = looseIn(form);
    if (loose !== undefined) return `no static deflection: no spring holds \`${loose}\` against its weight`;
    const travel = showMeasure(numbers, "travel", motion, formValue(form, q));
    return `${nameAmong(numbers, index)}static deflection under gravity: ${travel}`;
  });
}

/** The direction of a body in front of what is said of it; nothing where there is one coordinate only. */
function nameAmong(numbers: Numbers, index: number): Phrase {
  const { name, owner } = numbers.asWritten.instance.assembly.coordinates[index];
  return name === owner ? "" : `\`${name}\`: `;
}
