import { ASK_HEAD, CHANGE_LETS } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { detail, prose, statement } from "../statement.ts";

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
  text: prose(
    "The best values of some numbers inside the ranges written behind `within`: the smallest or largest",
    "value of an expression, with the expectations in `keep` holding. An absorber on a beam, a damper",
    "between two floors, the stiffness that splits two modes evenly.",
    "",
    "The search starts from the written values and from others in the range, and says what it found, not",
    "that nothing better exists. Where no values keep the expectations, `tune-impossible` names the one",
    "that stands in the way. The found values can be written back into the text.",
  ),
  example: `thrum 1
title "Absorber for the footbridge to the pontoon"

let absorber = 5.6 kN/m within 3 kN/m to 9 kN/m
let oil = 110 N*s/m within 20 N*s/m to 400 N*s/m

mass bridge = 3.1 t
spring deck between bridge and ground = 430 kN/m
mass block = 62 kg
spring coil between block and bridge = absorber
damper dashpot between block and bridge = oil

force walkers on bridge
    amplitude = 180 N

ask sweep crossing
    of = bridge.acceleration
    by = walkers
    from = 1 Hz
    to = 4 Hz
ask tune best
    change = absorber, oil
    least = peak(crossing, bridge.acceleration)
    keep = stays_slow

expect stays_slow = peak(crossing, block.velocity) <= 2 m/s
`,
  snippet: "ask tune $1\n    change = $2\n    least = $3",
  notYet: true,
});
