import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  encodeTokens,
  semanticTokens,
  TOKEN_MODIFIERS,
  TOKEN_TYPES,
} from "../../shared-core/features/tokens.ts";
import { viewOf } from "./views.ts";

/** Words with their colours, one line a line of the text. */
function coloured(text: string, files: Readonly<Record<string, string>> = {}): string[] {
  return semanticTokens(viewOf(text, { files })).map(({ span, type, modifiers }) =>
    [text.slice(span.start, span.end), type, ...modifiers].join(" "),
  );
}

describe("colours by meaning", () => {
  it("tells families, units, words and quantities apart", () => {
    expect(coloured("mass unit = 2*mount + 3 kg*m^2 # so\n")).toEqual(
      [
        "mass keyword",
        "unit moves definition",
        "2 number",
        "* operator",
        "3 number",
        "kg unit",
        "* unit",
        "m unit",
        "^ unit",
        "2 unit",
        "+ operator",
        "# so comment",
      ].sort((a, b) => order("mass unit = 2*mount + 3 kg*m^2 # so\n", a, b)),
    );
  });

  it("colours a whole model", () => {
    const text = `let mount = 26.5 N/mm +/- 10 % normal
mass unit = 420 kg
    weight = positive
spring mounts between unit and ground = mount
force shake on unit
    law = 3 N * sin(2 * pi * 12 Hz * t)
ask sweep run_up
    of = unit.velocity
    by = shake
case soft
    mount = 20 N/mm
limit zone = 4 mm/s
expect low = value(run_up, unit.velocity, at: 12 Hz) <= zone
`;
    const words = coloured(text);
    for (const each of [
      "mount parameter definition",
      "normal word",
      "positive choice",
      "mounts joins definition",
      "ground moves readonly",
      "shake drives definition",
      "sin function",
      "pi constant readonly",
      "t constant readonly",
      "sweep choice",
      "run_up asks definition",
      "velocity quantity",
      "by property",
      "shake drives",
      "soft case definition",
      "mount parameter",
      "zone limit definition",
      "zone limit",
      "low holds definition",
      "value function",
      "at argument",
      "% unit",
    ]) {
      expect(words).toContain(each);
    }
  });

  it("colours kits from inside and outside", () => {
    const words = coloured(`kit foot(k) between above and below
    spring rubber between above and below = k
mass pump = 1 kg
part left = foot(k: 3 N/m) between pump and ground
mount corner between set and ground at (0, 0, 0) m
    stiffness.x = 3 N/m
ask sweep
    of = left.rubber.force, corner.force.x
`);
    for (const each of [
      "foot kit definition",
      "k parameter definition",
      "above moves definition",
      "rubber joins definition",
      "above moves",
      "k parameter",
      "foot kit",
      "left joins definition",
      "rubber joins",
      "x property",
      "x component",
      "force quantity",
    ]) {
      expect(words).toContain(each);
    }
  });

  it("marks what a used file defines", () => {
    const files = { "pier/numbers.thrum": "thrum 1\nlet foot = 3 N/m\n" };
    expect(coloured('use "numbers.thrum"\nlet mine = foot\n', files)).toContain("foot parameter used");
  });

  it("cuts notes at their tag", () => {
    expect(
      coloured("> source: ticket 𐐀 4 µm\n> plain\n> accept near-resonance: passed\nlet a = 1\n").slice(0, 5),
    ).toEqual([
      "> source: tag",
      " ticket 𐐀 4 µm note",
      "> plain note",
      "> accept near-resonance: tag",
      " passed note",
    ]);
  });

  it("counts lines and characters in UTF-16 units, on every line ending", () => {
    const text = "> 𐐀°\r\nlet µ_weg = 3 µm\r\nlet b = µ_weg\r\n";
    const view = viewOf(text);
    const data = encodeTokens(view, semanticTokens(view));
    let [line, character] = [0, 0];
    const words: string[] = [];
    for (let i = 0; i < data.length; i += 5) {
      character = data[i] === 0 ? character + data[i + 1] : data[i + 1];
      line += data[i];
      words.push(text.split("\r\n")[line].slice(character, character + data[i + 2]));
      expect(TOKEN_TYPES[data[i + 3]]).toBeDefined();
      expect(data[i + 4]).toBeLessThan(1 << TOKEN_MODIFIERS.length);
    }
    expect(words).toEqual(["> 𐐀°", "let", "µ_weg", "3", "µm", "let", "b", "µ_weg"]);
  });

  it("never overlaps, and gives a range what the whole gives", () => {
    const text = readFileSync("examples/ventilation-fan.thrum", "utf8");
    const view = viewOf(text);
    const all = semanticTokens(view);
    for (let i = 1; i < all.length; i++)
      expect(all[i].span.start).toBeGreaterThanOrEqual(all[i - 1].span.end);
    const range = { start: 400, end: 900 };
    const inside = all.filter(({ span }) => span.end > range.start && span.start < range.end);
    expect(inside.length).toBeGreaterThan(20);
    const given = semanticTokens(view, range);
    for (const each of inside) expect(given).toContainEqual(each);
  });
});

/** By place in the text; words are unlike in these lines. */
function order(text: string, a: string, b: string): number {
  const at = (entry: string) => {
    const word = entry.split(" ")[0];
    return entry.endsWith("unit") && word !== "kg"
      ? text.indexOf("kg") + 1 + "kg*m^2".indexOf(word)
      : text.indexOf(word);
  };
  return at(a) - at(b);
}
