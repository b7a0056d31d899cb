import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, prose, statement } from "./statement.ts";

export const cord: StatementDescription = statement({
  keyword: "cord",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "stiffness",
  details: [
    amount("stiffness", "stiffness", "stiffness once it is taut", "85 kN/m", {
      positive: true,
      required: true,
    }),
    amount("slack", "travel", "travel before it is taut", "0.4 m", { standard: "0 m" }),
    amount("damping", "damping", "damping while it is taut", "1.5 kN*s/m", { standard: "0 N*s/m" }),
    amount("rated_force", "force", "tension that one may see; more is warned of", "60 kN", {
      positive: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [...JOINT_QUANTITIES, { name: "tension", measure: "force", says: "its pull, never negative" }],
  says: "A rope or chain: pulls once its slack is taken up, never pushes.",
  text: prose(
    "A rope, a chain, a sling, a mooring line: it pulls once its slack is taken up and never pushes. Its",
    "tension is stiffness times what lies beyond the slack, plus damping while it is taut, and zero where",
    "that would be negative.",
    "",
    "A line that is taut at rest and stays so behaves as a spring does, and the modes say so. One that",
    "goes slack and snatches does not: ask for a history and read `.tension`. The stiffness of a rope is",
    "E A / L with the modulus of the rope, not of the wire it is made of.",
  ),
  example: `thrum 1
title "Survey skiff brought up by its mooring line"

mass skiff = 680 kg
    starts_moving = -0.6 m/s
cord line between ground and skiff = 24 kN/m
    slack = 0.3 m
    damping = 0.9 kN*s/m
    rated_force = 8 kN

ask history snatch
    of = skiff.displacement, line.tension
    lasting = 12 s

expect line_holds = peak(snatch, line.tension) <= 6 kN
`,
  snippet: "cord $1 between $2 and $3 = $4 kN/m\n    slack = $5 m",
  notYet: true,
});
