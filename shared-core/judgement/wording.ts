/** Numbers as an engineer writes them in a sentence: four digits at most, a fitting unit. */
import type { Motion } from "../mechanics/assembly.ts";

/** `12`, `0.035`, `1.2e-9`: four digits, no trailing zeros. */
export function number(value: number): string {
  if (!Number.isFinite(value)) return value > 0 ? "infinity" : value < 0 ? "-infinity" : "no number";
  if (value === 0) return "0";
  const size = Math.abs(value);
  if (size < 1e-3 || size >= 1e6) return plain(value.toExponential(3));
  return plain(size >= 1000 ? value.toFixed(0) : value.toPrecision(4));
}

function plain(text: string): string {
  const [mantissa, exponent] = text.split("e");
  const short = mantissa.includes(".") ? mantissa.replace(/\.?0+$/, "") : mantissa;
  return exponent === undefined ? short : `${short}e${exponent.replace("+", "")}`;
}

/** Two digits are enough for how many times. */
export const factor = (value: number): string =>
  value >= 100 ? value.toFixed(0) : plain(value.toPrecision(2));

export const percent = (share: number): string => `${number(Number((share * 100).toPrecision(3)))} %`;

const withPrefix = (
  value: number,
  unit: string,
  prefixes: readonly (readonly [number, string])[],
): string => {
  const size = Math.abs(value);
  const [scale, prefix] =
    prefixes.find(([from]) => size >= from * (1 - 1e-9)) ?? prefixes[prefixes.length - 1];
  return `${number(value / scale)} ${prefix}${unit}`;
};

const UPWARDS = [
  [1e9, "G"],
  [1e6, "M"],
  [1e3, "k"],
  [1, ""],
] as const;
const BOTH = [...UPWARDS, [1e-3, "m"], [1e-6, "u"], [1e-9, "n"]] as const;

export const rate = (hertz: number): string => withPrefix(hertz, "Hz", UPWARDS);
export const time = (seconds: number): string =>
  seconds === 0 ? "0 s" : withPrefix(seconds, "s", BOTH.slice(3));

/** A travel: m, or degrees where it turns. */
export function length(metres: number, motion: Motion = "sliding"): string {
  if (motion === "turning") return `${number((metres * 180) / Math.PI)} deg`;
  if (metres === 0) return "0 m";
  return withPrefix(metres, motion === "charge" ? "C" : "m", BOTH.slice(3));
}

const FORCE_UNIT: Readonly<Record<Motion, string>> = { sliding: "N", turning: "N*m", charge: "V" };

export const force = (newtons: number, motion: Motion = "sliding"): string =>
  newtons === 0 ? `0 ${FORCE_UNIT[motion]}` : withPrefix(newtons, FORCE_UNIT[motion], BOTH.slice(0, 5));

/** A stiffness: N/mm below 1 kN/mm, where most springs are listed. */
export function perLength(stiffness: number, motion: Motion = "sliding"): string {
  if (motion === "turning") return withPrefix(stiffness, "N*m/rad", UPWARDS);
  if (motion === "charge") return `${number(stiffness)} V/C`;
  const size = Math.abs(stiffness);
  if (size < 1e3) return `${number(stiffness)} N/m`;
  return size < 1e6 ? `${number(stiffness / 1e3)} N/mm` : withPrefix(stiffness, "N/m", UPWARDS);
}

const PREFIXED = new Set(["m", "N", "N*m", "m/s", "Hz", "s", "V", "A", "W", "J"]);

/** An SI value in its unit, with a prefix where one is usual. */
export function inUnit(value: number, unit: string): string {
  if (unit === "1" || unit === "") return number(value);
  if (unit === "rad") return `${number((value * 180) / Math.PI)} deg`;
  if (value === 0 || !PREFIXED.has(unit)) return `${number(value)} ${unit}`;
  return withPrefix(value, unit, BOTH);
}

/** `a`, `a and b`, `a, b and c`. */
export function list(names: readonly string[]): string {
  return names.length < 2
    ? (names[0] ?? "")
    : `${names.slice(0, -1).join(", ")} and ${names[names.length - 1]}`;
}
