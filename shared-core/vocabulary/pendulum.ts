import { TURN_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, detail, NAME, prose, statement, TURNING } from "./statement.ts";

export const pendulum: StatementDescription = statement({
  keyword: "pendulum",
  family: "moves",
  head: [NAME],
  value: "optional",
  principal: "mass",
  details: [
    amount("mass", "mass", "mass of the bob", "850 kg", { positive: true, required: true }),
    amount("length", "length", "from the pivot to the centre of gravity", "6.2 m", {
      positive: true,
      required: true,
    }),
    amount("inertia", "inertia", "moment of inertia about the centre of gravity", "40 kg*m^2", {
      standard: "0 kg*m^2",
    }),
    detail(
      "on",
      { is: "names", families: ["moves"], keywords: ["mass", "body", "point", "pendulum"] },
      "what its pivot rides on; on a body with the direction",
      "trolley",
      { standard: "fixed" },
    ),
    choice("hangs", ["down", "up"], "below its pivot, or standing above it"),
    amount("swing", "angle", "largest angle that the work allows", "12 deg"),
    amount("damping", "damping", "damping of the angle against what it rides on", "45 N*m*s/rad", {
      standard: "0 N*m*s/rad",
      whenMotion: TURNING,
    }),
    amount("starts_at", "travel", "angle at t = 0", "2 deg", { standard: "0 deg" }),
    amount("starts_moving", "speed", "turning speed at t = 0", "30 rpm", { standard: "0 rpm" }),
  ],
  quantities: TURN_QUANTITIES,
  says: "A pendulum, on a fixed pivot or on something that moves.",
  text: prose(
    "A load on a rope, a bell, a swinging gate, or a mast that stands on its foot (`hangs = up`). Its",
    "coordinate is the absolute angle; positive moves the bob along the positive coordinate of what its",
    "pivot rides on. A point mass on a light rope has `inertia` 0; a rod has m L^2/12 about its centre",
    "and a `length` to its centre.",
    "",
    "Small swings are linear and take part in the modes like any other coordinate. The period grows with",
    "the swing: about a^2/16 for an angle a, 0.2 % at 10 deg, 1.7 % at 30 deg. State the largest angle",
    "the work allows as `swing`, and the model says when the linear answer goes out of step; `period`",
    "gives the exact value.",
    "",
    "An upright pendulum needs something that holds it up. Where the stiffness does not suffice,",
    "`static-instability` names it.",
  ),
  example: `thrum 1
title "Load on the crane trolley"

mass trolley = 1.6 t
spring drive between trolley and ground = 90 N/mm
    damping_ratio = 3 % at 1.2 Hz
pendulum load = 850 kg
    length = 6.2 m
    on = trolley
    swing = 12 deg

expect slow_swing = period(load, 12 deg) <= 5.2 s
`,
  snippet: "pendulum $1 = $2 kg\n    length = $3 m",
  notYet: true,
});
