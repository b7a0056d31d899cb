import type { StatementDescription } from "./description.ts";
import { prose, statement } from "./statement.ts";

export const use: StatementDescription = statement({
  keyword: "use",
  family: "file",
  head: [{ kind: "text", slot: "path" }],
  value: "none",
  details: [],
  quantities: [],
  says: "Takes the let, limit and kit statements of another file.",
  text: prose(
    "Takes the `let`, `limit` and `kit` statements of another file, so that numbers which belong to a",
    "site or a catalogue are kept in one place and change in one commit. Masses, springs, drives and asks",
    "of the other file are not taken: a used file lends numbers, not a system.",
    "",
    "The path is relative to the file it stands in and must stay inside the workspace. Used files may use",
    "others; a cycle is an error. All names share one namespace, so a name defined here and there is a",
    "`duplicate-name`, never a silent replacement; for variants of a number there is `case`.",
  ),
  example: `thrum 1
title "Workshop fan on catalogue mounts"

use "quay-numbers.thrum"

mass fan = 140 kg
spring mounts between fan and ground = catalogue_mount
    count = 4

expect soft_enough = natural_frequency(1) <= 0.5 * quay_fan_speed
`,
  exampleFiles: {
    "quay-numbers.thrum":
      "thrum 1\n\n> source: catalogue sheet KW-R-04\nlet catalogue_mount = 18 N/mm +/- 10 %\nlet quay_fan_speed = 980 rpm\n",
  },
  snippet: 'use "$1"',
});
