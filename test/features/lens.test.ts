import { describe, expect, it } from "vitest";
import { codeLenses, resolveLens } from "../../shared-core/features/lens.ts";
import type { View } from "../../shared-core/features/view.ts";
import { viewOf } from "./readout-view.ts";

/** p01 without its damper (4.135 Hz); a quarter of the mass doubles the frequency. */
const TEXT = `thrum 1
let m = 8 kg
let k = 5400 N/m
mass block = m
spring coil between block and ground = k
force shake on block
ask modes
ask sweep run
    of = block.displacement
    by = shake
    from = 1 Hz
    to = 3 Hz
> a note above
expect slow = natural_frequency(1) <= 5 Hz
expect band = 3 Hz <= natural_frequency(1) <= 4.5 Hz
case light
    m = 2 kg
case same
    m = 8 kg
`;

const titles = (view: View): readonly string[] =>
  codeLenses(view).map((lens) => `${lens.kind} ${lens.name}: ${resolveLens(view, lens).title}`);

describe("lenses", () => {
  it("say what asks offer, whether expectations hold and what cases change", () => {
    expect(titles(viewOf(TEXT.replace(/case light.*/s, "")))).toEqual([
      "show modes: show",
      "csv modes: write CSV",
      "show run: show",
      "csv run: write CSV",
      "verdict slow: holds, 17 % left",
      "verdict band: holds, 8.1 % left",
    ]);
    expect(titles(viewOf(TEXT)).slice(4)).toEqual([
      "verdict slow: fails in light, 65 % beyond",
      "verdict band: fails in light, 84 % beyond",
      "case light: m 8 kg → 2 kg · mode 1 4.135 Hz → 8.27 Hz · fails: slow, band.high",
      "case same: m 8 kg → 8 kg",
    ]);
  });

  it("stand above the heads of their statements", () => {
    const view = viewOf(TEXT);
    const heads = codeLenses(view).map(({ span }) =>
      TEXT.slice(span.start, span.end).split(" ").slice(0, 2).join(" "),
    );
    expect(heads).toEqual([
      "ask modes",
      "ask modes",
      "ask sweep",
      "ask sweep",
      "expect slow",
      "expect band",
      "case light",
      "case same",
    ]);
  });

  it("are placed from the text alone, so that lines stay where they are", () => {
    expect(codeLenses(viewOf(TEXT, { upTo: "nothing" }))).toEqual(codeLenses(viewOf(TEXT)));
  });

  it("have a title before there are numbers, and where there can be none", () => {
    const awaited = viewOf(TEXT, { upTo: "nothing" });
    expect(titles(awaited)[4]).toBe("verdict slow: numbers are awaited");
    expect(titles(awaited)[6]).toBe("case light: m 8 kg → 2 kg");
    const broken = viewOf(TEXT.replace("mass block = m", "mass block = 3 N"));
    expect(titles(broken)[4]).toBe("verdict slow: no numbers: the model has errors");
  });

  it("mark numbers of an earlier text", () => {
    const view = viewOf(TEXT, { earlier: TEXT });
    const resolved = codeLenses(view).map((lens) => resolveLens(view, lens));
    expect(resolved[4]).toMatchObject({ title: "fails in light, 65 % beyond …", stale: true });
    expect(resolved[0]).toMatchObject({ title: "show", stale: false });
  });

  it("say when only the tolerances fail", () => {
    const text = TEXT.replace("k = 5400 N/m", "k = 5400 N/m +/- 60 %")
      .replace(/case light.*/s, "")
      .replace("<= 5 Hz", "<= 5 Hz\n    tolerance = worst_case");
    // sqrt(1.6) of 4.135 Hz is 5.23 Hz.
    expect(titles(viewOf(text))[4]).toBe("verdict slow: holds, not under its tolerances, 17 % left");
  });
});
