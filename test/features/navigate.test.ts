import { describe, expect, it } from "vitest";
import { definition, highlights, references } from "../../shared-core/features/navigate.ts";
import { prepareRename, rename } from "../../shared-core/features/rename.ts";
import { cursorIn, edited, errorsOf, FILE, viewOf } from "./views.ts";

const NUMBERS = `thrum 1
> source: catalogue sheet
let foot = 48 N/mm
let double_foot = 2 * foot
`;
const FAN = `thrum 1
use "numbers.thrum"
mass fan = 140 kg
spring mounts between fan and ground = foot
`;
const FILES = { "pier/numbers.thrum": NUMBERS, "pier/fan.thrum": FAN };

/** The text with a cursor, in a workspace with two more files. */
function at(marked: string, files: Readonly<Record<string, string>> = {}) {
  const { text, offset } = cursorIn(marked);
  return { text, offset, view: viewOf(text, { files }) };
}

/** Places as \`file:text\`. */
function shown(
  places: readonly {
    readonly file: string;
    readonly span: { readonly start: number; readonly end: number };
  }[],
  texts: Readonly<Record<string, string>>,
): string[] {
  return places.map(({ file, span }) => {
    const text = texts[file];
    const line = text.slice(0, span.start).split("\n").length;
    return `${file}:${line} ${text.slice(span.start, span.end)}`;
  });
}

/** All files after a rename. */
function renamed(marked: string, name: string, files: Readonly<Record<string, string>> = {}) {
  const { text, offset, view } = at(marked, files);
  const result = rename(view, offset, name);
  if ("refused" in result) return result.refused;
  const texts: Record<string, string> = { [FILE]: text, ...files };
  for (const { file, edits } of result.files) texts[file] = edited(texts[file], edits);
  return texts;
}

const MODEL = `thrum 1
let mount = 26.5 N/mm
mass unit = 420 kg
mass slab = 9.6 t
spring mounts between unit and slab = mo|unt
spring beams between slab and ground = 10 * mount
group feet = mounts, beams
force shaker on unit
ask sweep
    of = unit.velocity, feet.force
    from = 1 Hz
    to = 40 Hz
case soft
    mount = 20 N/mm
expect low = peak(sweep, unit.velocity) <= 1 m/s
expect still = sensitivity(natural_frequency(1), mount) <= 1
`;

describe("going to a name", () => {
  it("finds definition and references of a number", () => {
    const { view, offset, text } = at(MODEL);
    const texts = { [FILE]: text };
    expect(shown(definition(view, offset), texts)).toEqual([`${FILE}:2 mount`]);
    expect(shown(references(view, offset, true), texts)).toEqual(
      [2, 5, 6, 14, 16].map((line) => `${FILE}:${line} mount`),
    );
    expect(references(view, offset, false)).toHaveLength(4);
    expect(highlights(view, offset).map(({ kind }) => kind)).toEqual([
      "definition",
      ...Array(4).fill("reference"),
    ]);
  });

  it.each([
    ["spring s between un|it and ground = 1 N/m\nmass unit = 2 kg\n", 2],
    [
      "mass unit = 2 kg\nforce f on unit\nask sweep\n    of = |unit.velocity\n    from = 1 Hz\n    to = 2 Hz\n",
      1,
    ],
    ["mass unit = 2 kg\nspring s between unit and ground = 1 N/m\nexpect a = static_force(s|) <= 3 N\n", 2],
    ["force f on u\nmass u = 2 kg\nask sweep\n    by = |f\n    from = 1 Hz\n    to = 2 Hz\n", 1],
    ["ask sweep\nexpect a = peak(swe|ep, u.velocity) <= 1 m/s\n", 1],
    ["spring a between u and ground = 1 N/m\nspring b between u and ground\n    like = a|\n", 1],
    ["case winter\nexpect a = natural_frequency(1) <= 3 Hz\n    cases = win|ter\n", 1],
    ["let µ_weg = 2 mm\n> 𐐀 note ° ²\nlet other = 3 * µ_w|eg\r\n", 1],
  ])("finds the definition in %j", (marked, line) => {
    const { view, offset, text } = at(`${marked}`);
    const [place] = definition(view, offset);
    expect(text.slice(0, place.span.start).split("\n")).toHaveLength(line);
  });

  it.each([
    "mass u = 2 kg\n    weight = posi|tive\nlet positive = 3\n",
    "mass u = 2 k|g\n",
    "# mou|nt\nlet mount = 3\n",
  ])("finds nothing in %j", (marked) => {
    const { view, offset } = at(marked);
    expect(definition(view, offset)).toEqual([]);
  });

  it("keeps the names of a kit apart from those outside", () => {
    const kit = `kit foot(stiffness) between above and below
    spring rubber between above and below = stiffness
let stiffness = 3 N/mm
mass pump = 1 kg
part left = foot(stiffness: stiffness) between pump and ground
group all = left
ask sweep
    of = left.rubber.force
`;
    const inner = at(kit.replace("= stiffness", "= stiff|ness"));
    expect(shown(references(inner.view, inner.offset, true), { [FILE]: inner.text })).toEqual([
      `${FILE}:1 stiffness`,
      `${FILE}:2 stiffness`,
      `${FILE}:5 stiffness`,
    ]);
    const member = at(kit.replace("left.rubber", "left.rub|ber"));
    expect(shown(definition(member.view, member.offset), { [FILE]: member.text })).toEqual([
      `${FILE}:2 rubber`,
    ]);
  });

  it("goes into used files and finds who else uses them", () => {
    const { view, offset, text } = at('thrum 1\nuse "numbers.thrum"\nlet mine = fo|ot\n', FILES);
    const texts = { [FILE]: text, ...FILES };
    expect(shown(definition(view, offset), texts)).toEqual(["pier/numbers.thrum:3 foot"]);
    expect(shown(references(view, offset, true), texts).sort()).toEqual([
      "pier/fan.thrum:4 foot",
      "pier/numbers.thrum:3 foot",
      "pier/numbers.thrum:4 foot",
      `${FILE}:3 foot`,
    ]);
    const path = at('use "num|bers.thrum"\n', FILES);
    expect(definition(path.view, path.offset)).toEqual([
      { file: "pier/numbers.thrum", span: { start: 0, end: 0 } },
    ]);
  });
});

