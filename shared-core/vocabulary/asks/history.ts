import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, prose, statement } from "../statement.ts";

export const history: StatementDescription = statement({
  keyword: "ask",
  variant: "history",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("lasting", "time", "how long it runs, from t = 0", "2 s", { positive: true, required: true }),
    amount("step", "time", "spacing of the stored answer; the integration chooses its own", "1 ms", {
      positive: true,
    }),
    amount("accuracy", "number", "relative error of each peak", "1e-8", { positive: true, standard: "1e-6" }),
    choice("start", ["as_written", "at_rest"], "from the written start values, or from static equilibrium"),
  ],
  quantities: [],
  says: "The response in time to its drives and start values.",
  text: prose(
    "The response in time, from t = 0 for as long as it is `lasting`. It begins with the start values as",
    "written, or with `start = at_rest` in the static equilibrium under gravity, preloads and steady",
    "loads.",
    "",
    "`accuracy` is the relative error of each peak, and the integration chooses its steps for it; `step`",
    "is only the spacing at which the answer is stored. Kinks of the drives, contacts and changes between",
    "sticking and sliding are met exactly. `peak`, `highest`, `lowest` and `settling_time` are found",
    "between stored points too.",
    "",
    "Structural damping has no exact meaning in time. It stands as the modal damping of the mode table,",
    "which `loss-in-time` hints at; where that matters, write a damper.",
  ),
  example: `thrum 1
title "Winch brake closes on the drum"

inertia drum = 14 kg*m^2
inertia motor = 0.9 kg*m^2
spring drive_shaft between motor and drum = 85 kN*m/rad
    damping_ratio = 2 % at 50 Hz
spring rope between drum and ground = 12 kN*m/rad
    damping_ratio = 3 % at 4.5 Hz

torque brake on motor
    pulse = trapezoid
    peak = 900 N*m
    duration = 0.8 s
    rise = 40 ms
    fall = 0.2 s

ask history braking
    of = drive_shaft.torque, drum.angle
    by = brake
    lasting = 4 s

expect shaft_safe = peak(braking, drive_shaft.torque) <= 2 kN*m
`,
  snippet: "ask history $1\n    of = $2\n    lasting = $3 s",
});
