/**
 * Symbols of the trade, drawn about (0, 0) with their ends at (0, -23) above and (0, 23) below. `upper` parts go
 * with the upper end, `lower` ones with the lower, `both` are stretched between them.
 */
import type { ScenePart } from "./scene.ts";

export interface SymbolPart {
  readonly path: string;
  readonly style: ScenePart["style"];
  readonly goes: "upper" | "lower" | "both";
}

const both = (path: string, style: ScenePart["style"] = "line"): SymbolPart => ({
  path,
  style,
  goes: "both",
});
const upper = (path: string, style: ScenePart["style"] = "line"): SymbolPart => ({
  path,
  style,
  goes: "upper",
});
const lower = (path: string, style: ScenePart["style"] = "line"): SymbolPart => ({
  path,
  style,
  goes: "lower",
});

const SPRING = "M0,-23V-17L9,-14L-9,-8L9,-2L-9,4L9,10L-9,16L0,18V23";
const COIL = "M0,-23V-18A4.5,4.5 0 0 1 0,-9A4.5,4.5 0 0 1 0,0A4.5,4.5 0 0 1 0,9A4.5,4.5 0 0 1 0,18V23";

/** Springs, dampers and whatever else joins; a kind without one of its own is a plain box. */
export const SYMBOLS: Readonly<Record<string, readonly SymbolPart[]>> = {
  spring: [both(SPRING)],
  damper: [lower("M0,23V11M-9,-9V11H9V-9"), upper("M0,-23V1M-7,1H7")],
  inerter: [
    lower("M0,23V13M-9,-13V13H9V-13"),
    upper("M0,-23V6"),
    upper("M0,-6a6,6 0 1 0 0,12a6,6 0 1 0 0,-12Z", "body"),
  ],
  stop: [
    lower("M0,23V14L7,11L-7,6L0,4V2M-10,2H10"),
    upper("M0,-23V-8M-10,-8H10M-10,-8l4,-5M-3,-8l4,-5M4,-8l4,-5"),
  ],
  cord: [both("M0,-23C12,-12 -12,-4 0,4S8,16 0,23"), both("M-3,-23H3M-3,23H3")],
  friction: [
    upper("M-4,-23V8M-9,-14H-4"),
    lower("M4,23V-8M9,14H4"),
    both("M-4,-4L4,-8M-4,2L4,-2M-4,8L4,4", "thin"),
  ],
  mount: [
    both("M-13,-15H13V15H-13Z", "body"),
    both("M0,-23V-12L5,-9L-5,-4L5,1L-5,6L0,9V23"),
    both("M-10,-9L-6,9M10,-9L6,9", "thin"),
  ],
  inductor: [both(COIL)],
  resistor: [both("M0,-23V-14M0,14V23"), both("M-6,-14H6V14H-6Z", "body")],
  capacitor: [both("M0,-23V-3M-11,-3H11M-11,3H11M0,3V23")],
  mutual: [
    both(
      "M0,-23V-18M0,18V23M-3,-18A4.5,4.5 0 0 0 -3,-9A4.5,4.5 0 0 0 -3,0A4.5,4.5 0 0 0 -3,9A4.5,4.5 0 0 0 -3,18",
    ),
    both("M3,-18A4.5,4.5 0 0 1 3,-9A4.5,4.5 0 0 1 3,0A4.5,4.5 0 0 1 3,9A4.5,4.5 0 0 1 3,18M-3,-18H3M-3,18H3"),
  ],
  transducer: [
    both("M0,-23V-11M0,11V23"),
    both("M0,-11a11,11 0 1 0 0,22a11,11 0 1 0 0,-22Z", "body"),
    both("M-5,4L0,-6L5,4M-5,4H5", "thin"),
  ],
  feed: [both("M0,-23V-10M0,12V23", "dashed"), both("M-10,12H10L0,-10Z", "body")],
  bind: [
    both("M0,-16a8,8 0 1 0 0,16a8,8 0 1 0 0,-16Z", "body"),
    both("M0,0a8,8 0 1 0 0,16a8,8 0 1 0 0,-16Z", "body"),
    both("M0,-23V-16M0,16V23"),
  ],
  part: [
    both("M0,-23V-15M0,15V23"),
    both("M-13,-15H13V15H-13Z", "body"),
    both("M-10,-12H10V12H-10Z", "thin"),
  ],
  pendulum: [both("M0,-23V23")],
};

/** The same where they turn: a shaft with the lines of its twist, a disc in a bowl of oil. */
export const TURNING_SYMBOLS: Readonly<Record<string, readonly SymbolPart[]>> = {
  spring: [
    both("M0,-23V-17M0,17V23"),
    both("M-5,-17H5V17H-5Z", "body"),
    both("M-5,-5L5,-13M-5,3L5,-5M-5,11L5,3", "thin"),
  ],
  damper: [
    lower("M0,23V13M-11,-7V1A11,12 0 0 0 11,1V-7"),
    upper("M0,-23V0M-7,0H7"),
    upper("M-7,-3V3M7,-3V3"),
  ],
};

export const OTHER: readonly SymbolPart[] = [both("M0,-23V-12M0,12V23"), both("M-10,-12H10V12H-10Z", "body")];

/** What drives stands on its node at (0, 23); a motion under its support, at (0, -23). */
export const DRIVES: Readonly<Record<string, readonly SymbolPart[]>> = {
  force: [lower("M0,23V-6"), lower("M0,-18L6,-5H-6Z", "solid")],
  torque: [lower("M0,23V12M-10,4A11,11 0 1 1 10,4"), lower("M10,12L4.5,2.5L14.5,0.5Z", "solid")],
  voltage: [
    lower("M0,23V11"),
    lower("M0,-11a11,11 0 1 0 0,22a11,11 0 1 0 0,-22Z", "body"),
    lower("M-6,0C-4,-7 -1.5,-7 0,0S4,7 6,0"),
  ],
  motion: [
    upper("M-13,-15C-9,-21 -5,-21 0,-15S9,-9 13,-15", "thin"),
    upper("M0,-8V10"),
    upper("M0,-12L5,-3H-5ZM0,16L5,7H-5Z", "solid"),
  ],
  point: [lower("M0,23V8", "thin"), lower("M0,2a3,3 0 1 0 0,6a3,3 0 1 0 0,-6Z", "solid")],
};
