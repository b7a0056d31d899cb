import type { QuantityDescription } from "./description.ts";
import { SLIDING, TURNING } from "./statement.ts";

/** Directions of a body, a point and a support of kind body. */
export const DIRECTIONS: readonly string[] = ["x", "y", "z", "rx", "ry", "rz"];

/** What can be asked of a coordinate that is displaced. */
export const LINE_QUANTITIES: readonly QuantityDescription[] = [
  {
    name: "displacement",
    measure: "travel",
    says: "displacement from the unstressed position",
    whenMotion: SLIDING,
  },
  { name: "velocity", measure: "speed", says: "velocity", whenMotion: SLIDING },
  { name: "acceleration", measure: "acceleration", says: "acceleration", whenMotion: SLIDING },
];

/** What can be asked of a coordinate that turns. */
export const TURN_QUANTITIES: readonly QuantityDescription[] = [
  { name: "angle", measure: "travel", says: "angle from the unstressed position", whenMotion: TURNING },
  { name: "speed", measure: "speed", says: "turning speed, a rate", whenMotion: TURNING },
  {
    name: "angular_acceleration",
    measure: "acceleration",
    says: "angular acceleration",
    whenMotion: TURNING,
  },
];

/** What can be asked of a coordinate of either sort. */
export const COORDINATE_QUANTITIES: readonly QuantityDescription[] = [...LINE_QUANTITIES, ...TURN_QUANTITIES];

/** What can be asked of a circuit loop. */
export const LOOP_QUANTITIES: readonly QuantityDescription[] = [
  { name: "charge", measure: "charge", says: "charge that has passed" },
  { name: "current", measure: "current", says: "current" },
];
