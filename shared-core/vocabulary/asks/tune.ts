import { ASK_HEAD, CHANGE_LETS } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { detail, statement } from "../statement.ts";

export const tune: StatementDescription = statement({
  keyword: "ask",
  variant: "tune",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    CHANGE_LETS,
    detail("least", { is: "expressions" }, "what is to be as small as can be", "peak(run_up, unit.velocity)"),
    detail("most", { is: "expressions" }, "what is to be as large as can be", "stability_margin()"),
    detail(
      "keep",
      { is: "names", families: ["holds"], keywords: ["expect"] },
      "expectations that must hold",
      "soft_enough",
    ),
  ],
  quantities: [],
  says: "The best values of some numbers inside their ranges.",
  text: "",
  example: "",
  snippet: "ask tune $1\n    change = $2\n    least = $3",
  notYet: true,
});
