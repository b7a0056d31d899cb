import type { HeadPart } from "../../syntax/grammar.ts";
import type { DetailDescription } from "../description.ts";
import { detail } from "../statement.ts";

/** Kinds of ask, in the order of the language's table. */
export const ASK_KINDS = [
  "modes",
  "sweep",
  "history",
  "shock_spectrum",
  "random",
  "vary",
  "spread",
  "tune",
  "fit",
] as const;

/** `KIND [NAME]`. */
export const ASK_HEAD: readonly HeadPart[] = [
  { kind: "choice", slot: "kind", choices: ASK_KINDS },
  { kind: "name", slot: "name", optional: true },
];

export const OF: DetailDescription = detail(
  "of",
  { is: "quantities" },
  "quantities to answer, on one line or one a row",
  "unit.velocity, feet.force",
);

export const BY: DetailDescription = detail(
  "by",
  { is: "names", families: ["drives"] },
  "drives that act together, each with its phase",
  "imbalance",
  { standard: "all that fit" },
);

export const WATCH: DetailDescription = detail(
  "watch",
  { is: "expressions" },
  "quantities to follow, on one line or one a row",
  "natural_frequency(1)",
  { required: true },
);

export const CHANGE_LETS: DetailDescription = detail(
  "change",
  { is: "names", families: ["numbers"], keywords: ["let"] },
  "numbers that may move inside the range written behind `within`",
  "mount, oil_damping",
  { required: true },
);
