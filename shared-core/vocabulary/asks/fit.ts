import { ASK_HEAD, CHANGE_LETS } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { detail, prose, statement } from "../statement.ts";

export const fit: StatementDescription = statement({
  keyword: "ask",
  variant: "fit",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    CHANGE_LETS,
    detail(
      "measured",
      {
        is: "table",
        columns: [
          { name: "mode", measure: "number" },
          { name: "frequency", measure: "rate" },
          { name: "damping ratio", measure: "share" },
        ],
        orFile: true,
      },
      "measured modes, or a file of a measured response",
      "1  4.2 Hz  3 %",
      { required: true },
    ),
  ],
  quantities: [],
  says: "Parameters that reproduce a measurement, with their confidence intervals.",
  text: prose(
    "The values of some numbers that reproduce a measurement: natural frequencies, with damping ratios",
    "where they were measured, or a measured response in a file. Each fitted value comes with a",
    "confidence interval.",
    "",
    "A measurement cannot tell everything. Two springs in series that nothing sits between, or a mass and",
    "a stiffness from one frequency, cannot be told apart, and `not-identifiable` says which. A fit that",
    "needs a number outside its range has found that the model is wrong, not the number.",
  ),
  example: `thrum 1
title "Soil under the compressor plinth, from a hammer test"

let soil = 150 MN/m within 50 MN/m to 400 MN/m
let mount = 380 N/mm within 200 N/mm to 600 N/mm

mass compressor = 720 kg
mass plinth = 5.4 t
spring mounts between compressor and plinth = mount
spring ground_spring between plinth and ground = soil

ask fit hammer_test
    change = soil, mount
    measured =
        1  3.71 Hz
        2  27.4 Hz

expect stiff_ground = natural_frequency(2) >= 20 Hz
`,
  snippet: "ask fit $1\n    change = $2\n    measured =\n        $3  4.2 Hz",
  notYet: true,
});
