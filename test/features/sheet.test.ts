import { describe, expect, it } from "vitest";
import type { PlotCard, SheetContent } from "../../shared-core/features/sheet.ts";
import { sheetContent } from "../../shared-core/features/sheet-content.ts";
import { packContent, unpackContent } from "../../shared-core/protocol/sheet.ts";
import { viewOf } from "./views.ts";

/**
 * One mass of 100 kg on 39478.4176 N/m: natural frequency sqrt(k/m)/(2 pi) = 10 / sqrt(10) Hz = 3.1623 Hz. With
 * c = 2 zeta sqrt(k m) at zeta = 5 % that is 198.7 N*s/m. Closed forms of one oscillator, any vibration textbook.
 */
const ONE = `thrum 1
title "One mass"
> On four feet.
> source: sketch 3
let unit_mass = 100 kg within 50 kg to 200 kg
let drive_rate = 3 Hz +/- 10 %
mass unit = unit_mass
spring feet between unit and ground = 39478.4176 N/m
damper oil between unit and ground = 198.7 N*s/m
force shake on unit
    amplitude = 10 N
    frequency = drive_rate
force kick on unit
    pulse = half_sine
    peak = 100 N
    duration = 20 ms
case heavy
    unit_mass = 150 kg
ask modes
ask sweep run
    of = unit.displacement, feet.force
    by = shake
    from = 1 Hz
    to = 10 Hz
ask history blow
    of = unit.displacement
    by = kick
    lasting = 2 s
ask shock_spectrum shock
    of = unit.displacement
    by = kick
expect low = natural_frequency(1) <= 4 Hz
expect calm = peak(run, unit.displacement) <= 1 mm
expect narrow = natural_frequency(1) >= 3.1 Hz
    margin = 10 %
`;
const view = viewOf(ONE, { judged: true });
const content = sheetContent(view);
const F1 = Math.sqrt(39478.4176 / 100) / (2 * Math.PI);

function plot(of: SheetContent, name: string): PlotCard {
  const card = of.cards.find((each) => each.name === name);
  if (card === undefined || !("panels" in card)) throw new Error(`no plot of ${name}`);
  return card;
}

describe("the ruler", () => {
  const { ruler } = content;
  if (ruler === null) throw new Error("no ruler");
  const hz = (at: number): number => ruler.fromHz * (ruler.toHz / ruler.fromHz) ** at;

  it("hangs the mode where it belongs, as wide as its half-power bandwidth 2 zeta f", () => {
    const [mode] = ruler.modes;
    expect(hz(mode.at)).toBeCloseTo(F1, 9);
    const zeta = 198.7 / (2 * Math.sqrt(39478.4176 * 100));
    expect(hz(mode.high) - hz(mode.low)).toBeCloseTo(2 * zeta * F1, 9);
    expect(hz(mode.bandLow)).toBeCloseTo(0.8 * F1, 9);
    expect(hz(mode.bandHigh)).toBeCloseTo(1.2 * F1, 9);
    expect(mode.label).toBe("3.162 Hz");
  });

  it("stands drives and limits on it and says what is in danger", () => {
    expect(ruler.drives.map(({ name, from }) => [name, Math.round(hz(from) * 1e6) / 1e6])).toEqual([
      ["shake", 3],
    ]);
    expect(ruler.modes[0].danger).toBe(true);
    expect(ruler.limits.map(({ name, side, at }) => [name, side, Number(hz(at).toFixed(6))])).toEqual([
      ["low", "below", 4],
      ["narrow", "above", 3.1],
    ]);
    const texts = ruler.separations.map(({ text }) => text);
    expect(texts).toContain("shake is 5.13 % below mode 1, ratio 0.949");
    expect(texts).toContain("low is 26.5 % above mode 1, ratio 1.26");
  });

  it("stands limits on it whichever side they are written on", () => {
    const reversed = viewOf(`${ONE}expect turned = 3.5 Hz >= natural_frequency(1)\n`, { judged: true });
    expect(sheetContent(reversed).ruler?.limits.at(-1)).toMatchObject({
      name: "turned",
      side: "below",
      label: "≤ 3.5 Hz",
      holds: true,
    });
  });

  it("shows the orders that an expectation keeps clear of, but for those at which a drive runs", () => {
    const expectation = "expect clear = clear_of_modes(2 Hz, orders: (1, 1.5, 3)) >= 5 %\n";
    const asked = sheetContent(viewOf(ONE + expectation, { judged: true })).ruler;
    if (asked === null) throw new Error("no ruler");
    const at = (share: number) => asked.fromHz * (asked.toHz / asked.fromHz) ** share;
    // 1.5 times 2 Hz is the rate of `shake`.
    expect(
      asked.drives.map(({ name, asked: is, label, from }) => [name, is, label, Number(at(from).toFixed(9))]),
    ).toEqual([
      ["shake", false, "shake", 3],
      ["clear", true, "2 Hz", 2],
      ["clear", true, "3 × 2 Hz", 6],
    ]);
    expect(asked.modes[0].danger).toBe(true);
    expect(asked.separations.map(({ text }) => text)).toContain("3 × 2 Hz is 89.7 % above mode 1, ratio 1.9");
  });
});

