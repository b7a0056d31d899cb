import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Parsed } from "../../shared-core/syntax/parser.ts";
import { read, SAMPLE } from "../syntax/helpers.ts";
import { mangle, tries } from "./mangle.ts";
import { formatsWell, keepsPromises } from "./promises.ts";

/** The sample of the language and all examples. */
const EXAMPLES = fileURLToPath(new URL("../../examples/", import.meta.url));
const TEXTS = [
  SAMPLE,
  ...readdirSync(EXAMPLES)
    .filter((file) => file.endsWith(".thrum"))
    .sort()
    .map((file) => readFileSync(join(EXAMPLES, file), "utf8")),
];

/** Reads and formats a text and holds both to their promises. */
function tried(text: string): Parsed {
  const parsed = read(text);
  keepsPromises(parsed);
  formatsWell(parsed, read);
  return parsed;
}

describe("any text is read and formatted", () => {
  test("every prefix of the sample", () => {
    for (let end = 0; end <= SAMPLE.length; end++) tried(SAMPLE.slice(0, end));
  });

  test("every example, as it is and with other line endings", () => {
    expect(TEXTS.length).toBeGreaterThan(3);
    for (const text of TEXTS) {
      expect(tried(text).diagnostics).toEqual([]);
      expect(tried(text.replaceAll("\n", "\r\n")).diagnostics).toEqual([]);
    }
  });

  test("every suffix of the sample", () => {
    for (let start = 0; start <= SAMPLE.length; start += 3) tried(SAMPLE.slice(start));
  });

  test("random text", () => {
    const anything = fc.string({ unit: "binary", maxLength: 200 });
    fc.assert(
      fc.property(anything, (text) => void tried(text)),
      { numRuns: tries(2000), seed: 1180 },
    );
  });

  test("random pieces of the language", () => {
    const words = SAMPLE.split(/(\s|\b)/).concat(
      "\n    ",
      "\n        ",
      "\n",
      "\r\n",
      "\t",
      "> ",
      "#",
      '"',
      "+/-",
    );
    const soup = fc.array(fc.constantFrom(...new Set(words)), { maxLength: 80 });
    fc.assert(
      fc.property(soup, (pieces) => void tried(pieces.join(""))),
      {
        numRuns: tries(2000),
        seed: 417,
      },
    );
  });

  test("mangled samples and examples are read", () => {
    const count = tries(20_000);
    let broken = 0;
    for (let seed = 0; seed < count; seed++) {
      const parsed = onSeed(seed, (text) => {
        const result = read(text);
        keepsPromises(result);
        return result;
      });
      if (parsed.diagnostics.length > 0) broken++;
    }
    // The mutations must bite, or nothing was tried.
    expect(broken).toBeGreaterThan(count / 2);
  });

  test("mangled samples and examples are formatted", () => {
    for (let seed = 0; seed < tries(4000); seed++) onSeed(seed, tried);
  });
});

/** Says the seed and the text when a promise is broken. */
function onSeed<T>(seed: number, work: (text: string) => T): T {
  const text = mangle(TEXTS[seed % TEXTS.length], seed);
  try {
    return work(text);
  } catch (error) {
    throw new Error(`seed ${seed}: ${error instanceof Error ? error.message : error}\n${text}`);
  }
}
