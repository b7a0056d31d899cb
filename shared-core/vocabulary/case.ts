import type { StatementDescription } from "./description.ts";
import { NAME, prose, statement } from "./statement.ts";

export const caseStatement: StatementDescription = statement({
  keyword: "case",
  family: "numbers",
  head: [NAME],
  value: "none",
  details: [],
  openDetails: true,
  quantities: [],
  says: "The model again with some numbers replaced.",
  text: prose(
    "The model again with some of its numbers replaced: the tank empty, the winter rubber, the second",
    "speed. Each detail names a `let` and gives it another value; everything else stays as written. A",
    "bare value keeps the tolerance in percent and the range of the `let`.",
    "",
    "Every ask is answered and every expectation judged as written and in each case, unless an",
    "expectation names its `cases`. A case never adds or removes parts. Where a part comes and goes, give",
    "it a number that may become very small, or write a second file that uses the first one's numbers.",
  ),
  example: `thrum 1
title "Fuel day tank on its platform"

let contents = 1450 kg
let platform = 2.6 MN/m

mass tank = 380 kg + contents
spring frame between tank and ground = platform
    loss_factor = 0.02

case empty
    contents = 0 kg

case after_repair
    platform = 3.4 MN/m

expect above_wave_slap = natural_frequency(1) >= 4 Hz
`,
  snippet: "case $1\n    $2 = $3",
});