describe("cards", () => {
  it("stand in the order of the file, later kinds with a reason", () => {
    expect(content.cards.map(({ kind, name }) => [kind, name])).toEqual([
      ["modes", "modes"],
      ["sweep", "run"],
      ["history", "blow"],
      ["reason", "shock"],
    ]);
    expect(content.cards[3]).toMatchObject({ title: "shock spectrum shock" });
    expect(content.cards.every(({ description }) => description.length > 10)).toBe(true);
  });

  it("draw curves in the units of the file, with limits and peaks", () => {
    const { panels, phase, peaks } = plot(content, "run");
    const [displacement] = panels.filter(({ y }) => y.unit === "mm");
    expect(displacement.curves.map(({ name, role }) => [name, role])).toEqual([
      ["unit.displacement", undefined],
      ["calm", "limit"],
    ]);
    expect(Array.from(displacement.curves[1].y)).toEqual([1, 1]);
    // Peak of one oscillator: (F/k) / (2 zeta sqrt(1 - zeta^2)), any vibration textbook.
    const zeta = 198.7 / (2 * Math.sqrt(39478.4176 * 100));
    const peak = (10 / 39478.4176 / (2 * zeta * Math.sqrt(1 - zeta * zeta))) * 1000;
    expect(Math.max(...Array.from(displacement.curves[0].y))).toBeCloseTo(peak, 9);
    expect(peaks[0]).toMatch(/^unit\.displacement up to 2\.536 mm at 3\.154 Hz$/);
    const unwrapped = Array.from(phase?.unwrapped.curves[0].y ?? []);
    expect(unwrapped.length).toBeGreaterThan(50);
    for (let i = 1; i < unwrapped.length; i++)
      expect(Math.abs(unwrapped[i] - unwrapped[i - 1])).toBeLessThan(180);
  });

  it("have a table that holds the peak", () => {
    const { table } = plot(content, "run");
    expect(table.head.slice(0, 2)).toEqual(["frequency in Hz", "unit.displacement in mm"]);
    expect(Math.max(...table.rows.map((row) => Number(row[1])))).toBeCloseTo(2.536, 2);
    expect(table.rows.length).toBeLessThan(130);
  });

  it("show shapes and energy of the modes", () => {
    const [card] = content.cards;
    if (card.kind !== "modes") throw new Error("no modes");
    expect(card.modes[0]).toMatchObject({
      id: "mode:1",
      label: "mode 1 · 3.162 Hz",
      damping: "damping ratio 5 %",
    });
    expect(card.modes[0].energy).toEqual([{ name: "feet", share: 1, text: "100 %" }]);
    expect(Array.from(card.modes[0].shape)).toEqual([1]);
  });
});

describe("motions", () => {
  it("are the modes and the histories, scaled to one", () => {
    expect(content.motions.map(({ id }) => id)).toEqual(["mode:1", "history:blow"]);
    const [mode, history] = sheetContent(view, { motion: "history:blow" }).motions;
    // Its frames are many: they come when they are wanted.
    expect(content.motions[1]).toMatchObject({ frames: 0, values: new Float64Array() });
    expect(mode).toMatchObject({ kind: "mode", re: Float64Array.of(1), im: Float64Array.of(0) });
    if (history.kind !== "history") throw new Error("no history");
    expect(history.values).toHaveLength(history.frames * content.scene.coordinates.length);
    expect(history.stepS * (history.frames - 1)).toBeCloseTo(2, 12);
    expect(Math.max(...history.values.map(Math.abs))).toBeCloseTo(1, 12);
  });
});

