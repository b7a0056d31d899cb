import { LOOP_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, NAME, prose, statement } from "./statement.ts";

export const loop: StatementDescription = statement({
  keyword: "loop",
  family: "moves",
  head: [NAME],
  value: "none",
  details: [
    amount("starts_at", "charge", "charge at t = 0", "2 uC", { standard: "0 C" }),
    amount("starts_moving", "current", "current at t = 0", "20 mA", { standard: "0 A" }),
  ],
  quantities: LOOP_QUANTITIES,
  says: "One loop of a circuit; its coordinate is the charge that has passed.",
  text: prose(
    "One loop of an electrical circuit. Its coordinate is the charge that has passed, so that inductance",
    "stands where mass stands, resistance where damping stands and the inverse of capacitance where",
    "stiffness stands; `.current` is its velocity.",
    "",
    "Elements that carry the current of one loop are written `in` it. An element that two loops share is",
    "written `between` them and carries the difference of their currents: choose loops as one does for",
    "mesh equations. A loop without a capacitor is no free mode, because a steady current there is no",
    "rigid motion of anything.",
  ),
  example: `thrum 1
title "Filter of the foghorn supply"

loop supply
inductor choke in supply = 12 mH
resistor winding in supply = 1.8 ohm
capacitor smoothing in supply = 470 uF

expect below_mains = natural_frequency(1) <= 100 Hz
`,
  snippet: "loop $1",
  notYet: true,
});
