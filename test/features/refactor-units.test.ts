import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { convertActions, convertFileActions } from "../../shared-core/features/refactor-units.ts";
import { cursorIn, edited, errorsOf, frequenciesOf, viewOf } from "./views.ts";

function conversions(marked: string): Readonly<Record<string, string>> {
  const { text, offset } = cursorIn(marked);
  const actions = convertActions(viewOf(text), { start: offset, end: offset });
  return Object.fromEntries(actions.map(({ title, edits }) => [title, edited(text, edits)]));
}

describe("a number in another unit", () => {
  // Expected numbers: exact definitions of the inch, pound and standard gravity, rounded by hand.
  it.each<[string, string, string]>([
    ["mass a = 42|0 kg\n", "Convert to 0.42 t", "mass a = 0.42 t\n"],
    ["mass a = 42|0 kg\n", "Convert to 926 lbm", "mass a = 926 lbm\n"],
    [
      "spring a between b and c = 26.5 N/m|m  # so\n",
      "Convert to 26500 N/m",
      "spring a between b and c = 26500 N/m  # so\n",
    ],
    ["let a = 118|0 rpm\n", "Convert to 19.67 Hz", "let a = 19.67 Hz\n"],
    ["let a = 3 i|n +/- 2 %\n", "Convert to 76.2 mm", "let a = 76.2 mm +/- 2 %\n"],
    ["let a = 3 mm +/- 0.2 m|m\n", "Convert to 200 um", "let a = 3 mm +/- 200 um\n"],
    ["let a = -1|0 deg\n", "Convert to 0.175 rad", "let a = -0.175 rad\n"],
    ["let a = 1 g|n\n", "Convert to 9.80665 m/s^2", "let a = 9.80665 m/s^2\n"],
    ["let a = 3 %| \n", "Convert to 30000 ppm", "let a = 30000 ppm \n"],
    [
      "let µ²x = 3\r\nlet a = 5 µ|m  # °𐐀\r\n",
      "Convert to 0.005 mm",
      "let µ²x = 3\r\nlet a = 0.005 mm  # °𐐀\r\n",
    ],
    [
      "body a = 2 t\n    inertia = (310, 840, 760) kg*m|^2\n",
      "Convert to kg*mm^2",
      "body a = 2 t\n    inertia = (3.1e8, 8.4e8, 7.6e8) kg*mm^2\n",
    ],
    [
      "limit a\n    rows =\n        -2 Hz  4.5 mm/|s\n",
      "Convert to 0.0045 m/s",
      "limit a\n    rows =\n        -2 Hz  0.0045 m/s\n",
    ],
    [
      "spring a between b and c = 4 kN*m/ra|d\n",
      "Convert to 69.8 N*m/deg",
      "spring a between b and c = 69.8 N*m/deg\n",
    ],
  ])("%j: %s", (marked, title, expected) => {
    expect(conversions(marked)[title]).toBe(expected);
  });

  it("keeps turning and sliding units apart, and offers none for a bare number", () => {
    expect(Object.keys(conversions("spring a between b and c = 4 N*m/ra|d\n")).join()).not.toMatch(
      /lbf\*ft|kN\*m$/,
    );
    expect(conversions("let a = 3|\n")).toEqual({});
    expect(conversions("let a = 3 furl|ongs\n")).toEqual({});
  });
});

describe("a file in other units", () => {
  const examples = readdirSync("examples").filter((file) => file.endsWith(".thrum"));
  const convert = (text: string, system: "SI" | "inch") => {
    const action = convertFileActions(viewOf(text)).find(({ title }) => title.includes(system));
    return action && edited(text, action.edits);
  };

  it.each(examples)("%s means the same to the digits kept", (file) => {
    const text = readFileSync(`examples/${file}`, "utf8");
    const before = frequenciesOf(text);
    for (const system of ["SI", "inch"] as const) {
      const other = convert(text, system);
      if (other === undefined) continue;
      expect(
        errorsOf(other).filter((each) => !errorsOf(text).includes(each) && !each.startsWith("expectation")),
      ).toEqual([]);
      const after = frequenciesOf(other);
      // Three digits or more are kept: half a unit in the third place of a number that starts with 1 is 0.5 %,
      // and half of that in a frequency.
      const worst = Math.max(...after.map((frequency, i) => Math.abs(frequency / before[i] - 1)));
      expect(worst).toBeLessThan(2.5e-3);
    }
  });

  it("goes there and leaves nothing to convert", () => {
    const text = readFileSync("examples/pump-line.thrum", "utf8");
    const si = convert(text, "SI") as string;
    expect(si.split("\n").filter((line) => /\b(lbm|lbf|psi)\b|\d in\b/.test(line))).toEqual([]);
    expect(si).toContain("let motor_speed = 1180 rpm");
    expect(convert(si, "SI")).toBeUndefined();
    const back = convert(si, "inch") as string;
    expect(convert(back, "inch")).toBeUndefined();
  });

  it("keeps one unit for numbers that shared one", () => {
    const text = "limit a\n    rows =\n        1 Hz 0.2 in/s\n        9 Hz 40 in/s\n";
    expect(convert(text, "SI")).toBe(
      "limit a\n    rows =\n        1 Hz 0.00508 m/s\n        9 Hz 1.016 m/s\n",
    );
  });
});
