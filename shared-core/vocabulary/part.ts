import type { StatementDescription } from "./description.ts";
import { BETWEEN, NAME, prose, statement } from "./statement.ts";

export const part: StatementDescription = statement({
  keyword: "part",
  family: "joins",
  head: [NAME, { kind: "word", word: "=" }, { kind: "call", slot: "kit" }, ...BETWEEN],
  value: "none",
  details: [],
  quantities: [],
  says: "Places a kit between two things; its inner names are seen as NAME.inner.",
  text: prose(
    "Places a kit between two things that move, or between one of them and a support. The values in the",
    "parentheses go to the parameters of the kit, in order or by name, each with the unit that the kit",
    "wants.",
    "",
    "Inner names are seen from outside with the name of the part in front: `pump_foot.rubber.force` in an",
    "ask, `pump_foot.middle.displacement` in an expectation. A part is a joining element to the reader",
    "and any number of elements to the equations.",
  ),
  example: `thrum 1
title "Switchboard on two equal feet"

kit foot(stiffness, loss) between above and below
    spring rubber between above and below = stiffness
        loss_factor = loss

mass switchboard = 410 kg

part left = foot(160 N/mm, 0.08) between switchboard and ground
part right = foot(stiffness: 160 N/mm, loss: 0.08) between switchboard and ground

expect soft_enough = natural_frequency(1) <= 6 Hz
`,
  snippet: "part $1 = $2($3) between $4 and $5",
  notYet: true,
});
