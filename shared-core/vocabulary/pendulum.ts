import { TURN_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, detail, NAME, statement, TURNING } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "pendulum $1 = $2 kg\n    length = $3 m",
  notYet: true,
});
