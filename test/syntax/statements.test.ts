import { describe, expect, test } from "vitest";
import { applyEdits } from "../../shared-core/text/line-index.ts";
import { outlined, read, SAMPLE, said } from "./helpers.ts";

const outline = (text: string): string[] => outlined(read(text).tree.statements);
const messages = (text: string): string[] => read(text).diagnostics.map((d) => d.message);

/** The text after the first fix of its only diagnostic; the fixed text has no diagnostics but `left`. */
function fixed(text: string, left: string[] = []): string {
  const parsed = read(text);
  expect(parsed.diagnostics).toHaveLength(1);
  const cured = applyEdits(text, parsed.diagnostics[0].fixes?.[0].edits ?? []);
  expect(said(read(cured))).toEqual(left);
  return cured;
}

describe("the sample", () => {
  const { tree, diagnostics } = read(SAMPLE);

  test("is read without a word", () => {
    expect(diagnostics).toEqual([]);
    expect(tree.version?.number).toBe(1);
  });

  test("heads, details, rows and kits", () => {
    expect(outlined(tree.statements)).toMatchInlineSnapshot(`
      [
        "title text=Air handler on a roof slab",
        "let name=unit_mass := 420 {kg} +/- 3 {%}",
        "let name=mount := 26.5 {N mm-1} within [20 {N mm-1} to 30 {N mm-1}]",
        "let name=fan_speed := 1180 {rpm}",
        "mass name=unit := unit_mass",
        "mass name=slab := 9.6 {t}",
        "spring name=mounts a=unit b=slab := mount +/- 10 {%} normal",
        "  count: 4",
        "  damping_ratio: 5 {%} at 12 {Hz}",
        "damper name=oil a=unit b=slab := 2.1 {kN s m-1}",
        "group name=feet := mounts, oil",
        "spring name=beams a=slab b=ground := 11.2 {MN m-1}",
        "  loss_factor: 0.03",
        "stop name=bump a=unit b=slab := 3 {kN mm-1}",
        "  gap: 4 {mm}",
        "body name=genset",
        "  mass: 1200 {kg}",
        "  inertia: <310, 840, 760> {kg m2}",
        "  moves: z, rx, ry",
        "point name=nozzle on=genset at=<0.4 {m}, 0 {m}, (- 12 {mm})>",
        "mount name=foot a=genset b=ground at=<0, 0.5, 0> {m}",
        "  stiffness.x: 180 {N mm-1} +/- 5 {%}",
        "  stiffness.y: 180 {N mm-1}",
        "resistor name=winding in=coil := 5.6 {ohm}",
        "bind coordinate=pinion := ((- 3.2) * wheel)",
        "kit name=isolator parameters=(k c) a=a b=b",
        "    spring name=s a=a b=b := k",
        "      loss_factor: 2 {%}",
        "    damper name=d a=a b=b := c",
        "part name=front kit=isolator[12 {N mm-1}, 30 {N s m-1}] a=unit b=slab",
        "limit name=floor",
        "  rows: [2 {Hz} | 3 {mm s-1}][10 {Hz} | 1 {mm s-1}]",
        "force name=imbalance on=unit",
        "  unbalance: 0.018 {kg m}",
        "  speed: [600 {rpm} to 1500 {rpm}]",
        "force name=shake on=slab",
        "  law: (if[(t < 2 {s}), 3 {N}, 0] * sin[(((2 * pi) * 12 {Hz}) * t)])",
        "motion name=street of=ground",
        "  chirp: [2 {Hz} to 40 {Hz}]",
        "  record: "street.csv"",
        "ask kind=modes",
        "ask kind=sweep name=run_up",
        "  of: unit.velocity, feet.force",
        "  by: imbalance",
        "  from: 2 {Hz}",
        "  to: 40 {Hz}",
        "ask kind=vary name=wider",
        "  change: mount [20 {N mm-1} to 40 {N mm-1}]",
        "  watch: natural_frequency[1], peak[run_up, unit.velocity]",
        "case name=winter",
        "  mount: 31 {N mm-1}",
        "expect name=soft_enough := (natural_frequency[1] <= (0.35 * fan_speed))",
        "expect name=quiet_slab := (transmissibility[run_up, feet, at: fan_speed] <= 12 {%})",
      ]
    `);
  });

  test("every statement is the run of tokens it says it is", () => {
    for (const statement of tree.statements) {
      const first = tree.tokens[statement.first].offset;
      const last = tree.tokens[statement.last - 1];
      expect(first).toBe(statement.span.start);
      expect(last.offset + last.length).toBeGreaterThanOrEqual(statement.span.end);
    }
    const unitMass = tree.statements[1];
    expect(SAMPLE.slice(unitMass.span.start, unitMass.span.end)).toBe(
      `> Weighed on site with belt guard and motor fitted.
> source: weighbridge ticket 0417
let unit_mass = 420 kg +/- 3 %`,
    );
    expect(SAMPLE.slice(unitMass.headSpan.start, unitMass.headSpan.end)).toBe(
      "let unit_mass = 420 kg +/- 3 %",
    );
  });
});

