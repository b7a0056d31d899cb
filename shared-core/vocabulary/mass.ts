import { LINE_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, NAME, prose, statement } from "./statement.ts";

export const mass: StatementDescription = statement({
  keyword: "mass",
  family: "moves",
  head: [NAME],
  value: "optional",
  principal: "mass",
  details: [
    amount("mass", "mass", "the mass", "420 kg", { positive: true, required: true }),
    amount("starts_at", "travel", "displacement at t = 0", "2 mm", { standard: "0 mm" }),
    amount("starts_moving", "speed", "velocity at t = 0", "0.5 m/s", { standard: "0 m/s" }),
    choice("weight", ["off", "positive", "negative"], "direction of its coordinate in which gravity pulls"),
  ],
  quantities: LINE_QUANTITIES,
  says: "A mass that moves along one line.",
  text: prose(
    "Something that is displaced along one line and resists acceleration. Its coordinate is the",
    "displacement from the unstressed position, positive in the direction the author has in mind; all",
    "masses of a model in one line share that direction. What moves in more than one direction, or tilts,",
    "is a `body`.",
    "",
    "`weight` says in which direction of the coordinate gravity pulls, and is off unless it is said: most",
    "models speak of motion about rest, where weight is only a preload. `static_deflection` and",
    "`static_force` let gravity act on every mass in its positive direction whatever `weight` says,",
    "because that is how a spring is sized.",
    "",
    "`starts_at` and `starts_moving` matter to histories only. A weight in lbf is not a mass in lbm; the",
    "message says so and offers the other unit.",
  ),
  example: `thrum 1
title "Winch motor let go 3 mm above rest"

mass motor = 185 kg
    starts_at = 3 mm
spring feet between motor and ground = 240 N/mm
    damping_ratio = 4 % at 5.7 Hz

ask history ring_down
    of = motor.displacement
    lasting = 4 s

expect calm = settling_time(ring_down, motor.displacement, 0.3 mm) <= 3 s
`,
  snippet: "mass $1 = $2 kg",
  assemble: (values, builder) => {
    builder.inertia(values.name, values.end("name"), values.number("mass") ?? 0);
  },
});
