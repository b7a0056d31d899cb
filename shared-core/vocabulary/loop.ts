import { LOOP_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, NAME, statement } from "./statement.ts";

export const loop: StatementDescription = statement({
  keyword: "loop",
  family: "moves",
  head: [NAME],
  value: "none",
  details: [
    amount("starts_at", "charge", "charge at t = 0", "2 uC", { standard: "0 C" }),
    amount("starts_moving", "current", "current at t = 0", "20 mA", { standard: "0 A" }),
  ],
  quantities: LOOP_QUANTITIES,
  says: "One loop of a circuit; its coordinate is the charge that has passed.",
  text: "",
  example: "",
  snippet: "loop $1",
  notYet: true,
});
