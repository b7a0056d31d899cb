/** What joins: its part in the modes, what it carries at rest and in the answers, what stiffening it would do. */
import type { Peak } from "../answers/answer.ts";
import type { ElementInfo, Motion, QuantityRef } from "../mechanics/assembly.ts";
import { NUMBER } from "../units/quantity.ts";
import { siUnit } from "../units/show.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { dampingText } from "./hover-moves.ts";
import { type Block, lines, numeric, type Phrase } from "./readout.ts";
import {
  dampingGiven,
  type ElasticMode,
  elasticModes,
  elementsOf,
  heavierBy,
  modesWorthSaying,
  moveOf,
  stifferBy,
  strainShare,
} from "./readout-modes.ts";
import {
  isNothing,
  type Numbers,
  partPercent,
  show,
  showHz,
  showMeasure,
  showMove,
} from "./readout-numbers.ts";
import { answeredAsks, peakIn } from "./readout-peaks.ts";

/** The first modes are always shown, and others in which the element matters. */
const SHOWN = { first: 3, most: 6 };
const TEN_PERCENT = 0.1;

/** Numbers of a joining element in the case as written; empty where it is no element of the equations. */
export function joinsReadout(numbers: Numbers, name: string): readonly Block[] {
  const { assembly } = numbers.asWritten.instance;
  const elements = elementsOf(assembly, name);
  if (elements.length === 0) return [];
  return [
    modeTable(numbers, elements),
    lines(
      ...elements.flatMap((index) => staticLines(numbers, index)),
      ...elements.flatMap((index) => peakLines(numbers, index)),
    ),
  ];
}

/** `4 of 26.5 N/mm, 106 N/mm together`. */
export function elementTail(numbers: Numbers, name: string): Phrase | undefined {
  const { assembly } = numbers.asWritten.instance;
  const [index, ...more] = elementsOf(assembly, name);
  if (index === undefined || more.length > 0) return undefined;
  const element = assembly.elements[index];
  const principal = (["stiffness", "damping", "inertance"] as const).find((each) => element[each] !== 0);
  if (principal === undefined) return undefined;
  const { count, motion } = element;
  const whole = showMeasure(numbers, principal, motion, element[principal]);
  if (count === 1) return whole;
  return `${count} of ${showMeasure(numbers, principal, motion, element[principal] / count)}, ${whole} together`;
}

/** Sum over the members of a group. */
export function groupReadout(numbers: Numbers, name: string, members: readonly string[]): readonly Block[] {
  const { assembly } = numbers.asWritten.instance;
  const elements = members.flatMap((member) => elementsOf(assembly, member));
  if (elements.length === 0) return [];
  const infos = elements.map((index) => assembly.elements[index]);
  const force = quantity(
    name,
    "force",
    infos[0].motion,
    elements.map((element) => ({ of: "element", element, measure: "force", factor: 1 })),
  );
  return [
    modeTable(numbers, elements),
    lines(
      staticSum(numbers, elements),
      ...answeredAsks(numbers.asWritten).map((ask) => {
        const peak = peakIn(numbers.asWritten, ask, force);
        return (
          peak && `in \`${ask.name}\`: force up to ${showPeak(numbers, "force", infos[0], peak, ask.kind)}`
        );
      }),
    ),
  ];
}

function modeTable(numbers: Numbers, elements: readonly number[]): Block {
  const { modes, instance } = numbers.asWritten;
  if (!modes.ok) return lines(`no modes: ${modes.reason}`);
  const { assembly } = instance;
  const infos = elements.map((index) => assembly.elements[index]);
  const names = infos.map((element) => element.name);
  const damps = infos.every(({ stiffness, inertance, damping }) => !stiffness && !inertance && damping !== 0);
  const weight = (mode: ElasticMode): number =>
    damps ? dampingGiven(assembly, mode, elements) : strainShare(mode, names);
  const shown = modesWorthSaying(elasticModes(modes.table), weight, SHOWN);
  const rows = shown.map((mode) => [
    String(mode.number),
    showHz(numbers, mode.frequencyHz),
    damps ? dampingText(weight(mode)) : partPercent(weight(mode)),
    damps ? dampingMove(weight(mode)) : frequencyMove(numbers, mode, elements),
  ]);
  const heads = damps
    ? ["damping ratio it gives", "per +10 % of it"]
    : ["share of its strain energy", "per +10 % of it"];
  return {
    kind: "table",
    columns: [numeric("mode"), numeric("frequency"), ...heads.map(numeric)],
    rows,
  };
}

const dampingMove = (given: number): Phrase => (given === 0 ? "0" : `+${dampingText(TEN_PERCENT * given)}`);