describe("notes", () => {
  test("belong to the statement or detail below; tags and acceptances are told apart", () => {
    const { tree } = read(`thrum 1
> Weighed at 10:30
> source: ticket 0417
> accept near-resonance: passed in two seconds
> see http://plant
mass a = 1 kg
    > checked: last spring
    starts_at = 1 mm
    # between
    > bare`);
    const [mass] = tree.statements;
    expect(mass.notes.map((note) => note.tag?.key ?? note.accept?.code ?? note.text)).toEqual([
      "Weighed at 10:30",
      "source",
      "near-resonance",
      "see http://plant",
    ]);
    expect(mass.notes[1].tag?.text).toBe("ticket 0417");
    expect(mass.notes[2].accept?.reason).toBe("passed in two seconds");
    const { codeSpan } = mass.notes[2].accept ?? { codeSpan: { start: 0, end: 0 } };
    expect(tree.text.slice(codeSpan.start, codeSpan.end)).toBe("near-resonance");
    expect(mass.details[0].notes.map((note) => note.tag?.key)).toEqual(["checked"]);
    expect(tree.looseNotes.map((note) => note.text)).toEqual(["bare"]);
  });

  test("a comment between does not part them, a blank line does", () => {
    expect(said(read("thrum 1\n> note\n# comment\nmass a = 1 kg\n"))).toEqual([]);
    expect(fixed("thrum 1\n> one\n> two\n\n\nmass a = 1 kg\n")).toBe(
      "thrum 1\n> one\n> two\nmass a = 1 kg\n",
    );
    expect(said(read("thrum 1\n> one\n> two\n"))).toEqual(['loose-note "> one\\n> two"']);
    expect(said(read("> note\nthrum 1\n"))).toEqual(['loose-note "> note"']);
  });

  test("the indentation must fit what follows", () => {
    expect(fixed("thrum 1\nmass a = 1 kg\n    > note\nmass b = 1 kg\n")).toBe(
      "thrum 1\nmass a = 1 kg\n> note\nmass b = 1 kg\n",
    );
    expect(fixed("thrum 1\nmass a = 1 kg\n> note\n    starts_at = 0 mm\n")).toBe(
      "thrum 1\nmass a = 1 kg\n    > note\n    starts_at = 0 mm\n",
    );
  });

  test("a note on a row belongs to its detail", () => {
    const { tree, diagnostics } = read(
      "thrum 1\nlimit l\n    rows =\n        > measured\n        1 Hz 2 mm\n        > guessed\n        2 Hz 3 mm\n",
    );
    expect(diagnostics).toEqual([]);
    expect(tree.statements[0].details[0].notes.map((note) => note.text)).toEqual(["measured", "guessed"]);
  });
});

