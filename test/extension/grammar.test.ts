import { readdirSync } from "node:fs";
import { join } from "node:path";
import { beforeAll, describe, expect, it } from "vitest";
import { LineIndex, semanticTokens, type TokenType, understand } from "../../shared-core/index.ts";
import { read, root } from "../house/files.ts";
import { grammarOf, type Scoped } from "./grammar.ts";

let scoped: (text: string) => readonly Scoped[];
beforeAll(async () => {
  scoped = await grammarOf();
});

/** Scopes that say the same as a meaning; a grammar cannot tell a mass from a spring where it is only named. */
const SAME: Readonly<Record<TokenType, RegExp>> = {
  keyword: /^keyword\.(control\.import|other\.(let|moves|joins|drives|asks|holds))\./,
  word: /^keyword\.operator\.word\./,
  moves: /^(entity\.name|variable\.other|constant\.language)\./,
  joins: /^(entity\.name|variable\.other)\./,
  drives: /^(entity\.name|variable\.other)\./,
  asks: /^(entity\.name|variable\.other)\./,
  holds: /^entity\.name\./,
  parameter: /^(entity\.name|variable\.other)\./,
  case: /^(entity\.name|variable\.other)\./,
  limit: /^(entity\.name|variable\.other)\./,
  kit: /^(entity\.name|variable\.other)\./,
  function: /^support\.function\./,
  argument: /^variable\.parameter\./,
  quantity: /^variable\.other\.member\./,
  component: /^variable\.other\.member\./,
  property: /^variable\.other\.property\./,
  choice: /^(constant\.other\.choice|variable\.other)\./,
  constant: /^(constant\.language|variable\.other\.member)\./,
  number: /^constant\.numeric\./,
  unit: /^keyword\.other\.unit\./,
  operator: /^keyword\.operator\.thrum/,
  string: /^(string\.quoted|punctuation\.definition\.string)\./,
  note: /^(comment\.line\.documentation|punctuation\.definition\.comment)\./,
  tag: /^(storage\.type\.class\.tag|punctuation\.definition\.comment)\./,
  comment: /^(comment\.line\.number-sign|punctuation\.definition\.comment)\./,
};

/** Words whose scope says something else than their meaning. */
function disagreements(file: string, text: string): string[] {
  const lines = new LineIndex(text);
  const model = understand(file, text, { read: () => undefined } as never);
  const found = scoped(text);
  return semanticTokens({ model, lines, units: "as-written", stale: false, others: [] }).flatMap(
    ({ span, type }) => {
      const at = lines.position(span.start);
      const token = found.find(
        ({ line, start, end }) => line === at.line && start <= at.character && end > at.character,
      );
      const scope = token?.scopes.at(-1) ?? "";
      return SAME[type].test(scope)
        ? []
        : [`${at.line + 1}: ${text.slice(span.start, span.end)} is ${type}, not ${scope}`];
    },
  );
}

describe("the grammar", () => {
  for (const file of readdirSync(join(root, "examples")).filter((name) => name.endsWith(".thrum"))) {
    it(`says the same as the server of ${file}`, () => {
      expect(disagreements(file, read(`examples/${file}`))).toEqual([]);
    });
  }

  it("colours what the examples do not hold", () => {
    const text = [
      "thrum 1",
      "kit isolator(stiffness)",
      "    spring coil between a and b = stiffness # in a kit",
      'use "isolators.thrum"',
      "limit zone = 2.8 mm/s at 10 Hz",
      "let odd = 3 kg*m^2 + 4 1/s - 5 N/(m*s)",
      "let µ_small = 12 µm",
      "<<<<<<< mine",
    ].join("\n");
    const lines = scoped(text).filter(({ scopes }) => scopes.length > 0);
    expect(
      lines.map(({ line, text: word, scopes }) => `${line + 1} ${word} ${scopes.at(-1)}`),
    ).toMatchSnapshot();
  });

  it("is not led astray by a text that ends in the middle", () => {
    const after = scoped('title "open\nmass unit = 3 kg\n').find(({ text }) => text === "mass");
    expect(after?.scopes.at(-1)).toBe("keyword.other.moves.thrum");
  });
});
