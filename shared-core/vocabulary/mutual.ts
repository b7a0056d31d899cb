import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE } from "./joining.ts";
import { amount, BETWEEN, NAME, prose, statement } from "./statement.ts";

export const mutual: StatementDescription = statement({
  keyword: "mutual",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "inductance",
  details: [
    amount("inductance", "inductance", "mutual inductance, signed by the loops' directions", "0.2 mH", {
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: CIRCUIT_QUANTITIES,
  says: "Couples two loops by their common flux.",
  text: prose(
    "Couples two loops by the flux that both link, as the two windings of a transformer. Positive where",
    "currents in the positive directions of both loops help each other. With self-inductances L1 and L2",
    "its size stays below sqrt(L1 L2); at that limit the two are one winding and the inductance matrix is",
    "no longer positive.",
  ),
  example: `thrum 1
title "Contactless supply of the bridge lamp"

loop sender
loop receiver
inductor sender_coil in sender = 1 mH
capacitor sender_plates in sender = 0.1 uF
inductor receiver_coil in receiver = 1 mH
capacitor receiver_plates in receiver = 0.1 uF
mutual gap between sender and receiver = 0.2 mH

expect split = natural_frequency(2) / natural_frequency(1) >= 1.2
`,
  snippet: "mutual $1 between $2 and $3 = $4 mH",
  notYet: true,
});
