import type { CaseReport, FileReport } from "../judgement/report.ts";
import { writtenUnit } from "../judgement/shown-unit.ts";
import type { Motion } from "../mechanics/assembly.ts";
import { instantiate } from "../model/instantiate.ts";
import type { Instance, Model, ParameterValue } from "../model/model.ts";
import type { Expression } from "../syntax/tree.ts";
import type { Quantity } from "../units/dimension.ts";
import { isFault } from "../units/fault.ts";
import { isNumber, NUMBER, sameKind } from "../units/quantity.ts";
import { formatNumber, formatQuantity, siUnit, type UnitSystem } from "../units/show.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import type { Measure } from "../vocabulary/description.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { inUnit, type UnitView, unitView } from "../writing/units/unit-view.ts";
import { writtenUnits } from "../writing/units/written-units.ts";
import type { View } from "./view.ts";

/** The newest numbers of a view with the units in which they are shown. */
export interface Numbers {
  readonly report: FileReport;
  /** The case as written. */
  readonly asWritten: CaseReport;
  readonly units: UnitView;
  readonly system: UnitSystem;
  readonly stale: boolean;
}

/** undefined: nothing has been computed yet, or there is nothing to compute. */
export function numbersOf({ report, units, stale }: View): Numbers | undefined {
  const asWritten = report?.cases[0];
  if (report === undefined || asWritten === undefined) return undefined;
  return {
    report,
    asWritten,
    units: unitView(units, unitsOf(report.model)),
    system: units,
    stale,
  };
}

/** A model never changes, so the units that it uses may be kept as long as it is. */
const UNITS = new WeakMap<Model, ReturnType<typeof writtenUnits>>();

function unitsOf(model: Model): ReturnType<typeof writtenUnits> {
  const known = UNITS.get(model) ?? writtenUnits(model);
  UNITS.set(model, known);
  return known;
}

/** The text as it stands with its numbers as written, whether or not a report of it is there. */
export function currentInstance({ model, report, stale }: View): Instance {
  const known = report?.cases[0]?.instance;
  return known !== undefined && !stale && known.model === model ? known : instantiate(model, 0);
}

/** An SI value in the unit of the view: `39 mm`. */
export const show = ({ units }: Pick<Numbers, "units">, si: string, value: number): string =>
  inUnit(value, units.unitFor(si, Math.abs(value)));

export const showHz = (numbers: Pick<Numbers, "units">, hertz: number): string => show(numbers, "Hz", hertz);

/** A value of a measure of what moves so: a travel in mm or deg, a force in N or N*m. */
export function showMeasure(numbers: Numbers, measure: Measure, motion: Motion, value: number): string {
  if (measure === "travel" && motion === "turning") return show(numbers, "rad", value);
  return show(numbers, siUnit(dimensionOf(measure, motion) ?? NUMBER), value);
}

/** Three digits of a share: `4.88 %`. */
export const sharePercent = (share: number): string => `${formatNumber(share * 100, 3)} %`;

/** A share of a whole, two digits; what rounds to nothing is said to be small. */
export function partPercent(share: number): string {
  if (share === 0) return "0 %";
  return share < SMALLEST_PART ? `< ${SMALLEST_PART * 100} %` : `${formatNumber(share * 100, 2)} %`;
}

/** Smaller parts of a mode are nothing to act upon; chosen by reading. */
const SMALLEST_PART = 1e-3;

/** `+0.12 Hz`, `−4.9 %`. */
export const signed = (value: number, text: string): string =>
  value > 0 ? `+${text}` : value < 0 ? `−${text.replace(/^[-−]/, "")}` : text;

/** A change that no digit of the value it belongs to would show. */
export const isNothing = (change: number, of: number): boolean =>
  !Number.isFinite(change) || Math.abs(change) <= NO_CHANGE * Math.abs(of);
const NO_CHANGE = 5e-6;

/** How far a value moves, in its unit and as a share of it: `+0.121 Hz (+4.9 %)`; `0` where it stays. */
export function showMove(numbers: Numbers, si: string, value: number, change: number): string {
  if (isNothing(change, value)) return "0";
  const unit = numbers.units.unitFor(si, Math.abs(value));
  const moved = signed(change, inUnit(Number(Math.abs(change).toPrecision(3)), unit));
  const share = signed(change, `${formatNumber(Math.abs(change / value) * 100, 2)} %`);
  return `${moved} (${share})`;
}

/** A quantity in the unit in which one of the expressions writes that kind; else in that of the system. */
export function showQuantity(
  quantity: Quantity,
  system: UnitSystem,
  instance: Instance,
  ...expressions: readonly Expression[]
): string {
  // A percent sign and the spelling of a rate are no question of SI or inch units.
  if (system === "as-written" || isNumber(quantity) || quantity.rate) {
    for (const expression of expressions) {
      const unit = writtenUnit(instance, expression);
      if (unit !== undefined && sameKind(unit.kind, quantity)) return formatQuantity(quantity, { unit });
    }
  }
  return formatQuantity(quantity, { system });
}

/** A value of a `let` in the unit it is written in, or in that of the system. */
export function showParameter(parameter: ParameterValue, value: number, system: UnitSystem): string {
  const unit = parameterUnit(parameter);
  const kept = system === "as-written" || parameter.rate || isNumber(parameter);
  return formatQuantity(
    { ...parameter, value },
    kept && unit ? { unit } : { system: system === "as-written" ? undefined : system },
  );
}

export function parameterUnit({ unitNode }: ParameterValue): UnitMeaning | undefined {
  const meaning = unitNode === undefined ? undefined : unitOf(unitNode);
  return meaning === undefined || isFault(meaning) ? undefined : meaning;
}
