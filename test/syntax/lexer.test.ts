import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { tokenize } from "../../shared-core/syntax/lexer.ts";

/** Tokens as `kind:text`, blanks and newlines left out. */
function kinds(text: string): string[] {
  return tokenize(text)
    .tokens.filter(({ kind }) => kind !== "blank" && kind !== "newline")
    .map(({ kind, offset, length }) => `${kind}:${text.slice(offset, offset + length)}`);
}

const joined = (text: string): string =>
  tokenize(text)
    .tokens.map(({ offset, length }) => text.slice(offset, offset + length))
    .join("");

describe("tokens", () => {
  test.each<[string, string[]]>([
    [
      "let k = 26.5 N/mm",
      ["name:let", "name:k", "operator:=", "number:26.5", "name:N", "operator:/", "name:mm"],
    ],
    [
      "2.1e3 2.1E-3 .5 5. 1e 007",
      ["number:2.1e3", "number:2.1E-3", "number:.5", "number:5.", "number:1", "name:e", "number:007"],
    ],
    ["3mm 1e3N", ["number:3", "name:mm", "number:1e3", "name:N"]],
    ["a.5", ["name:a", "operator:.", "number:5"]],
    ["µm μm Ω ñ_2 𐐀b", ["name:µm", "name:μm", "name:Ω", "name:ñ_2", "name:𐐀b"]],
    [
      "a+/-b ± c + / -",
      ["name:a", "operator:+/-", "name:b", "operator:±", "name:c", "operator:+", "operator:/", "operator:-"],
    ],
    [
      "<= >= == != < > = !",
      [
        "operator:<=",
        "operator:>=",
        "operator:==",
        "operator:!=",
        "operator:<",
        "operator:>",
        "operator:=",
        "unknown:!",
      ],
    ],
    ["N·m 3 %", ["name:N", "operator:·", "name:m", "number:3", "operator:%"]],
    ['"a # b" # c  ', ['string:"a # b"', "comment:# c"]],
    ['"a""b" "', ['string:"a""b"', 'string:"']],
    ["> note # no comment ", ["note:> note # no comment"]],
    ["a > b\n   > c", ["name:a", "operator:>", "name:b", "note:> c"]],
    ["° ² 😀", ["unknown:°", "unknown:²", "unknown:😀"]],
    ["\ufefflet\ufeff", ["name:let", "unknown:\ufeff"]],
    ["a\u00a0b", ["name:a", "name:b"]],
  ])("%s", (text, expected) => {
    expect(kinds(text)).toEqual(expected);
    expect(joined(text)).toBe(text);
  });

  test("line endings of three kinds", () => {
    const { tokens } = tokenize("a\r\nb\nc\rd");
    expect(tokens.filter(({ kind }) => kind === "newline").map(({ length }) => length)).toEqual([2, 1, 1]);
  });

  test("joining the tokens gives back any text", () => {
    const unit = fc.oneof(
      fc.string({ unit: "binary", maxLength: 4 }),
      fc.constantFrom("\n", "\r\n", "\r", " ", '"', "#", ">", "+/-", "1e", "µ", "°", "²", "𐐀", "\ud800"),
      fc.constantFrom(..."<|=>").map((sign) => `\n${sign.repeat(7)}`),
    );
    fc.assert(
      fc.property(fc.array(unit), (pieces) => {
        const text = pieces.join("");
        const { tokens } = tokenize(text);
        expect(joined(text)).toBe(text);
        expect(tokens.every(({ length }) => length > 0)).toBe(true);
      }),
      { numRuns: 1000, seed: 12 },
    );
  });

  test("work grows with the length of the text, not faster", () => {
    // One token for every few characters, whatever the text: what a quadratic lexer would still give, so the
    // limit is the test's time-out; each of these takes milliseconds when it is linear.
    for (const piece of [
      '"',
      "#",
      ">",
      "\n>",
      "(",
      "1e",
      ".",
      "\ufeff",
      "< ",
      `${"<".repeat(7)}\n`,
      " ",
      "+/",
    ]) {
      const text = piece.repeat(400_000 / piece.length);
      expect(joined(text).length).toBe(text.length);
    }
  });
});

describe("conflict markers", () => {
  const [ours, base, middle, theirs] = ["<", "|", "=", ">"].map((sign) => sign.repeat(7));

  test("the first side is read, the others are skipped", () => {
    const text = `a\n${ours} HEAD\nb\n${base} 1f\nc\n${middle}\nd\n${theirs} other\ne\n`;
    expect(kinds(text)).toEqual([
      "name:a",
      `conflict:${ours} HEAD`,
      "name:b",
      `conflict:${base} 1f`,
      "conflict:c",
      `conflict:${middle}`,
      "conflict:d",
      `conflict:${theirs} other`,
      "name:e",
    ]);
    expect(joined(text)).toBe(text);
    expect(tokenize(text).conflicts).toHaveLength(1);
  });

  test("one that is not whole loses its marker lines only", () => {
    const text = `${ours} HEAD\na\n${middle}\nb\n`;
    expect(kinds(text)).toEqual([`conflict:${ours} HEAD`, "name:a", `conflict:${middle}`, "name:b"]);
    expect(tokenize(text).conflicts).toHaveLength(1);
    expect(tokenize(`${theirs} x\n${ours} y\n`).conflicts).toHaveLength(2);
  });

  test("only in column 1, and only seven signs", () => {
    expect(tokenize(` ${middle}\n${middle}=\nx ${theirs}\n${theirs}x`).conflicts).toHaveLength(0);
    expect(tokenize(`\u2028${middle}`).conflicts).toHaveLength(0);
  });
});
