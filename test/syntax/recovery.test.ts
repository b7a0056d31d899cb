import { describe, expect, test } from "vitest";
import { applyEdits } from "../../shared-core/text/line-index.ts";
import { fixed, messages, outline, read, said } from "./helpers.ts";

describe("heads that cannot be read", () => {
  test.each([
    ["mass", "expected a name, and the line ends here"],
    ["mass = 3 kg", "expected a name, found `=`"],
    ["mass 2nd = 3 kg", "expected a name, found `2`"],
    ["mass ground = 3 kg", "`ground` cannot be a name: it is the support that is always there"],
    ["let t = 3 s", "`t` cannot be a name: it is the time in a law"],
    ["let from = 3 s", "`from` cannot be a name: it is a word of the language"],
    ["ask sweep run-up", "a name holds letters, digits and `_`, no hyphen"],
    ["mass a 3 kg", "expected `=` or the end of the line, found `3`"],
    ["mass a =", "expected a value, and the line ends here"],
    ["let a", "expected `=` and a value, and the line ends here"],
    ["spring k betwen a and b", "expected `between`, found `betwen`"],
    ["spring k between a", "expected `and`, and the line ends here"],
    ["spring k between a and 3", "expected the name of a thing in the model, found `3`"],
    ["junction j = 3", "`junction` takes no value behind `=`"],
    ["resistor r = 3 ohm", "expected `in` or `between`, found `=`"],
    ["title RU-3", 'expected a text in quotes, "…", found `RU`'],
    ["point p on b at 3", "expected a place of three numbers, as in (0 m, 0.2 m, 0 m), found `3`"],
    ["point p on b at (3)", "expected a place of three numbers, as in (0 m, 0.2 m, 0 m)"],
    ["kit k(p, between a and b", "expected `,` or `)` behind a parameter, found `a`"],
    ["kit k(t) between a and b", "`t` cannot be a name: it is the time in a law"],
    ["part p = k(1 between a and b", "expected an operator, `,` or `)`, found `between`"],
    [
      "ask swep a",
      "`swep` is none of modes, sweep, history, shock_spectrum, random, vary, spread, tune, fit",
    ],
  ])("%s", (line, message) => {
    const parsed = read(`thrum 1\n${line}\nmass last = 1 kg\n`);
    expect(parsed.diagnostics.map((d) => d.message)).toEqual([message]);
    const [first, second] = parsed.tree.statements;
    expect(first.broken).toBe(true);
    expect(second.broken).toBe(false);
  });

  test("what was read before the slip is kept", () => {
    expect(outline("thrum 1\nspring k between a and\n    count = 2\n")).toEqual([
      "spring name=k a=a broken",
      "  count: 2",
    ]);
  });

  test("fixes of a name and of a choice", () => {
    expect(fixed("thrum 1\nlet run-up = 3 s\n")).toBe("thrum 1\nlet run_up = 3 s\n");
    expect(fixed("thrum 1\nask swep a\n")).toBe("thrum 1\nask sweep a\n");
  });
});

describe("details that cannot be read", () => {
  const head = "thrum 1\nspring k between a and b = 1 N/m\n";
  test.each([
    ["    count =", "expected a value, and the line ends here"],
    ["    count", "expected `=` behind `count`, and the line ends here"],
    ["    count 4", "expected `=` behind `count`, found `4`"],
    ["    3 mm", "expected a detail, written `key = value`, found `3`"],
    ["    count = 2\n        3 mm 4 N", "`count` takes no rows"],
    ["    curve =\n        3 mm 4 N\n        x", "expected a number, found `x`"],
    ["    curve =\n        3 mm + 4 N,", "expected another number behind the comma, and the line ends here"],
    ["    curve =\n        3 mm * 4 N", "expected the next number of the row, found `*`"],
    ["    curve =\n        3 zoll 4 N", "`zoll` is not a unit"],
    ['    curve = "a.csv"\n        3 mm 4 N', "rows stand below a detail that has its value on its line"],
    ["    curve =", "expected rows below, and the line ends here"],
    ["    curve", "expected rows below, and the line ends here"],
  ])("%s", (lines, message) => {
    expect(messages(`${head}${lines}\nmass last = 1 kg\n`)).toEqual([message]);
  });

  test("the sign that is missing", () => {
    expect(fixed(`${head}    count 4\n`)).toBe(`${head}    count = 4\n`);
  });

  test("the rows that can be read are kept", () => {
    expect(outline(`${head}    curve =\n        1 mm 2 N\n        x\n        -3 mm, -4 N\n`)[1]).toBe(
      "  curve: [1 {mm} | 2 {N}][-3 {mm} | -4 {N}] broken",
    );
  });
});

