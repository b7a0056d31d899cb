import { ASK_HEAD, WATCH } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, detail, prose, statement } from "../statement.ts";

export const vary: StatementDescription = statement({
  keyword: "ask",
  variant: "vary",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    detail(
      "change",
      { is: "changes" },
      "one or two numbers and the range each runs through",
      "mount from 15 N/mm to 40 N/mm",
      {
        required: true,
      },
    ),
    amount("points", "number", "points for each number", "25", { positive: true, standard: "21" }),
    WATCH,
  ],
  quantities: [],
  says: "Each watched quantity against one or two parameters.",
  text: prose(
    'Each watched quantity against one parameter, or over a field of two. It answers "what if" for a',
    "whole range at once: how soft may the mount be, how far apart must the feet stand, where do two",
    "modes cross.",
    "",
    "`change` names a `let` and the range it runs through, which need not be its tolerance. `watch` takes",
    "any expression that an expectation could hold. All other numbers stay nominal.",
  ),
  example: `thrum 1
title "How soft may the fan's mounts be"

let mount = 34 N/mm +/- 10 %

mass fan = 210 kg
spring mounts between fan and ground = mount
    count = 4
    loss_factor = 0.08

ask vary softness
    change = mount from 15 N/mm to 80 N/mm
    points = 31
    watch = natural_frequency(1), static_deflection(mounts)

expect soft_enough = natural_frequency(1) <= 5 Hz
`,
  snippet: "ask vary $1\n    change = $2 from $3 N/mm to $4 N/mm\n    watch = $5",
  notYet: true,
});
