import { TURN_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, NAME, prose, statement } from "./statement.ts";

export const inertia: StatementDescription = statement({
  keyword: "inertia",
  family: "moves",
  head: [NAME],
  value: "optional",
  principal: "inertia",
  details: [
    amount("inertia", "inertia", "moment of inertia about its axis", "0.8 kg*m^2", {
      positive: true,
      required: true,
    }),
    amount("starts_at", "travel", "angle at t = 0", "2 deg", { standard: "0 deg" }),
    amount("starts_moving", "speed", "turning speed at t = 0", "30 rpm", { standard: "0 rpm" }),
  ],
  quantities: TURN_QUANTITIES,
  says: "A rotor, disc or lever that turns about one axis.",
  text: prose(
    "Something that turns about one axis: a rotor, a flywheel, a gear, a lever. Its coordinate is an",
    "angle. Springs and dampers between inertias are torsional by that alone, with the same keywords:",
    "stiffness in N*m/rad, damping in N*m*s/rad, `.twist` and `.torque` beside `.travel` and `.force`.",
    "",
    "Moments of inertia of plain shapes come from `disc`, `ring` and `rod`. In a drive line with gears",
    "each wheel keeps its own inertia and its own angle, and `bind` ties the angles; the squares of the",
    "ratio then come out of the equations and need not be put in by hand.",
    "",
    "`speed` of a rotor is a rate: 1180 rpm and 123.6 rad/s are the same number to the model.",
  ),
  example: `thrum 1
title "Winch: motor and drum on one shaft"

inertia motor = 0.62 kg*m^2
inertia drum = disc(310 kg, 0.28 m)
spring drive_shaft between motor and drum = shaft(80 GPa, 55 mm, 0.9 m)
    damping_ratio = 1 % at 40 Hz

torque ripple on motor
    amplitude = 12 N*m

ask sweep start_up
    of = drive_shaft.torque, drum.speed
    by = ripple
    from = 2 Hz
    to = 120 Hz

expect clear_of_poles = separation(1, 100 Hz) >= 20 %
`,
  snippet: "inertia $1 = $2 kg*m^2",
  assemble: (values, builder) => {
    builder.inertia(values.name, values.end("name"), values.number("inertia") ?? 0);
  },
});
