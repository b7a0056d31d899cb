import { ASK_HEAD } from "./asks/ask.ts";
import { fit } from "./asks/fit.ts";
import { history } from "./asks/history.ts";
import { modes } from "./asks/modes.ts";
import { random } from "./asks/random.ts";
import { shockSpectrum } from "./asks/shock-spectrum.ts";
import { spread } from "./asks/spread.ts";
import { sweep } from "./asks/sweep.ts";
import { tune } from "./asks/tune.ts";
import { vary } from "./asks/vary.ts";
import type { DetailDescription, StatementDescription } from "./description.ts";
import { prose, statement } from "./statement.ts";

/** One description a kind of ask. */
export const ASKS: readonly StatementDescription[] = [
  modes,
  sweep,
  history,
  shockSpectrum,
  random,
  vary,
  spread,
  tune,
  fit,
];

/** `ask` before its kind is known: the details of all kinds. */
export const ask: StatementDescription = statement({
  keyword: "ask",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: everyDetail(),
  quantities: [],
  says: "What is to be answered.",
  text: prose(
    "Says what is to be answered. The kind comes first and a name may follow; an unnamed one is called by",
    "its kind. Expectations and the sheet speak of an answer by that name.",
    "",
    "`of` and `watch` list what the answer holds, on one line or one a row; an expectation may ask an",
    "answer for quantities that are not listed. `by` says which drives act together, each with its phase;",
    "left out, all drives act that fit the kind.",
    "",
    "The mode table is always there, asked for or not. An answer that could not be computed is null with",
    "a reason, never a number that looks like one.",
  ),
  example: `thrum 1
title "Bilge pump: modes and run-up"

mass pump = 310 kg
spring feet between pump and ground = 62 N/mm
    count = 4
    loss_factor = 0.08
force imbalance on pump
    unbalance = 6e-3 kg*m

ask modes
ask sweep run_up
    of = pump.velocity, feet.force
    by = imbalance
    from = 1 Hz
    to = 40 Hz

expect smooth = peak(run_up, pump.velocity) <= 8 mm/s
`,
  snippet: "ask $1 $2",
});

function everyDetail(): readonly DetailDescription[] {
  const byKey = new Map<string, DetailDescription>();
  for (const { details } of ASKS) {
    for (const each of details) if (!byKey.has(each.key)) byKey.set(each.key, each);
  }
  return [...byKey.values()].map((each) => ({ ...each, required: undefined }));
}
