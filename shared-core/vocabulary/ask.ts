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
import { statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "ask $1 $2",
});

function everyDetail(): readonly DetailDescription[] {
  const byKey = new Map<string, DetailDescription>();
  for (const { details } of ASKS) {
    for (const each of details) if (!byKey.has(each.key)) byKey.set(each.key, each);
  }
  return [...byKey.values()].map((each) => ({ ...each, required: undefined }));
}
