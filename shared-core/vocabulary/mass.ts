import { LINE_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "mass $1 = $2 kg",
  assemble: (values, builder) => {
    builder.inertia(values.name, values.end("name"), values.number("mass") ?? 0);
  },
});
