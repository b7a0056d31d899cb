/** Words with a fixed place in values; none of them starts an operand or a unit. */
export const VALUE_WORDS: ReadonlySet<string> = new Set([
  "at",
  "as",
  "to",
  "within",
  "from",
  "and",
  "or",
  "not",
  "normal",
  "uniform",
  "lognormal",
]);

export const DISTRIBUTIONS: ReadonlySet<string> = new Set(["normal", "uniform", "lognormal"]);

/** What a reserved word stands for, for the message when somebody wants it as a name. */
export const RESERVED: ReadonlyMap<string, string> = new Map([
  ["t", "the time in a law"],
  ["travel", "the travel in a law"],
  ["rate", "the rate in a law"],
  ["ground", "the support that is always there"],
  ["pi", "the number 3.14159…"],
  ["e", "the number 2.71828…"],
  ["if", "a choice between two values"],
  ...[...VALUE_WORDS].map((word) => [word, "a word of the language"] as const),
]);

/** Words of a head that may stand behind a number; no unit is called like that. */
export const HEAD_WORDS: ReadonlySet<string> = new Set(["between", "on", "of"]);
