import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { read, SAMPLE } from "../syntax/helpers.ts";
import { mangle, tries } from "./mangle.ts";
import { keepsPromises } from "./promises.ts";

describe("any text is read", () => {
  test("every prefix of the sample", () => {
    for (let end = 0; end <= SAMPLE.length; end++) keepsPromises(read(SAMPLE.slice(0, end)));
  });

  test("every suffix of the sample", () => {
    for (let start = 0; start <= SAMPLE.length; start += 3) keepsPromises(read(SAMPLE.slice(start)));
  });

  test("random text", () => {
    const anything = fc.string({ unit: "binary", maxLength: 200 });
    fc.assert(
      fc.property(anything, (text) => keepsPromises(read(text))),
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
      fc.property(soup, (pieces) => keepsPromises(read(pieces.join("")))),
      {
        numRuns: tries(2000),
        seed: 417,
      },
    );
  });

  test("mangled samples", () => {
    const count = tries(20_000);
    let broken = 0;
    for (let seed = 0; seed < count; seed++) {
      const text = mangle(SAMPLE, seed);
      const parsed = read(text);
      try {
        keepsPromises(parsed);
      } catch (error) {
        throw new Error(`seed ${seed}: ${error instanceof Error ? error.message : error}\n${text}`);
      }
      if (parsed.diagnostics.length > 0) broken++;
    }
    // The mutations must bite, or nothing was tried.
    expect(broken).toBeGreaterThan(count / 2);
  });
});
