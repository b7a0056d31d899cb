import type { GrammarTable, StatementGrammar } from "../syntax/grammar.ts";
import { ASKS, ask } from "./ask.ts";
import { assume } from "./assume.ts";
import { bind } from "./bind.ts";
import { body } from "./body.ts";
import { capacitor } from "./capacitor.ts";
import { caseStatement } from "./case.ts";
import { cord } from "./cord.ts";
import { damper } from "./damper.ts";
import type { DetailDescription, StatementDescription } from "./description.ts";
import { expect } from "./expect.ts";
import { feed } from "./feed.ts";
import { force } from "./force.ts";
import { friction } from "./friction.ts";
import { group } from "./group.ts";
import { inductor } from "./inductor.ts";
import { inerter } from "./inerter.ts";
import { inertia } from "./inertia.ts";
import { junction } from "./junction.ts";
import { kit } from "./kit.ts";
import { letNumber } from "./let.ts";
import { limit } from "./limit.ts";
import { loop } from "./loop.ts";
import { mass } from "./mass.ts";
import { motion } from "./motion.ts";
import { mount } from "./mount.ts";
import { mutual } from "./mutual.ts";
import { part } from "./part.ts";
import { pendulum } from "./pendulum.ts";
import { point } from "./point.ts";
import { resistor } from "./resistor.ts";
import { spring } from "./spring.ts";
import { stop } from "./stop.ts";
import { support } from "./support.ts";
import { title } from "./title.ts";
import { torque } from "./torque.ts";
import { transducer } from "./transducer.ts";
import { use } from "./use.ts";
import { voltage } from "./voltage.ts";

/** Every statement of the language, in the order of language.md; kinds of ask are in `ASKS`. */
export const STATEMENTS: readonly StatementDescription[] = [
  title,
  use,
  letNumber,
  assume,
  caseStatement,
  limit,
  group,
  kit,
  part,
  mass,
  inertia,
  junction,
  body,
  point,
  pendulum,
  loop,
  support,
  bind,
  spring,
  damper,
  inerter,
  stop,
  cord,
  friction,
  mount,
  inductor,
  resistor,
  capacitor,
  mutual,
  transducer,
  feed,
  force,
  torque,
  voltage,
  motion,
  ask,
  expect,
];

export { ASKS } from "./ask.ts";

/** The description of a statement, of an ask by its kind where that is known. */
export function describe(keyword: string, askKind?: string): StatementDescription | undefined {
  const kind = keyword === "ask" && askKind !== undefined ? ASK_BY_KIND.get(askKind) : undefined;
  return kind ?? BY_KEYWORD.get(keyword);
}

export function detailOf(description: StatementDescription, key: string): DetailDescription | undefined {
  return description.details.find((detail) => detail.key === key);
}

/** What the parser takes: one grammar a keyword. */
export function grammarTable(): GrammarTable {
  return GRAMMAR;
}

const BY_KEYWORD: ReadonlyMap<string, StatementDescription> = new Map(
  STATEMENTS.map((description) => [description.keyword, description]),
);
const ASK_BY_KIND: ReadonlyMap<string, StatementDescription> = new Map(
  ASKS.map((description) => [description.variant ?? "", description]),
);
const GRAMMAR: GrammarTable = new Map<string, StatementGrammar>(
  STATEMENTS.map((description) => [description.keyword, description.grammar]),
);