describe("text in the wrong place", () => {
  test("a detail without a statement", () => {
    expect(messages("    count = 2\nthrum 1\n")).toContain(
      "an indented line belongs to a statement above it, and there is none",
    );
  });

  test("a statement that is indented is read where it belongs", () => {
    const text = "thrum 1\nmass a = 1 kg\n  mass b = 2 kg\n      starts_at = 1 mm\n";
    expect(messages(text)).toEqual(["the statement `mass` starts in column 1"]);
    expect(outline(text)).toEqual([
      "mass name=a := 1 {kg}",
      "mass name=b := 2 {kg} broken",
      "  starts_at: 1 {mm}",
    ]);
    expect(fixed(text)).toContain("\nmass b = 2 kg\n");
  });

  test("a detail that lost its indentation", () => {
    const text = "thrum 1\nspring k between a and b = 1 N/m\ncount = 2\n";
    expect(messages(text)).toEqual(["the detail `count` is indented under its statement"]);
    expect(outline(text)[1]).toBe("  count: 2");
    expect(fixed(text)).toContain("\n    count = 2\n");
  });

  test("a number without its keyword", () => {
    const text = "thrum 1\nwidth = 3 mm\nmass a = 1 kg\n";
    expect(messages(text)).toEqual(["`width = …` needs a keyword in front; `let` makes it a parameter"]);
    expect(outline(text)[0]).toBe("let name=width := 3 {mm} broken");
    expect(fixed(text)).toContain("\nlet width = 3 mm\n");
  });

  test("tabs and uneven steps are details all the same", () => {
    const text =
      "thrum 1\nspring k between a and b = 1 N/m\n\tcount = 2\n  loss_factor = 1 %\n     preload = 3 N\n";
    expect(said(read(text))).toEqual([]);
    expect(outline(text)).toHaveLength(4);
  });

  test("inside a kit", () => {
    const text =
      "thrum 1\nkit k(p) between a and b\n  spring s between a and b = p\n  count = 2\n  width = 3 mm\n  kit l between c and d\n    mass m = 1 kg\nmass m = 1 kg\n";
    expect(messages(text)).toEqual([
      "the detail `count` is indented under its statement",
      "`width = …` needs a keyword in front; `let` makes it a parameter",
      "a kit cannot stand inside a kit",
    ]);
    expect(outline(text)).toEqual([
      "kit name=k parameters=(p) a=a b=b",
      "    spring name=s a=a b=b := p",
      "      count: 2",
      "    let name=width := 3 {mm} broken",
      "    kit  broken",
      "mass name=m := 1 {kg}",
    ]);
  });
});

describe("merge conflicts", () => {
  const [ours, base, middle, theirs] = ["<", "|", "=", ">"].map((sign) => sign.repeat(7));

  test("one error, the first side is read, and each side can be kept", () => {
    const text = `thrum 1\nspring k between a and b = 1 N/m\n${ours} HEAD\n    count = 2\n${base} 1f\n    count = 1\n${middle}\n    count = 3\n${theirs} other\nmass a = 1 kg\n`;
    expect(said(read(text))).toEqual([`merge-conflict "${ours} HEAD"`]);
    expect(outline(text)).toEqual([
      "spring name=k a=a b=b := 1 {N m-1}",
      "  count: 2",
      "mass name=a := 1 {kg}",
    ]);
    expect(fixed(text)).toBe("thrum 1\nspring k between a and b = 1 N/m\n    count = 2\nmass a = 1 kg\n");
    const [, second] = read(text).diagnostics[0].fixes ?? [];
    expect(applyEdits(text, second.edits)).toBe(
      "thrum 1\nspring k between a and b = 1 N/m\n    count = 3\nmass a = 1 kg\n",
    );
  });

  test("stray markers: one error for the run of them, the rest still reads", () => {
    const text = `thrum 1\n${middle}\nmass a = 1 kg\n${theirs} other\nmass b = 1 kg\n`;
    expect(said(read(text))).toEqual([`merge-conflict "${middle}"`]);
    expect(outline(text)).toHaveLength(2);
  });
});

describe("size", () => {
  test("a text above the limit is told so, and not read", () => {
    const parsed = read("#".repeat(20_000_001));
    expect(said(parsed)).toEqual(['too-large ""']);
    expect(parsed.tree.tokens).toHaveLength(1);
  });

  test("long files of any sort are read", () => {
    for (const line of [
      "mass a = 1 kg\n",
      "    count = 2\n",
      "> note\n",
      "x\n",
      "    > n\n        1 Hz 2 mm\n",
    ]) {
      const text = `thrum 1\nlimit l\n    rows =\n${line.repeat(20_000)}`;
      expect(read(text).tree.lines.length).toBeGreaterThan(20_000);
    }
  });
});
