/** Numbers as they stand in a sentence: four digits at most, a fitting unit. */
import type { Motion } from "../mechanics/assembly.ts";
import type { Kind } from "../units/dimension.ts";
import { dimension, kindOf, quantity, rate as rateOf } from "../units/quantity.ts";
import { formatNumber, formatQuantity } from "../units/show.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { kindOfUnit } from "./unit-text.ts";

export const number = (value: number): string => formatNumber(value);

/** Two digits are enough for how many times. */
export const factor = (value: number): string =>
  value >= 100 ? formatNumber(Math.round(value)) : formatNumber(value, 2);

export const percent = (share: number): string => `${formatNumber(share * 100, 3)} %`;

export const rate = (hertz: number): string => formatQuantity(rateOf(hertz));

export const time = (seconds: number): string => formatQuantity(quantity(seconds, dimension(0, 0, 1)));

/** A travel: metres, or degrees where it turns. */
export const length = (travel: number, motion: Motion = "sliding"): string =>
  motion === "turning" ? degrees(travel) : measured(travel, "travel", motion);

export const force = (value: number, motion: Motion = "sliding"): string => measured(value, "force", motion);

export const perLength = (stiffness: number, motion: Motion = "sliding"): string =>
  measured(stiffness, "stiffness", motion);

/** An SI value in its unit as answers write it. */
export const inUnit = (value: number, unit: string): string =>
  unit === "rad" ? degrees(value) : formatQuantity({ ...kindOfUnit(unit), value: inHertz(value, unit) });

/** A name or text of the model, marked as such. */
export const quoted = (text: string): string => `\`${text}\``;

/** `a`, `a and b`, `a, b and c`. */
export function list(names: readonly string[]): string {
  return names.length < 2
    ? (names[0] ?? "")
    : `${names.slice(0, -1).join(", ")} and ${names[names.length - 1]}`;
}

const NUMBER: Kind = kindOf(dimension());

function measured(value: number, measure: "travel" | "force" | "stiffness", motion: Motion): string {
  return formatQuantity({ ...(dimensionOf(measure, motion) ?? NUMBER), value });
}

const degrees = (radians: number): string => `${formatNumber((radians * 180) / Math.PI)} deg`;

const inHertz = (value: number, unit: string): number => (unit === "rad/s" ? value / (2 * Math.PI) : value);
