/** A `let`: its value in every way it can be read, where it is used, what it moves. */
import { derivatives } from "../model/derivatives.ts";
import { instantiate } from "../model/instantiate.ts";
import type { Entity, Instance, Model, ParameterValue } from "../model/model.ts";
import { saysItself } from "../syntax/says-itself.ts";
import type { StatementNode, Tree } from "../syntax/tree.ts";
import { formatNumber, type UnitSystem } from "../units/show.ts";
import { equalities } from "./hover-unit.ts";
import { occurrences } from "./navigate-names.ts";
import { type Block, lines, numeric, type Phrase } from "./readout.ts";
import { elasticModes, modesWorthSaying } from "./readout-modes.ts";
import {
  currentInstance,
  isNothing,
  type Numbers,
  showHz,
  showMove,
  showParameter,
  showQuantity,
} from "./readout-numbers.ts";
import type { View } from "./view.ts";

/** The first modes are always shown, and others that the number moves most. */
const SHOWN = { first: 3, most: 5 };
const TEN_PERCENT = 0.1;

/** Value, band, range, uses: of the text as it stands. */
export function valueReadout(view: View, entity: Entity): readonly Block[] {
  const { model, units } = view;
  // Putting the numbers in is cheap, and these belong to the text as it stands even while others are awaited.
  const instance = currentInstance(view);
  const parameter = instance.parameters.get(entity.name);
  const value = parameter === undefined ? [] : valueLines(parameter, computedText(instance, entity), units);
  return [
    lines(...value, entity.file === undefined ? undefined : `from \`${entity.file}\``),
    lines(...caseLines(model, parameter, units), ...useLines(view, entity)),
  ];
}

/** The value of an expression in the unit in which it writes that kind of number; undefined for a literal. */
function computedText(instance: Instance, { name, node }: Entity): Phrase | undefined {
  const parameter = instance.parameters.get(name);
  const item = node.value?.[0];
  if (parameter === undefined || item?.kind !== "value" || saysItself(item.expression)) return undefined;
  return showQuantity(parameter, "as-written", instance, item.expression);
}

function valueLines(
  parameter: ParameterValue,
  computed: Phrase | undefined,
  units: UnitSystem,
): readonly (Phrase | undefined)[] {
  const { value, low, high, range } = parameter;
  const written = parameter.written.replace(/\s+/g, " ");
  const shown = (each: number): Phrase => showParameter(parameter, each, units);
  return [
    equalities(computed ?? written, value, parameter),
    computed === undefined ? undefined : `written: \`${written.replaceAll("`", "")}\``,
    low === undefined || high === undefined
      ? undefined
      : `tolerance: ${shown(low)} to ${shown(high)}${shareOfBand(parameter)}`,
    range === undefined ? undefined : `may move within ${shown(range[0])} to ${shown(range[1])}`,
  ];
}

/** ` (±10 %)` where the band is even and a share says more than its ends. */
function shareOfBand({ value, low = value, high = value }: ParameterValue): Phrase {
  if (value === 0) return "";
  const [below, above] = [(value - low) / Math.abs(value), (high - value) / Math.abs(value)];
  if (Math.abs(below - above) > 1e-9) return "";
  return ` (±${formatNumber(above * 100, 3)} %)`;
}

/** Its value in each case that replaces it, or something that it is made of. */
function caseLines(model: Model, written: ParameterValue | undefined, units: UnitSystem): readonly Phrase[] {
  if (written === undefined) return [];
  return model.cases.slice(1).flatMap((each, i) => {
    const parameter = instantiate(model, i + 1).parameters.get(written.name);
    if (parameter === undefined || parameter.value === written.value) return [];
    return [`case \`${each.name}\`: ${showParameter(parameter, parameter.value, units)}`];
  });
}