describe("renaming", () => {
  it("changes every place", () => {
    const result = renamed(MODEL, "rubber");
    const { text } = cursorIn(MODEL);
    expect(result).toEqual({ [FILE]: text.replaceAll(/\bmount\b/g, "rubber") });
    expect(errorsOf((result as Record<string, string>)[FILE])).toEqual([]);
  });

  it("names an unnamed ask behind its kind", () => {
    const result = renamed(MODEL.replace("mo|unt", "mount").replace("peak(sweep", "peak(swe|ep"), "run_up");
    expect((result as Record<string, string>)[FILE]).toContain("ask sweep run_up\n");
    expect((result as Record<string, string>)[FILE]).toContain("peak(run_up, unit.velocity)");
  });

  it("refuses to name one of two unnamed asks, since the other would change its name", () => {
    const text = "ask |sweep\nask sweep\nexpect a = peak(sweep_2, u.velocity) <= 1 m/s\n";
    expect(renamed(text, "first")).toMatch(/would change what `sweep_2` means/);
  });

  it("reaches over used files", () => {
    const result = renamed('thrum 1\nuse "numbers.thrum"\nlet mine = fo|ot\n', "sole", FILES);
    expect(result).toEqual({
      [FILE]: 'thrum 1\nuse "numbers.thrum"\nlet mine = sole\n',
      "pier/numbers.thrum": NUMBERS.replaceAll(/(?<!_)foot/g, "sole"),
      "pier/fan.thrum": FAN.replace("= foot", "= sole"),
    });
  });

  it("starts in the used file too", () => {
    const { text, offset } = cursorIn(NUMBERS.replace("let foot", "let fo|ot"));
    const view = viewOf(text, { file: "pier/numbers.thrum", files: { "pier/fan.thrum": FAN } });
    const result = rename(view, offset, "sole");
    expect("files" in result && result.files.map(({ file }) => file)).toEqual([
      "pier/numbers.thrum",
      "pier/fan.thrum",
    ]);
  });

  it.each([
    ["let a = 1\nlet b| = 2\n", "a", "`a` is a number already, in `pier/pump.thrum`"],
    [
      "let a = 1\nlet b| = 2\n",
      "ground",
      "`ground` cannot be a name: it is the support that is always there",
    ],
    ["let b| = 2\n", "within", "`within` cannot be a name: it is a word of the language"],
    ["let b| = 2\n", "kN", "`kN` is a unit: behind a number it would be read as that, not as the name"],
    ["let b| = 2\n", "run-up", /starts with a letter/],
    ["let b| = 2\n", "2nd", /starts with a letter/],
    [
      "let b| = 2\nmass u == b\n",
      "c",
      "line 2 of `pier/pump.thrum` cannot be read, and it holds `b`; mend it first",
    ],
    ["let b| = 2\n", "", /at least one letter/],
    [
      "spring s between u and gro|und = 2 N/m\n",
      "earth",
      "`ground` is the support that is always there; it keeps its name",
    ],
    ["mass u = 2 k|g\n", "t", "`kg` is a unit; another unit is a conversion, not a rename"],
    ["ma|ss u = 2 kg\n", "body", "`mass` is a word of the language"],
    [
      "mass u = 2 kg\n    wei|ght = off\n",
      "load",
      "`weight` is a detail of `mass`, which the language names",
    ],
    ["let a = sq|rt(2)\n", "root", "`sqrt` is a function of the language"],
    ["let a = 2 # no|te\n", "b", "only names can be renamed"],
    ["let a = miss|ing\n", "b", "nothing is called `missing`, so there is nothing to rename"],
    [
      "kit foot(k) between a and b\n    spring r between a and b = k * stiff\nlet sti|ff = 2\n",
      "k",
      /would change what `stiff` means/,
    ],
    [
      "kit foot(k) between a and b\n    spring |r between a and b = k\n",
      "a",
      /`a` is a name of the kit `foot` already/,
    ],
  ])("refuses %j -> %j", (marked, name, reason) => {
    expect(renamed(marked, name)).toEqual(
      typeof reason === "string" ? reason : expect.stringMatching(reason),
    );
  });

  it("refuses a name that a user of the file has", () => {
    const { text, offset } = cursorIn(NUMBERS.replace("let foot", "let fo|ot"));
    const view = viewOf(text, { file: "pier/numbers.thrum", files: { "pier/fan.thrum": FAN } });
    expect(rename(view, offset, "fan")).toEqual({ refused: "`fan` is a mass already, in `pier/fan.thrum`" });
  });

  it("prepares with the span of the name alone", () => {
    const { view, offset, text } = at("let µ_weg = 2 mm\nlet x = 3*µ_we|g + 1 mm\n");
    const prepared = prepareRename(view, offset);
    expect("span" in prepared && text.slice(prepared.span.start, prepared.span.end)).toBe("µ_weg");
  });
});
