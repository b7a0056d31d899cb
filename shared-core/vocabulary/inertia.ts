import { TURN_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "inertia $1 = $2 kg*m^2",
  assemble: (values, builder) => {
    builder.inertia(values.name, values.end("name"), values.number("inertia") ?? 0);
  },
});
