import type { StatementDescription } from "./description.ts";
import { NAME, prose, statement } from "./statement.ts";

export const kit: StatementDescription = statement({
  keyword: "kit",
  family: "file",
  head: [
    NAME,
    { kind: "parameters", slot: "parameters", optional: true },
    { kind: "word", word: "between" },
    { kind: "name", slot: "a" },
    { kind: "word", word: "and" },
    { kind: "name", slot: "b" },
  ],
  value: "none",
  details: [],
  holdsStatements: true,
  quantities: [],
  says: "A reusable assembly between two places, with parameters.",
  text: prose(
    "An assembly that is used more than once, written once: a mount with its oil and its stop, a shaft",
    "with its coupling. Its details are statements of their own, one level of indentation deeper than its",
    "head. Inside, the two places and the parameters hide outer names of the same spelling; everything",
    "else of the file can be seen.",
    "",
    "A kit by itself moves nothing. `part` places it between two things and gives its parameters their",
    "values; `part left = foot(48 N/mm) between pump and slab` has an inner spring `left.rubber`. Each",
    "part has its own draw of a tolerance that is written inside the kit.",
  ),
  example: `thrum 1
title "Two pumps on feet of one kind"

kit foot(stiffness) between above and below
    junction middle
    spring rubber between above and middle = stiffness
        loss_factor = 0.1
    spring plate between middle and below = 4 * stiffness

mass pump = 240 kg
mass fan = 95 kg

part pump_foot = foot(210 N/mm) between pump and ground
part fan_foot = foot(80 N/mm) between fan and ground

expect separate = natural_frequency(1) <= 6 Hz
`,
  snippet: "kit $1($2) between $3 and $4\n    $5",
  notYet: true,
});