describe("the version line", () => {
  test("missing: a warning with its fix", () => {
    expect(said(read("mass a = 1 kg\n"))).toEqual(['version-missing "mass"']);
    expect(fixed("# pump\r\nmass a = 1 kg\r\n")).toBe("thrum 1\r\n# pump\r\nmass a = 1 kg\r\n");
    expect(fixed("\ufeffmass a = 1 kg\n")).toBe("\ufeffthrum 1\nmass a = 1 kg\n");
    expect(said(read(""))).toEqual(['version-missing ""']);
  });

  test("unknown: an error that names the versions read", () => {
    expect(said(read("thrum 2\nmass a = 1 kg\n"))).toEqual(['version-unknown "2"']);
    expect(messages("thrum 1.5\n")).toEqual([
      "this build reads version 1 of the language, the file says 1.5",
    ]);
  });

  test("incomplete, late or twice", () => {
    expect(fixed("thrum\nmass a = 1 kg\n")).toBe("thrum 1\nmass a = 1 kg\n");
    expect(fixed("mass a = 1 kg\nthrum 1\nmass b = 1 kg\n")).toBe("thrum 1\nmass a = 1 kg\nmass b = 1 kg\n");
    expect(messages("thrum 1\nthrum 1\n")).toEqual(["the version of the language is said twice"]);
    expect(messages("thrum 1 2\n")).toEqual(["expected the end of the line, found `2`"]);
  });
});

describe("keywords and details that are not known", () => {
  test("a keyword with the one that was meant; its name stays known", () => {
    const text = "thrum 1\nsprng k between a and ground = 3 N/m\n    count = 2\nmass a = 1 kg\n";
    expect(said(read(text))).toEqual(['syntax "sprng"']);
    expect(outline(text)).toEqual([
      "sprng name=k a=a b=ground := 3 {N m-1} broken",
      "  count: 2",
      "mass name=a := 1 {kg}",
    ]);
    expect(fixed(text)).toContain("\nspring k between");
  });

  test("one that nothing is near: what stands under it is passed over", () => {
    const text = "thrum 1\nquarterdeck k = 3\n    nonsense 1 2 3\n    > note\nmass a = 1 kg\n";
    expect(messages(text)).toEqual(["`quarterdeck` is not a statement"]);
    expect(outline(text)).toEqual(["quarterdeck name=k broken", "mass name=a := 1 {kg}"]);
  });

  test("a line that starts with no word", () => {
    expect(messages("thrum 1\n= 3\n    x = 2\n")).toEqual([
      "expected a statement, which starts with a keyword such as `mass` or `spring`, found `=`",
    ]);
  });

  test("a detail, with the one that was meant", () => {
    const text = "thrum 1\nspring k between a and ground = 3 N/m\n    lossfactor = 2 %\n";
    expect(said(read(text))).toEqual(['unknown-detail "lossfactor"']);
    expect(fixed(text)).toContain("    loss_factor = 2 %");
  });

  test("a case takes any", () => {
    expect(said(read("thrum 1\ncase winter\n    anything = 3 kg\n    front.k = 2\n"))).toEqual([]);
  });
});

describe("details given twice", () => {
  const spring = "thrum 1\nspring k between a and ground = 3 N/m\n";
  const mount = "thrum 1\nmount m between a and ground at (0, 0, 0) m\n";

  test("the same key, pointing at the first", () => {
    const parsed = read(`${spring}    count = 2\n    count = 3\n`);
    expect(said(parsed)).toEqual(['duplicate-name "count"']);
    expect(parsed.diagnostics[0].related?.[0].span.start).toBe(parsed.tree.text.indexOf("count"));
    expect(outlined(parsed.tree.statements).slice(1)).toEqual(["  count: 2", "  count: 3 broken"]);
  });

  test("a component beside the whole, in either order, but not beside another component", () => {
    expect(said(read(`${mount}    stiffness = (1, 2, 3) N/m\n    stiffness.x = 2 N/m\n`))).toEqual([
      'duplicate-name "stiffness.x"',
    ]);
    expect(said(read(`${mount}    stiffness.x = 2 N/m\n    stiffness = (1, 2, 3) N/m\n`))).toEqual([
      'duplicate-name "stiffness"',
    ]);
    expect(said(read(`${mount}    stiffness.x = 2 N/m\n    stiffness.y = 3 N/m\n`))).toEqual([]);
  });

  test("the principal property both ways", () => {
    expect(messages(`${spring}    stiffness = 2 N/m\n`)).toEqual(["`stiffness` is given behind `=` already"]);
  });
});

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
