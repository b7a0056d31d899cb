import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE } from "./joining.ts";
import { amount, BETWEEN, NAME, prose, statement } from "./statement.ts";

export const transducer: StatementDescription = statement({
  keyword: "transducer",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "factor",
  details: [
    amount("factor", "force_factor", "force over current, which is voltage over rate", "4 N/A", {
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [
    { name: "force", measure: "force", says: "force on the coordinate, factor times current" },
    { name: "voltage", measure: "voltage", says: "voltage in the loop, factor times rate" },
  ],
  says: "Couples a coordinate and a loop: coil and magnet, motor and generator.",
  text: prose(
    "Couples a coordinate and a loop: a coil in a magnet, a geophone, a motor, a generator. One `factor`",
    "does both: the force on the coordinate is factor times current, and the loop sees a voltage of",
    "factor times rate. N/A and V*s/m are one unit, which is why the two are one number and the coupling",
    "loses nothing.",
    "",
    "Short-circuited, the coil brakes: it adds a damping of about factor^2/R below the frequency R/(2 pi",
    "L). The undamped modes leave transducers out, as they leave dampers out; their effect stands in the",
    "damping ratios and the decay.",
  ),
  example: `thrum 1
title "Geophone on the quay wall, coil closed over its shunt"

mass coil_former = 11 g
spring leaf between coil_former and ground = 43 N/m
loop circuit
inductor coil in circuit = 20 mH
resistor shunt in circuit = 1.4 kohm
transducer magnet between coil_former and circuit = 28 N/A

expect well_damped = damping_ratio(1) >= 30 %
`,
  snippet: "transducer $1 between $2 and $3 = $4 N/A",
  notYet: true,
});
