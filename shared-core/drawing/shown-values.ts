/** Values beside the symbols of a drawing, in the chosen units. */
import type { DriveShape, ElementInfo } from "../mechanics/assembly.ts";
import type { Instance, ParameterValue } from "../model/model.ts";
import { saysItself } from "../syntax/says-itself.ts";
import type { Expression, Item, StatementNode } from "../syntax/tree.ts";
import { isFault } from "../units/fault.ts";
import { isNumber } from "../units/quantity.ts";
import { formatQuantity, type UnitSystem } from "../units/show.ts";
import { unitOf } from "../units/unit-of.ts";
import type { ShowValue } from "./words.ts";

/**
 * Literals stay as written while the units are; everything else is put in numbers where there are some.
 * @param show an SI value with its unit as people see it; the SI unit as text
 */
export function shownValues(
  instance: Instance,
  system: UnitSystem,
  show: (si: string, value: number) => string,
): ShowValue {
  return (statement, key) => {
    const expression = expressionOf(statement, key);
    if (expression === undefined) return undefined;
    if (system === "as-written" && saysItself(expression)) return undefined;
    const parameter =
      expression.kind === "path" ? instance.parameters.get(expression.names[0].text) : undefined;
    if (parameter !== undefined) return parameterText(parameter, system);
    const found = computedValue(statement, key, instance);
    return found === undefined ? undefined : show(found.si, found.value);
  };
}

/** In the unit it is written in, or in that of the system; the spelling of a rate is no question of the system. */
function parameterText(parameter: ParameterValue, system: UnitSystem): string {
  const meaning = parameter.unitNode === undefined ? undefined : unitOf(parameter.unitNode);
  const unit = meaning === undefined || isFault(meaning) ? undefined : meaning;
  const kept = system === "as-written" || parameter.rate || isNumber(parameter);
  return formatQuantity(parameter, kept && unit ? { unit } : { system });
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
