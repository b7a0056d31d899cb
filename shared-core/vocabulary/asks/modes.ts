import { ASK_HEAD } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, prose, statement } from "../statement.ts";

export const modes: StatementDescription = statement({
  keyword: "ask",
  variant: "modes",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    amount("up_to", "rate", "highest natural frequency to list", "200 Hz", { positive: true }),
    amount("count", "number", "most modes to list", "6", { positive: true }),
  ],
  quantities: [],
  says: "Natural frequencies, damping ratios, shapes, effective masses and energy shares.",
  text: prose(
    "Natural frequencies, damping ratios, shapes, the share of the moving mass that each mode carries,",
    "and the share of its strain energy in each element. Frequencies are undamped: dampers and loss",
    "factors are left out, and the damping ratio and the damped frequency come from the complex root that",
    "belongs to the mode.",
    "",
    "Free modes, in which nothing is strained, are all numbered 0; elastic ones count from 1. Roots",
    "without an undamped partner, as a spring and damper in series have, stand last without a number. The",
    "energy share says which spring to change to move a mode: where it is 97 %, ten per cent of stiffness",
    "are five per cent of frequency, and where it is 2 % they are nothing.",
  ),
  example: `thrum 1
title "Fan on its frame on the slab"

mass fan = 210 kg
mass frame = 160 kg
mass slab = 6.8 t
spring mounts between fan and frame = 136 N/mm
    loss_factor = 0.08
spring feet between frame and slab = 5.5 MN/m
spring soil between slab and ground = 180 MN/m
    loss_factor = 0.1

ask modes
    up_to = 200 Hz

expect soft_enough = natural_frequency(1) <= 5 Hz
expect apart = natural_frequency(2) / natural_frequency(1) >= 3
`,
  snippet: "ask modes",
});
