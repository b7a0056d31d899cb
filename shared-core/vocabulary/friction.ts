import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE, JOINT_QUANTITIES } from "./joining.ts";
import { amount, BETWEEN, NAME, prose, statement } from "./statement.ts";

export const friction: StatementDescription = statement({
  keyword: "friction",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "force",
  details: [
    amount("force", "force", "friction force while it slides", "1.8 kN", { positive: true, required: true }),
    amount("static_force", "force", "friction force it takes to break away", "2.3 kN", {
      positive: true,
      standard: "the force while it slides",
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: JOINT_QUANTITIES,
  says: "Coulomb friction: a constant force against the rate, or sticking.",
  text: prose(
    "Coulomb friction: a force of constant size against the rate while the parts slide, and whatever is",
    "needed up to the static force while they stick. Left out, `static_force` is the same as the force",
    "while sliding.",
    "",
    "Friction has no place in the linear modes; they are those of the parts sliding freely, and the hint",
    "says so. In a history every change between sticking and sliding is found, not stepped over. A free",
    "decay under friction alone loses 4 F/k of amplitude per cycle and comes to rest off centre, which is",
    "how a friction force is measured.",
  ),
  example: `thrum 1
title "Sliding hatch on its rails"

mass hatch = 74 kg
    starts_at = 60 mm
spring buffer between hatch and ground = 5.2 kN/m
friction rails between hatch and ground = 38 N
    static_force = 52 N

ask history let_go
    of = hatch.displacement
    lasting = 5 s

expect at_rest_soon = settling_time(let_go, hatch.displacement, 8 mm) <= 3 s
`,
  snippet: "friction $1 between $2 and $3 = $4 kN",
  notYet: true,
});