function useLines({ model, others }: View, entity: Entity): readonly Phrase[] {
  const here = usersOf(model.tree, entity.name);
  const path = entity.file ?? model.file;
  const elsewhere = others
    .filter((other) => other.file !== model.file && other.entities.get(entity.name)?.file === path)
    .filter((other) => usersOf(other.tree, entity.name).length > 0);
  const shown = here.slice(0, MOST_USES).map((user) => `\`${user}\``);
  const more = here.length > MOST_USES ? ` and ${here.length - MOST_USES} more` : "";
  return [
    here.length === 0 ? "used nowhere in this file" : `used by ${shown.join(", ")}${more}`,
    ...(elsewhere.length === 0 ? [] : [`and in ${elsewhere.map(({ file }) => `\`${file}\``).join(", ")}`]),
  ];
}

const MOST_USES = 8;

/** Names of the statements of a file that use a number, in order; an unnamed one by its keyword. */
export function usersOf(tree: Tree, name: string): readonly string[] {
  const uses = occurrences(tree).filter(({ key, role }) => key === name && role === "reference");
  return [...new Set(uses.map(({ statement }) => labelOf(statement)))];
}

function labelOf({ keyword, slots }: StatementNode): string {
  const named = [slots.name, slots.key, slots.kind].find((slot) => slot?.kind === "name");
  return named?.kind === "name" ? named.text : keyword.text;
}

/** How far a tenth more of it moves the natural frequencies, to first order; what it matters most to. */
export function influenceReadout(numbers: Numbers, name: string): readonly Block[] {
  const { instance } = numbers.asWritten;
  const parameter = instance.parameters.get(name);
  if (parameter === undefined) return [];
  const decisive = numbers.asWritten.verdicts.filter(({ mattersMost }) => mattersMost?.name === name);
  const matters = decisive.map((verdict) => `\`${verdict.name}\``);
  return [
    ...moves(numbers, instance, parameter),
    lines(matters.length === 0 ? undefined : `it matters most to ${matters.join(", ")}`),
  ];
}

function moves(numbers: Numbers, instance: Instance, { name, value }: ParameterValue): readonly Block[] {
  const { modes } = numbers.asWritten;
  if (!modes.ok) return [lines(`no modes: ${modes.reason}`)];
  const elastic = elasticModes(modes.table);
  if (elastic.length === 0) return [];
  if (value === 0) return [lines("it is zero, so 10 % of it moves nothing")];
  const moved = frequencyMoves(numbers, instance, name, TEN_PERCENT * value);
  if (moved === undefined) return [];
  const size = (number: number): number => Math.abs(moved.get(number) ?? 0);
  if (elastic.every(({ number, frequencyHz }) => isNothing(size(number), frequencyHz)))
    return [lines("it moves no natural frequency")];
  const shown = modesWorthSaying(elastic, (mode) => size(mode.number) / mode.frequencyHz, SHOWN);
  return [
    {
      kind: "table",
      columns: [numeric("mode"), numeric("frequency"), numeric("per +10 % of it")],
      rows: shown.map(({ number, frequencyHz }) => [
        String(number),
        showHz(numbers, frequencyHz),
        showMove(numbers, "Hz", frequencyHz, moved.get(number) ?? 0),
      ]),
    },
  ];
}

/** Step of the two assemblies between which bind factors are followed, as a share of the value. */
const FORM_STEP = 1e-4;

/** First-order moves (Hz) of the elastic modes by number for a change of a `let`, from what the report holds. */
export function frequencyMoves(
  { asWritten }: Numbers,
  instance: Instance,
  name: string,
  change: number,
): ReadonlyMap<number, number> | undefined {
  const { model, caseIndex } = instance;
  const value = instance.parameters.get(name)?.value ?? 0;
  const by = derivatives(model, caseIndex, name);
  const sensitivity = asWritten.analysis.sensitivity();
  if (by === undefined || !sensitivity.ok) return undefined;
  const numbers = Array.from({ length: sensitivity.value.count }, (_, i) => i + 1);
  if (!by.movesForms) {
    const changes = { inertias: scaled(by.inertia, change), stiffnesses: scaled(by.stiffness, change) };
    return new Map(numbers.map((number) => [number, finite(sensitivity.value.along(number, changes))]));
  }
  const step = FORM_STEP * Math.abs(value || change);
  const at = (to: number) => instantiate(model, caseIndex, { parameters: new Map([[name, to]]) }).assembly;
  const [before, after] = [at(value - step), at(value + step)];
  return new Map(
    numbers.map((number) => [
      number,
      finite(sensitivity.value.between(number, before, after, 2 * step) * change),
    ]),
  );
}

const scaled = (list: Float64Array, by: number): Float64Array => list.map((value) => value * by);
const finite = (value: number): number => (Number.isFinite(value) ? value : 0);
