import { describe, expect, it } from "vitest";
import { type InlayKind, type InlayOptions, inlayHints } from "../../shared-core/features/inlay.ts";
import type { View } from "../../shared-core/features/view.ts";
import { expectedOf, offsetOf, referenceText, viewOf } from "./readout-view.ts";

/** Text of the line up to the hint, and the hint. */
function shown(view: View, options: InlayOptions = {}): readonly string[] {
  const { text } = view.model.tree;
  return inlayHints(view, { start: 0, end: text.length }, options).map(
    ({ offset, label }) => `${text.slice(text.lastIndexOf("\n", offset - 1) + 1, offset)}⟨${label}⟩`,
  );
}

const only = (...kinds: readonly InlayKind[]): InlayOptions => ({ kinds: new Set(kinds) });

const TEXT = `thrum 1
let load = 2 kg
let foot = 200 N/mm
let feet = 4 * foot
let run = 300 rpm
mass block = 6 kg + load
inertia wheel = 0.5 kg*m^2
spring coil between block and ground = 5400 N/m
spring shaft between wheel and ground = feet * 1 m^2
    loss_factor = 2 %
force shake on block
    amplitude = -(3 N)
    frequency = run
expect slow = natural_frequency(1) <= 0.9 * run
expect plain = natural_frequency(1) <= 5 Hz
`;

describe("natural frequencies behind what moves", () => {
  it("are those with everything else held still", () => {
    // p01: 8 kg on 5400 N/m. Wheel: sqrt(800e3 / 0.5) / 2 pi = 201.3 Hz.
    const expected = expectedOf("p01-sdof-basics", "undamped natural frequency");
    expect(shown(viewOf(TEXT), only("frequency"))).toEqual([
      `mass block = 6 kg + load⟨${Number(expected.toPrecision(4))} Hz alone⟩`,
      "inertia wheel = 0.5 kg*m^2⟨201.3 Hz alone⟩",
    ]);
  });

  it("stand behind masses of a chain, each with the springs at both ends", () => {
    // p22: sqrt(2 k / m) / 2 pi and sqrt(k / m) / 2 pi.
    const hints = shown(viewOf(referenceText("p22-effective-modal-mass")), only("frequency"));
    expect(hints.map((hint) => hint.split("⟨")[1])).toEqual([
      "5.513 Hz alone⟩",
      "5.513 Hz alone⟩",
      "3.898 Hz alone⟩",
    ]);
  });

  it("are left out where nothing pulls back", () => {
    const free =
      "thrum 1\nmass a = 1 kg\nmass b = 1 kg\nspring s between a and ground = 9 N/m\ndamper d between a and b = 1 N*s/m\n";
    expect(shown(viewOf(free), only("frequency"))).toHaveLength(1);
  });
});

describe("values behind expressions", () => {
  it("stand where the text does not say them already", () => {
    expect(shown(viewOf(TEXT), only("value"))).toEqual([
      "let feet = 4 * foot⟨= 800 N/mm⟩",
      "mass block = 6 kg + load⟨= 8 kg⟩",
      "spring shaft between wheel and ground = feet * 1 m^2⟨= 800 kN*m⟩",
      "    frequency = run⟨= 300 rpm⟩",
      "expect slow = natural_frequency(1) <= 0.9 * run⟨= 270 rpm⟩",
    ]);
  });

  it("stand between an expression and its tolerance, and at both ends of a band", () => {
    const text =
      "thrum 1\nlet k = 40 N/m\nlet f = 1 Hz\nmass a = 1 kg\nspring s between a and ground = 2 * k +/- 5 %\n    damping_ratio = 2 % at 2 * f\nexpect band = f <= natural_frequency(1) <= 3 * f\n";
    expect(shown(viewOf(text), only("value"))).toEqual([
      "spring s between a and ground = 2 * k⟨= 80 N/m⟩",
      "    damping_ratio = 2 % at 2 * f⟨= 2 Hz⟩",
      "expect band = f⟨= 1 Hz⟩",
      "expect band = f <= natural_frequency(1) <= 3 * f⟨= 3 Hz⟩",
    ]);
  });

  it("need no report, and are never stale", () => {
    const view = viewOf(TEXT.replace("let load = 2 kg", "let load = 4 kg"), { earlier: TEXT });
    expect(shown(view, only("value"))).toContain("mass block = 6 kg + load⟨= 10 kg⟩");
    expect(shown(viewOf(TEXT, { upTo: "nothing" }), only("value"))).toHaveLength(5);
  });

  it("are in the units of the view; rates and shares stay as they are", () => {
    const inch = shown(viewOf(TEXT, { units: "inch" }), only("value"));
    // 800 N/mm = 800e3 / 175.1268 lbf/in; 8 kg = 8 / 0.45359237 lbm.
    expect(inch[0]).toBe("let feet = 4 * foot⟨= 4568 lbf/in⟩");
    expect(inch[1]).toBe("mass block = 6 kg + load⟨= 17.64 lbm⟩");
    expect(inch[3]).toBe("    frequency = run⟨= 300 rpm⟩");
    expect(shown(viewOf(TEXT, { units: "si" }), only("value"))[0]).toBe("let feet = 4 * foot⟨= 800 kN/m⟩");
  });

  it("are left out where an expression has an error", () => {
    expect(
      shown(viewOf("thrum 1\nlet a = 3 kg + 2 m\nlet b = nowhere * 2\nlet c = a * 2\n"), only("value")),
    ).toEqual([]);
  });
});

