import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { applyEdits, LineIndex, lineEnding } from "../../shared-core/text/line-index.ts";
import { nearest } from "../../shared-core/text/nearest.ts";
import { contains, cover, span } from "../../shared-core/text/span.ts";

describe("line index", () => {
  test("counts UTF-16 units, also behind µ ° ² and characters outside the basic plane", () => {
    const index = new LineIndex("let µ = 2°\r\nx² 𐐀𐐀!\n");
    expect(index.lineCount).toBe(3);
    expect(index.position(8)).toEqual({ line: 0, character: 8 });
    // `!` stands behind "x² " and two surrogate pairs.
    expect(index.position(12 + 7)).toEqual({ line: 1, character: 7 });
    expect(index.lineText(1)).toBe("x² 𐐀𐐀!");
    expect(index.lineText(0)).toBe("let µ = 2°");
    expect(index.lineText(2)).toBe("");
  });

  test("a lone carriage return ends a line too", () => {
    expect(new LineIndex("a\rb\r\nc\n").starts).toEqual([0, 2, 5, 7]);
  });

  test("clamps what lies outside", () => {
    const index = new LineIndex("ab\ncd");
    expect(index.offset({ line: 0, character: 99 })).toBe(2);
    expect(index.offset({ line: 9, character: 0 })).toBe(5);
    expect(index.offset({ line: -1, character: 3 })).toBe(0);
    expect(index.offset({ line: 1, character: -4 })).toBe(3);
    expect(index.position(-1)).toEqual({ line: 0, character: 0 });
    expect(index.position(99)).toEqual({ line: 1, character: 2 });
  });

  test("offset and position undo each other on any text", () => {
    const piece = fc.constantFrom("a", "µ", "°", "²", "𐐀", "\n", "\r\n", "\r", "\t", " ");
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 40 }), (pieces) => {
        const text = pieces.join("");
        const index = new LineIndex(text);
        for (let offset = 0; offset <= text.length; offset++) {
          const back = index.offset(index.position(offset));
          const line = index.lineSpan(index.lineAt(offset));
          // Inside a line ending the end of the line stands for it.
          expect(back).toBe(Math.min(offset, line.end));
        }
        expect(index.span(index.range(span(0, text.length))).start).toBe(0);
      }),
      { seed: 417 },
    );
  });

  test("line endings", () => {
    expect(lineEnding("a\r\nb\n")).toBe("\r\n");
    expect(lineEnding("a\nb\r\n")).toBe("\n");
    expect(lineEnding("a\rb\n")).toBe("\r");
    expect(lineEnding("ab")).toBe("\n");
  });
});

describe("edits and spans", () => {
  test("edits are made in order of place", () => {
    const edits = [
      { span: span(4, 5), text: "E" },
      { span: span(0, 1), text: "" },
      { span: span(2, 2), text: "--" },
    ];
    expect(applyEdits("abcdef", edits)).toBe("b--cdEf");
  });

  test("cover and contains", () => {
    expect(cover(span(3, 5), span(1, 4))).toEqual({ start: 1, end: 5 });
    expect(contains(span(1, 3), 3)).toBe(true);
    expect(contains(span(1, 3), 4)).toBe(false);
  });
});

describe("nearest word", () => {
  const words = ["mass", "spring", "damper", "inertia", "mount"];
  test.each([
    ["sprng", "spring"],
    ["sprign", "spring"],
    ["Mass", "mass"],
    ["masss", "mass"],
    ["dampr", "damper"],
    ["moutn", "mount"],
  ])("%s is %s", (typed, meant) => {
    expect(nearest(typed, words)).toBe(meant);
  });

  test("nothing is near", () => {
    expect(nearest("transmissibility", words)).toBeUndefined();
    expect(nearest("m", words)).toBeUndefined();
    expect(nearest("bolt", words)).toBeUndefined();
    expect(nearest("m".repeat(1000), words)).toBeUndefined();
  });
});