describe("the ledger", () => {
  it("has a row an expectation and a verdict a case", () => {
    const rows = content.ledger.map(({ name, condition, verdicts }) => [
      name,
      condition,
      verdicts.map((each) => [each.case, each.holds, each.value, each.thin]),
    ]);
    expect(rows).toEqual([
      [
        "low",
        "natural_frequency(1) <= 4 Hz",
        [
          ["as written", true, "3.162 Hz", false],
          ["heavy", true, "2.582 Hz", false],
        ],
      ],
      // (F/k) / (2 zeta sqrt(1 - zeta^2)) with zeta = 5 % sqrt(100/150) in the heavy case.
      [
        "calm",
        "peak(run, unit.displacement) <= 1 mm",
        [
          ["as written", false, "2.536 mm", false],
          ["heavy", false, "3.105 mm", false],
        ],
      ],
      [
        "narrow",
        "natural_frequency(1) >= 3.1 Hz",
        [
          ["as written", true, "3.162 Hz", true],
          ["heavy", false, "2.582 Hz", false],
        ],
      ],
    ]);
    expect(content.ledger[0].verdicts[0]).toMatchObject({ limit: "≤ 4 Hz", marginText: "21 % left" });
    expect(content.ledger[0].verdicts[0].margin).toBeCloseTo((4 - F1) / 4, 9);
  });
});

describe("knobs", () => {
  it("are the lets with a range or a tolerance, in the units of the text", () => {
    expect(content.knobs.map(({ range: _, ...knob }) => knob)).toEqual([
      {
        name: "unit_mass",
        written: 100,
        value: 100,
        from: 50,
        to: 200,
        step: 1,
        unit: "kg",
        factor: 1,
        text: "100 kg within 50 kg to 200 kg",
        note: "On four feet.\nsource: sketch 3",
      },
      expect.objectContaining({ name: "drive_rate", written: 3, unit: "Hz", step: 0.005 }),
    ]);
  });

  it("move the shown answer over the written one", () => {
    const moved = sheetContent(view, { knobs: { unit_mass: 200, nobody: 3, drive_rate: Number.NaN } });
    expect(moved.knobs[0]).toMatchObject({ written: 100, value: 200 });
    // 2.24 Hz is low, but not above 3.1 Hz; 10 N / (c omega) = 3.6 mm is not calm.
    expect(moved.moved).toBe("holds 1 of 3 in this case · 2.24 Hz");
    expect(content.moved).toBeUndefined();
    expect(moved.ledger[0].verdicts.map(({ value }) => value)).toEqual(["2.236 Hz", "2.582 Hz"]);
    const [panel] = plot(moved, "run").panels;
    expect(panel.curves.map(({ name, role }) => [name, role])).toEqual([
      ["unit.displacement", "written"],
      ["unit.displacement", undefined],
      ["calm", "limit"],
    ]);
    const placed = ({ scene }: SheetContent) => scene.items.map(({ name, box }) => ({ name, box }));
    expect(placed(moved)).toEqual(placed(content));
    expect(moved.scene.items.find(({ name }) => name === "unit")?.says).toBe("mass unit, 200 kg");
  });

  it("say why when nothing can be computed with them", () => {
    const moved = sheetContent(view, { knobs: { unit_mass: -1 } });
    expect(moved.notice).toMatch(/moved numbers/);
    expect(moved.ledger[0].verdicts[0].value).toBe("3.162 Hz");
  });
});

