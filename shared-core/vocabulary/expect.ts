import type { StatementDescription } from "./description.ts";
import { amount, detail, NAME, statement } from "./statement.ts";

export const expect: StatementDescription = statement({
  keyword: "expect",
  family: "holds",
  head: [NAME],
  value: "required",
  details: [
    amount("margin", "share", "warn when less than this share of the limit is left", "10 %"),
    detail(
      "cases",
      { is: "names", families: ["numbers"], keywords: ["case"] },
      "the cases it is judged in",
      "winter, full_load",
      {
        standard: "all",
      },
    ),
    detail(
      "tolerance",
      { is: "tolerance" },
      "nominal values, every corner of the bands, or the share of draws that must hold",
      "worst_case",
      { standard: "nominal" },
    ),
  ],
  quantities: [],
  says: "A comparison that must hold; a build fails with it.",
  text: "",
  example: "",
  snippet: "expect $1 = $2 <= $3 Hz",
});
