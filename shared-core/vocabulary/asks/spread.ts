import { ASK_HEAD, WATCH } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, prose, statement } from "../statement.ts";

export const spread: StatementDescription = statement({
  keyword: "ask",
  variant: "spread",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    amount("samples", "number", "models drawn", "2000", { positive: true, standard: "1000" }),
    amount("seed", "number", "start of the random numbers", "7", { standard: "1" }),
    WATCH,
  ],
  quantities: [],
  says: "What the tolerances do: the distribution of each watched quantity and the share that holds.",
  text: prose(
    "What the tolerances do together. Each written `+/-` is drawn once a sample, the model is answered,",
    "and the answer is the distribution of each watched quantity and the share of samples in which each",
    "expectation holds. The seed fixes the draws: the same file gives the same numbers, and a run split",
    "over machines gives exactly the unsplit answer.",
    "",
    "A share needs samples: with 1000 of them a share near 99 % is known to about 0.3 %. Where every",
    "corner must hold, `tolerance = worst_case` on the expectation is the sharper question.",
  ),
  example: `thrum 1
title "Rubber of the fan's mounts as it is delivered"

let rubber = 34 N/mm +/- 15 % normal
let fan_mass = 210 kg +/- 3 %

mass fan = fan_mass
spring mounts between fan and ground = 4 * rubber

ask spread delivered
    samples = 2000
    seed = 11
    watch = natural_frequency(1)

expect soft_enough = natural_frequency(1) <= 4.5 Hz
`,
  snippet: "ask spread $1\n    samples = $2\n    watch = $3",
  notYet: true,
});
