/** Values beside the symbols of a drawing, in the chosen units. */
import type { ShowValue } from "../drawing/words.ts";
import type { DriveShape, ElementInfo } from "../mechanics/assembly.ts";
import type { Instance } from "../model/model.ts";
import type { Expression, Item, StatementNode } from "../syntax/tree.ts";
import type { UnitSystem } from "../units/show.ts";
import { inUnit, type UnitView } from "../writing/units/unit-view.ts";
import { saysItself } from "./readout-literal.ts";
import { showParameter } from "./readout-numbers.ts";

/** Literals stay as written while the units are; everything else is put in numbers where there are some. */
export function shownValues(instance: Instance, units: UnitView, system: UnitSystem): ShowValue {
  return (statement, key) => {
    const expression = expressionOf(statement, key);
    if (expression === undefined) return undefined;
    if (system === "as-written" && saysItself(expression)) return undefined;
    const parameter =
      expression.kind === "path" ? instance.parameters.get(expression.names[0].text) : undefined;
    if (parameter !== undefined) return showParameter(parameter, parameter.value, system);
    const found = computedValue(statement, key, instance);
    return found === undefined
      ? undefined
      : inUnit(found.value, units.unitFor(found.si, Math.abs(found.value)));
  };
}

function expressionOf(statement: StatementNode, key: string): Expression | undefined {
  const detail = statement.details.find((each) => each.key.text === key);
  const items: readonly Item[] | undefined = detail === undefined ? statement.value : detail.items;
  const item = items?.length === 1 ? items[0] : undefined;
  return item?.kind === "value" ? item.expression : undefined;
}

interface Found {
  readonly value: number;
  readonly si: string;
}

function computedValue(statement: StatementNode, key: string, { assembly }: Instance): Found | undefined {
  const slot = statement.slots.name;
  const name = slot?.kind === "name" ? slot.text : "";
  if (key === "mass" || key === "inertia") {
    const own = assembly.inertias.find(({ owner, relative }) => owner === name && !relative);
    return own && { value: own.value, si: key === "mass" ? "kg" : "kg*m^2" };
  }
  const element = assembly.elements.find((each) => each.name === name);
  if (element !== undefined) return elementValue(element, key);
  const drive = assembly.drives.find((each) => each.name === name);
  if (drive === undefined) return undefined;
  if (key === "frequency" || key === "speed") {
    const hz = drive.writtenHz;
    return hz === undefined || orderOf(drive.shape) !== 1 ? undefined : { value: hz, si: "Hz" };
  }
  return driveValue(drive.shape, key, drive.unit);
}

const ELEMENT_UNITS = {
  stiffness: ["N/m", "N*m/rad"],
  damping: ["N*s/m", "N*m*s/rad"],
  inertance: ["kg", "kg*m^2"],
} as const;

function elementValue(element: ElementInfo, key: string): Found | undefined {
  if (element.motion === "charge" || !(key in ELEMENT_UNITS)) return undefined;
  const own = key as keyof typeof ELEMENT_UNITS;
  const si = ELEMENT_UNITS[own][element.motion === "turning" ? 1 : 0];
  return { value: element[own] / element.count, si };
}

const orderOf = (shape: DriveShape): number => (shape.kind === "sine" ? shape.order : 1);

function driveValue(shape: DriveShape, key: string, unit: string): Found | undefined {
  if (key === "unbalance" && shape.kind === "unbalance") return { value: shape.unbalance, si: "kg*m" };
  if (key === "amplitude" && shape.kind === "sine" && shape.amplitude !== undefined) {
    return { value: shape.amplitude, si: unit };
  }
  if (key === "peak" && shape.kind === "pulse") return { value: shape.peak, si: unit };
  if (key === "duration" && shape.kind === "pulse") return { value: shape.duration, si: "s" };
  if (key === "step" && shape.kind === "step") return { value: shape.step, si: unit };
  return undefined;
}
