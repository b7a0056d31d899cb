import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, choice, NAME, prose, statement } from "./statement.ts";

export const stop: StatementDescription = statement({
  keyword: "stop",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "stiffness",
  details: [
    amount("stiffness", "stiffness", "stiffness once it is touched", "2 MN/m", {
      positive: true,
      required: true,
    }),
    amount("gap", "travel", "travel before it is touched", "12 mm", { standard: "0 mm" }),
    amount("damping", "damping", "damping while it is touched", "600 N*s/m", { standard: "0 N*s/m" }),
    choice(
      "side",
      ["above", "below", "both"],
      "whether it acts at travel above the gap, below minus the gap, or both",
    ),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "An elastic stop that acts beyond a gap and never pulls.",
  text: prose(
    "A rubber or steel buffer that is touched only after a `gap` and pushes back from there. With `side =",
    "above` it acts where travel is larger than the gap, with `below` where it is smaller than minus the",
    "gap, with `both` at either end. Damping acts in contact only, and the sum of the two never pulls: a",
    "damper that would hold the parts together is cut off at zero force.",
    "",
    "A model with a stop is non-linear. Modes are those at its equilibrium, with the stop touched or not",
    "as it then is, and a history follows every contact to the accuracy asked for.",
  ),
  example: `thrum 1
title "Ferry ramp against its rubber stop"

mass ramp = 3.4 t
    starts_moving = 0.2 m/s
spring wire between ramp and ground = 140 kN/m
damper brake between ramp and ground = 4 kN*s/m
stop rubber between ramp and ground = 2.2 MN/m
    gap = 15 mm
    damping = 6 kN*s/m

ask history landing
    of = ramp.displacement, rubber.force
    lasting = 4 s

expect stop_holds = peak(landing, rubber.force) <= 25 kN
`,
  snippet: "stop $1 between $2 and $3 = $4 MN/m\n    gap = $5 mm",
  notYet: true,
});
