import type { StatementDescription } from "./description.ts";
import { prose, statement } from "./statement.ts";

export const title: StatementDescription = statement({
  keyword: "title",
  family: "file",
  head: [{ kind: "text", slot: "text" }],
  value: "none",
  details: [],
  quantities: [],
  says: "What the model is, shown above the sheet, the review and the report.",
  text: prose(
    "One line in quotes that says which machine, which part of it and which question. It stands above the",
    "response sheet, the review and the report, so it should still make sense to a reader who has only",
    'the print-out: "Bilge pump P-3 on its bedplate: is it soft enough at 1180 rpm" says more than',
    '"pump".',
    "",
    "A title is not computed with. A file has at most one, by custom right below `thrum 1`; the same",
    "words may stand in a note where more room is needed.",
  ),
  example: `thrum 1
title "Bilge pump P-3 on its bedplate, Kelpwick harbour works"

mass pump = 310 kg
spring feet between pump and ground = 62 N/mm
    count = 4

expect soft_enough = natural_frequency(1) <= 8 Hz
`,
  snippet: 'title "$1"',
});