describe("margins behind expectations", () => {
  it("say value and margin, of the case that is nearest to failing", () => {
    // p01; a quarter of the mass doubles the frequency.
    const f = expectedOf("p01-sdof-basics", "undamped natural frequency");
    const left = (limit: number) => Number(((1 - f / limit) * 100).toPrecision(2));
    expect(shown(viewOf(TEXT), only("margin"))).toEqual([
      `expect slow = natural_frequency(1) <= 0.9 * run⟨${Number((60 * f).toPrecision(4))} rpm, ${left(4.5)} % left⟩`,
      `expect plain = natural_frequency(1) <= 5 Hz⟨${Number(f.toPrecision(4))} Hz, ${left(5)} % left⟩`,
    ]);
    const light = `${TEXT}case light\n    load = -4 kg\n`;
    expect(shown(viewOf(light), only("margin"))[1]).toMatch(/⟨8\.27 Hz, 65 % beyond in light⟩$/);
    // Where a lens says the margin.
    expect(shown(viewOf(TEXT), only("found"))[1]).toMatch(
      new RegExp(`⟨${Number(f.toPrecision(4))} Hz⟩$`.replace(".", "\\.")),
    );
    expect(shown(viewOf(light), only("found"))[1]).toMatch(/⟨8\.27 Hz in light⟩$/);
  });

  it("say what is open", () => {
    const text =
      "thrum 1\nmass a = 1 kg\nspring s between a and ground = 4 N/m\nexpect late = natural_frequency(2) <= 3 Hz\n";
    expect(shown(viewOf(text), only("margin"))).toEqual(["expect late = natural_frequency(2) <= 3 Hz⟨open⟩"]);
  });
});

describe("hints and typing", () => {
  it("are never put between the start of the cursor's line and the cursor", () => {
    const view = viewOf(TEXT);
    const end = offsetOf(view, "inertia wheel");
    const at = (cursor: number) => shown(view, { cursor }).filter((hint) => hint.startsWith("mass block"));
    expect(at(end - 1)).toEqual([]);
    expect(at(offsetOf(view, "mass ^block"))).toHaveLength(2);
    expect(at(end)).toHaveLength(2);
  });

  it("keep the last numbers, marked, while new ones are awaited", () => {
    const [hint] = inlayHints(
      viewOf(`${TEXT}\n`, { earlier: TEXT }),
      { start: 0, end: TEXT.length },
      only("frequency"),
    );
    expect(hint.label).toBe("4.135 Hz alone …");
    expect(hint.stale).toBe(true);
    expect(hint.says).toBe("natural frequency of block with everything else held still, of an earlier text");
  });

  it("are those of the range only", () => {
    const view = viewOf(TEXT);
    const start = offsetOf(view, "inertia wheel");
    const hints = inlayHints(view, { start, end: start + 30 }, only("frequency"));
    expect(hints.map(({ label }) => label)).toEqual(["201.3 Hz alone"]);
  });

  it("can all be switched off", () => {
    expect(shown(viewOf(TEXT), only())).toEqual([]);
  });
});
