import { describe, expect, test } from "vitest";
import { fixed, messages, outline, outlined, read, SAMPLE, said } from "./helpers.ts";

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
