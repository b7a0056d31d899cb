import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { hover } from "../../shared-core/features/hover.ts";
import { inlayHints } from "../../shared-core/features/inlay.ts";
import { codeLenses, resolveLens } from "../../shared-core/features/lens.ts";
import type { View } from "../../shared-core/features/view.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { hoverAt, numberBehind, offsetOf, said, viewOf } from "./readout-view.ts";

const TEXT =
  "thrum 1\nlet load = 420 kg\nmass unit = load\nspring feet between unit and ground = 26.5 N/mm\n";

describe("units of a hover", () => {
  // 420 kg on 26.5 kN/m sinks by m g / k; 1 in = 25.4 mm, 1 lbm = 0.45359237 kg.
  const sag = (420 * 9.80665) / 26_500;

  it.each([
    ["as-written", "26.5 N/mm", "mm", 1e-3],
    ["si", "26.5 kN/m", "mm", 1e-3],
    ["inch", "151.3 lbf/in", "in", 0.0254],
  ] as const)("are those of the view: %s", (units, stiffness, length, factor) => {
    const view = viewOf(`${TEXT}expect low = static_deflection(feet) <= 200 mm\n`, { units });
    expect(said(view, "spring ^feet").split("\n")[0]).toBe(`spring feet · ${stiffness}`);
    const { value, unit } = numberBehind(said(view, "mass ^unit"), "gravity:");
    expect(unit).toBe(length);
    expect(Math.abs(value * factor - sag)).toBeLessThan(5e-4 * sag);
  });
});

describe("places of a hover", () => {
  it("are those of the token, behind characters of any width and any line ending", () => {
    const text = `thrum 1\r\n> 𐐀 ° ² µ\r\nlet µ_load = 3 kg\r\nmass unit = 420 kg # µ ° ² 𐐀\r\nspring feet between unit and ground = 26.5 N/mm\r\nlet tiny = 12 µm\r\n`;
    const view = viewOf(text);
    for (const [needle, word] of [
      ["mass ^unit", "unit"],
      ["spring ^feet", "feet"],
      ["between ^unit", "unit"],
      ["^spring", "spring"],
      ["12 ^µm", "µm"],
    ]) {
      const found = hoverAt(view, needle);
      expect(found && text.slice(found.span.start, found.span.end)).toBe(word);
    }
    expect(said(view, "12 ^µm")).toContain("1 µm = 1e-6 m");
    const [{ offset }] = inlayHints(view, { start: 0, end: text.length }, { kinds: new Set(["frequency"]) });
    expect(text.slice(0, offset).endsWith("mass unit = 420 kg")).toBe(true);
  });

  it("reach to the end of a word, and not beyond", () => {
    const view = viewOf(TEXT);
    const end = offsetOf(view, "mass ^unit") + 4;
    expect(hover(view, end)?.span).toEqual({ start: end - 4, end });
    expect(hover(view, end + 1)).toBeUndefined();
  });
});

describe("numbers of an earlier text", () => {
  const view = viewOf(TEXT.replace("26.5", "30"), {
    earlier: `${TEXT}expect slow = natural_frequency(1) <= 3 Hz\n`,
  });

  it("are said to be so, in hovers that hold them", () => {
    const stale = "numbers of an earlier text; new ones are awaited";
    expect(said(view, "mass ^unit")).toContain(stale);
    expect(said(view, "spring ^feet")).toContain(stale);
    expect(hoverAt(viewOf(TEXT), "mass ^unit")?.text).not.toContain(stale);
    // What needs no computed number is of the text as it stands.
    expect(said(view, "^26.5".replace("26.5", "30"))).not.toContain(stale);
    expect(said(view, "^spring")).not.toContain(stale);
  });
});

const folder = fileURLToPath(new URL("../../examples/", import.meta.url));
const examples = readdirSync(folder).filter((file) => file.endsWith(".thrum"));
const example = (file: string): string => readFileSync(folder + file, "utf8");

/** Everything the readouts can say of a text. */
function sayAll(view: View, step: number): number {
  let found = 0;
  const { length } = view.model.tree.text;
  for (let offset = 0; offset <= length; offset += step) if (hover(view, offset) !== undefined) found++;
  for (const cursor of [undefined, 0, length])
    found += inlayHints(view, { start: 0, end: length }, { cursor }).length;
  for (const lens of codeLenses(view)) found += resolveLens(view, lens).title.length > 0 ? 1 : 0;
  return found;
}

describe("every place of a text", () => {
  it.each(examples)("of %s is answered", (file) => {
    const text = example(file);
    const view = viewOf(text, { upTo: "modes" });
    expect(sayAll(view, 1)).toBeGreaterThan(text.length / 3);
  });

  it("of a wholly answered file is answered", () => {
    expect(sayAll(viewOf(example("quay-generator.thrum")), 3)).toBeGreaterThan(100);
  });

  it.each([...STATEMENTS, ...ASKS].map((each) => [each.variant ?? each.keyword, each] as const))(
    "of the example of %s is answered",
    (_, description) => {
      const { example: text, exampleFiles: files = {} } = description;
      expect(sayAll(viewOf(text, { files, upTo: "modes" }), 2)).toBeGreaterThan(0);
    },
  );

  it("of its beginnings is answered, with and without the numbers of the whole", () => {
    const whole = example("gate-actuator.thrum");
    const earlier = viewOf(whole, { upTo: "modes" });
    for (let length = 0; length <= whole.length; length += 61) {
      const text = whole.slice(0, length);
      const bare = viewOf(text, { upTo: "nothing" });
      const stale: View = { ...bare, report: earlier.report, stale: true };
      for (const view of [bare, stale]) {
        expect(() => sayAll(view, 97)).not.toThrow();
        expect(() => hover(view, length)).not.toThrow();
      }
    }
  });
});