/** First order: the derivative of the frequency times a tenth of the stiffness (and inertance). */
function frequencyMove(numbers: Numbers, mode: ElasticMode, elements: readonly number[]): Phrase {
  const { analysis, instance } = numbers.asWritten;
  const sensitivity = analysis.sensitivity();
  if (!sensitivity.ok) return "–";
  const { stiffnesses } = stifferBy(instance.assembly, elements, TEN_PERCENT);
  const { inertias } = heavierBy(instance.assembly, elements, TEN_PERCENT);
  const moved = moveOf(sensitivity.value, mode.number, { stiffnesses, inertias });
  return isNothing(moved, mode.frequencyHz) ? "0" : showMove(numbers, "Hz", mode.frequencyHz, moved);
}

function staticLines(numbers: Numbers, index: number): readonly Phrase[] {
  const { analysis, instance } = numbers.asWritten;
  const element = instance.assembly.elements[index];
  if (element.stiffness === 0 || element.motion !== "sliding") return [];
  const statics = analysis.statics();
  const found = statics.ok ? statics.value.element(index) : statics;
  const label = nameAmong(numbers, element);
  const preload =
    element.preload === 0
      ? ""
      : `, preload ${showMeasure(numbers, "force", element.motion, element.preload)}`;
  if (!found.ok) return [`${label}no static load: ${found.reason}${preload}`];
  const { travel, force } = found.value;
  const each =
    element.count > 1 ? `, ${showMeasure(numbers, "force", element.motion, force / element.count)} each` : "";
  return [
    `${label}static load under gravity: ${showMeasure(numbers, "force", element.motion, force)}${each}, travel ${showMeasure(numbers, "travel", element.motion, travel)}${preload}`,
  ];
}

function staticSum(numbers: Numbers, elements: readonly number[]): Phrase | undefined {
  const { analysis, instance } = numbers.asWritten;
  const statics = analysis.statics();
  if (!statics.ok) return undefined;
  let sum = 0;
  for (const index of elements) {
    const found = statics.value.element(index);
    if (!found.ok) return `no static load: ${found.reason}`;
    sum += found.value.pull;
  }
  const { motion } = instance.assembly.elements[elements[0]];
  return motion === "sliding"
    ? `static load under gravity: ${showMeasure(numbers, "force", motion, Math.abs(sum))}`
    : undefined;
}

function peakLines(numbers: Numbers, index: number): readonly Phrase[] {
  const { asWritten } = numbers;
  const element = asWritten.instance.assembly.elements[index];
  const of = (measure: "travel" | "force"): QuantityRef =>
    quantity(element.name, measure, element.motion, [{ of: "element", element: index, measure, factor: 1 }]);
  return answeredAsks(asWritten).map((ask): Phrase => {
    const travel = peakIn(asWritten, ask, of("travel"));
    const force = forceFrom(element, ask.kind, travel) ?? peakIn(asWritten, ask, of("force"));
    const said = [
      ...(travel
        ? [
            `${measureWord("travel", element)} up to ${showPeak(numbers, "travel", element, travel, ask.kind)}`,
          ]
        : []),
      ...(force
        ? [`${measureWord("force", element)} up to ${showPeak(numbers, "force", element, force, ask.kind)}`]
        : []),
    ];
    const found = said.length === 0 ? "no largest travel or force" : said.join(", ");
    return `${nameAmong(numbers, element)}in \`${ask.name}\`: ${found}`;
  });
}

/** A plain spring needs no second search: its force is k (1 + i eta) times its travel, in time k times it. */
function forceFrom(
  element: ElementInfo,
  kind: "sweep" | "history",
  travel: Peak | undefined,
): Peak | undefined {
  const { stiffness, damping, inertance, preload, lossFactor } = element;
  if (travel === undefined || damping !== 0 || inertance !== 0 || preload !== 0) return undefined;
  const factor = kind === "sweep" ? Math.hypot(1, lossFactor) : 1;
  return { value: Math.abs(stiffness) * factor * travel.value, at: travel.at };
}

function measureWord(measure: "travel" | "force", { motion }: ElementInfo): string {
  if (motion !== "turning") return measure;
  return measure === "travel" ? "twist" : "torque";
}

function showPeak(
  numbers: Numbers,
  measure: "travel" | "force",
  { motion }: ElementInfo,
  peak: { readonly value: number; readonly at: number },
  kind: "sweep" | "history",
): Phrase {
  const at = kind === "sweep" ? showHz(numbers, peak.at) : show(numbers, "s", peak.at);
  return `${showMeasure(numbers, measure, motion, peak.value)} at ${at}`;
}

/** Named as asks name it: an analysis keeps what it has found under that name. */
function quantity(
  name: string,
  measure: "travel" | "force",
  motion: Motion,
  terms: QuantityRef["terms"],
): QuantityRef {
  return { text: `${name}.${measure}`, terms, unit: siUnit(dimensionOf(measure, motion) ?? NUMBER) };
}

/** The direction of a mount in front of what is said of it. */
function nameAmong(numbers: Numbers, { name }: ElementInfo): Phrase {
  const { entities } = numbers.report.model;
  return entities.has(name) ? "" : `\`${name}\`: `;
}