describe("an earlier revision", () => {
  const at = (text: string) => ({ label: "3 Nov, lighter", model: viewOf(text).model });
  /** Half the mass: the frequency is sqrt(2) times as high. */
  const lighter = at(ONE.replace("unit_mass = 100 kg", "unit_mass = 50 kg"));
  const over = sheetContent(view, {}, lighter);

  it("lies under today's answers, in the same units and styles", () => {
    const [panel] = plot(over, "run").panels;
    expect(panel.curves.map(({ name, role, style }) => [name, role, style])).toEqual([
      ["unit.displacement", "earlier", 0],
      ["unit.displacement", undefined, 0],
      ["calm", "limit", expect.any(Number)],
    ]);
    const [before, now] = panel.curves;
    const peakAt = ({ x, y }: typeof now) => x[Array.from(y).indexOf(Math.max(...Array.from(y)))];
    // Damping moves the peak by zeta^2: 0.25 % at most.
    expect(peakAt(before) / peakAt(now)).toBeCloseTo(Math.SQRT2, 2);
    expect(plot(over, "blow").panels[0].curves.map(({ role }) => role)).toEqual(["earlier", undefined]);
  });

  it("hangs on the ruler and stands in the ledger and the head", () => {
    expect(over.earlier).toEqual({ label: "3 Nov, lighter", summary: "holds 1 of 3 in this case · 4.47 Hz" });
    expect(over.ruler?.earlier.map(({ label }) => label)).toEqual(["4.472 Hz"]);
    expect(over.ruler?.modes.map(({ label }) => label)).toEqual(["3.162 Hz"]);
    expect(over.ledger[0].verdicts.map(({ earlier }) => earlier)).toEqual(["4.472 Hz, failed", undefined]);
    expect(content.ledger[0].verdicts[0].earlier).toBeUndefined();
  });

  it("is that of the shown case, and as written where it had none", () => {
    const heavy = sheetContent(view, { case: "heavy" }, at(ONE.replace(/case heavy\n.*\n/, "")));
    expect(heavy.ruler?.earlier[0].label).toBe("3.162 Hz");
    expect(sheetContent(view, { case: "heavy" }, lighter).ruler?.earlier[0].label).toBe("2.582 Hz");
  });

  it("leaves out what did not stand there", () => {
    const bare = sheetContent(
      view,
      {},
      at(ONE.replace(/ask sweep run\n(?: .*\n)*/, "").replace(/expect calm.*\n/, "")),
    );
    expect(plot(bare, "run").panels[0].curves.map(({ role }) => role)).toEqual([undefined, "limit"]);
    expect(bare.ledger[1].verdicts[0].earlier).toBeUndefined();
  });

  it("says why nothing of it is drawn", () => {
    expect(sheetContent(view, {}, { label: "x", reason: "it did not exist then" }).earlier?.reason).toBe(
      "it did not exist then",
    );
    expect(sheetContent(view, {}, at("thrum 1\nmass unit = 3 m\n")).earlier?.reason).toMatch(/errors/);
    expect(sheetContent(view, {}, at("}{")).ruler?.earlier).toEqual([]);
  });
});

describe("cases and units", () => {
  it("show another case", () => {
    const heavy = sheetContent(view, { case: "heavy" });
    expect(heavy.case).toBe("heavy");
    expect(heavy.ruler?.modes[0].label).toBe("2.582 Hz");
    expect(heavy.scene.items.find(({ name }) => name === "unit")?.says).toBe("mass unit, 150 kg");
    expect(sheetContent(view, { case: "nobody" }).case).toBe("as written");
  });

  it("show inch units", () => {
    const inch = sheetContent({ ...view, units: "inch" });
    expect(plot(inch, "run").panels.map(({ y }) => y.unit)).toEqual(["in", "lbf"]);
    expect(inch.knobs[0].unit).toBe("lbm");
    expect(inch.knobs[0].factor).toBeCloseTo(0.45359237, 12);
  });
});

describe("what is not there", () => {
  it("is drawn while numbers are awaited", () => {
    const waiting = sheetContent(viewOf(ONE));
    expect(waiting).toMatchObject({ notice: "numbers are awaited", ruler: null, cards: [] });
    expect(waiting.scene.items.length).toBeGreaterThan(4);
  });

  it("is said when a text has no system", () => {
    for (const text of [
      "",
      "thrum 1\n",
      "thrum 1\nmass a = 3 m\nspring k between a and ground = 1 N/m\n",
      "}{",
    ]) {
      const empty = sheetContent(viewOf(text, { judged: true }));
      expect(empty.cards.length + empty.knobs.length + (empty.notice ?? "").length).toBeGreaterThan(0);
      expect(unpackContent(packContent(empty))).toEqual(JSON.parse(JSON.stringify(empty)));
    }
  });

  it("comes over the wire whole", () => {
    const back = unpackContent(packContent(content));
    expect(back.motions).toEqual(content.motions);
    expect(plot(back, "run").panels).toEqual(plot(content, "run").panels);
  });
});
