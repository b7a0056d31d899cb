import type { HeadPart } from "../syntax/grammar.ts";
import type { DetailDescription, QuantityDescription } from "./description.ts";
import { amount, BETWEEN, detail, TURNING, wordAndPlace } from "./statement.ts";

/** Details that every joining element takes. */
export const COUNT_AND_LIKE: readonly DetailDescription[] = [
  amount("count", "number", "so many of them in parallel", "4", { positive: true, standard: "1" }),
  detail(
    "like",
    { is: "names", families: ["joins"] },
    "takes the details of another element; its own win",
    "mounts",
  ),
];

/** What can be asked of an element between two coordinates; of all of its count together. */
export const JOINT_QUANTITIES: readonly QuantityDescription[] = [
  { name: "travel", measure: "travel", says: "displacement of A minus that of B" },
  { name: "twist", measure: "travel", says: "angle of A minus that of B", whenMotion: TURNING },
  { name: "rate", measure: "speed", says: "rate of its travel" },
  { name: "force", measure: "force", says: "force that pulls its ends together" },
  { name: "torque", measure: "force", says: "torque that turns its ends together", whenMotion: TURNING },
  {
    name: "power",
    measure: "power",
    says: "power that goes into it; in a steady answer the mean of a cycle",
  },
  { name: "energy", measure: "energy", says: "energy stored in it" },
];

/** What can be asked of an element of a circuit. */
export const CIRCUIT_QUANTITIES: readonly QuantityDescription[] = [
  { name: "voltage", measure: "voltage", says: "voltage across it" },
  { name: "charge", measure: "charge", says: "charge that has passed it" },
  { name: "current", measure: "current", says: "current through it" },
  { name: "power", measure: "power", says: "power that goes into it" },
  { name: "energy", measure: "energy", says: "energy stored in it" },
];

/** `in LOOP`, or `between LOOP and LOOP` for what two loops share. */
export const IN_LOOP_OR_BETWEEN: HeadPart = { kind: "either", ways: [wordAndPlace("in"), BETWEEN] };
