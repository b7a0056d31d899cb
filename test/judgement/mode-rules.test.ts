import { describe, expect, test } from "vitest";
import type { Mode } from "../../shared-core/answers/answer.ts";
import { freeMotion } from "../../shared-core/judgement/rules/free-motion.ts";
import { nearResonance } from "../../shared-core/judgement/rules/near-resonance.ts";
import { staticInstability } from "../../shared-core/judgement/rules/static-instability.ts";
import { unreached } from "../../shared-core/judgement/rules/unreached.ts";
import { unstableMode } from "../../shared-core/judgement/rules/unstable-mode.ts";
import type { Assembly } from "../../shared-core/mechanics/assembly.ts";
import { sketch } from "../mechanics/helpers.ts";
import { contextOf, steadyForce } from "./hand-made.ts";

const said = (assembly: Assembly, rule: typeof nearResonance): readonly string[] =>
  rule.check(contextOf(assembly)).map(({ message }) => message);

/** Two equal masses between three equal springs: modes in phase at f, out of phase at sqrt(3) f. */
const pair = sketch({
  masses: { left: 100, right: 100 },
  joints: [
    { a: "left", stiffness: 4e5 },
    { a: "right", b: "left", stiffness: 4e5 },
    { a: "right", stiffness: 4e5 },
  ],
  modalDamping: 0.02,
});
const first = Math.sqrt(4e5 / 100) / (2 * Math.PI);

describe("near-resonance", () => {
  const drivenAt = (hertz: number, high = hertz): Assembly => ({
    ...pair,
    drives: [steadyForce(0, hertz, high)],
  });

  test("speaks inside the band of a mode, with the distance and the gain", () => {
    const [message, ...more] = said(drivenAt(1.1 * first), nearResonance);
    expect(more).toEqual([]);
    expect(message).toContain("runs 10 % above mode 1 at 10.07 Hz");
    // 1/sqrt((1 - 1.1^2)^2 + (2 0.02 1.1)^2) = 4.66, closed form
    expect(message).toContain("4.7 times");
  });
  test("is silent outside it", () => {
    expect(said(drivenAt(1.25 * first), nearResonance)).toEqual([]);
    expect(said(drivenAt(0.79 * first), nearResonance)).toEqual([]);
  });
  test("takes a range of speeds that holds a mode for on it", () => {
    const messages = said(drivenAt(0.5 * first, 3 * first), nearResonance);
    expect(messages).toHaveLength(2);
    expect(messages[0]).toContain("runs through mode 1");
  });
  test("leaves out a mode that the drive does not excite", () => {
    const both = { ...steadyForce(0, Math.sqrt(3) * first) };
    const form = { coordinates: [0, 1], factors: [1, 1], supports: [], supportFactors: [] };
    const together: Assembly = { ...pair, drives: [{ ...both, on: { kind: "form", form } }] };
    expect(said(together, nearResonance)).toEqual([]);
    expect(said(drivenAt(Math.sqrt(3) * first), nearResonance)).toHaveLength(1);
  });
});

describe("unstable-mode", () => {
  test("names the mode, its growth, its doubling time and what feeds it", () => {
    const fed = sketch({
      masses: { gate: 200 },
      joints: [
        { name: "leaf", a: "gate", stiffness: 5e4 },
        { name: "seal", a: "gate", damping: 100 },
        { name: "leak", a: "gate", damping: -500 },
      ],
    });
    const [message, ...more] = said(fed, unstableMode);
    expect(more).toEqual([]);
    // growth = 400/(2 200) = 1 1/s, doubling in ln 2 s; closed form
    expect(message).toContain("mode 1 at 2.516 Hz grows by 1 1/s and doubles every 693.1 ms, fed by `leak`");
  });
  test("finds the feed among terms that are no sums of squares", () => {
    const spring = { coordinates: [0], factors: [1], supports: [], supportFactors: [] };
    const other = { coordinates: [1], factors: [1], supports: [], supportFactors: [] };
    const circulatory: Assembly = {
      ...sketch({
        masses: { x: 10, y: 10 },
        joints: [
          { a: "x", stiffness: 4e3 },
          { a: "y", stiffness: 4e3 },
        ],
      }),
      extras: [
        { owner: "flow", matrix: "stiffness", row: spring, column: other, value: 400 },
        { owner: "flow", matrix: "stiffness", row: other, column: spring, value: -400 },
      ],
    };
    expect(said(circulatory, staticInstability)).toEqual([]);
    // K psi = (4000 - 400 i) psi for psi = (1, -i), so root^2 = -400 + 40 i; closed form.
    const root = [0.998754, 20.02495] as const;
    const shape = { re: Float64Array.of(1, 0), im: Float64Array.of(0, -1) };
    const mode = {
      number: 1,
      frequencyHz: 3.183,
      eigenvalue: root,
      shape,
      complexShape: shape,
    } as unknown as Mode;
    const context = {
      ...contextOf(circulatory),
      modes: { ok: true, value: { modes: [mode], stabilityMargin: -1 } },
    } as const;
    expect(unstableMode.check(context)[0].message).toContain("grows by 0.9988 1/s");
    expect(unstableMode.check(context)[0].message).toContain("fed by `flow`");
  });
  test("takes an undamped and a free system for what they are", () => {
    const floating = sketch({
      masses: { a: 1e4, b: 1e-2, c: 5 },
      joints: [
        { a: "a", b: "b", stiffness: 1e9 },
        { a: "b", b: "c", stiffness: 10 },
      ],
    });
    expect(said(floating, unstableMode)).toEqual([]);
    expect(said(pair, unstableMode)).toEqual([]);
  });
});

describe("static-instability", () => {
  const held = (hold: number): Assembly =>
    sketch({
      masses: { mast: 2100, deck: 500 },
      inertias: { winch: 3 },
      joints: [
        { name: "stays", a: "mast", stiffness: hold },
        { name: "lean", a: "mast", stiffness: -5e4 },
        { name: "pad", a: "deck", b: "mast", stiffness: 1e6 },
        { name: "brake", a: "winch", stiffness: 1e-2 },
      ],
    });
  test("names what pushes, what moves and how much of the push is held", () => {
    const [message] = said(held(4e4), staticInstability);
    expect(message).toContain("`lean` pushes it away with -50 kN/m");
    expect(message).toContain("80 % of what pushes");
    expect(said(held(4e4), unstableMode)).toEqual([]);
  });
  test("is silent when the sum holds, and at the very limit", () => {
    expect(said(held(6e4), staticInstability)).toEqual([]);
    expect(said(held(5e4), staticInstability)).toEqual([]);
  });
});

describe("left-overs", () => {
  test("what floats is named, what nothing touches is named apart", () => {
    const floating = sketch({
      masses: { trolley: 900, load: 2400, panel: 20 },
      joints: [{ a: "load", b: "trolley", stiffness: 3e5, damping: 100 }],
    });
    expect(said(floating, freeMotion)).toEqual([
      "nothing holds `trolley` and `load`: 2 rigid-body modes, numbered 0",
    ]);
    expect(said(floating, unreached)).toEqual(["nothing joins `panel` and nothing drives it"]);
  });
});
