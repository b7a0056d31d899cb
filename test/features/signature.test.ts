import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { signatureHelp } from "../../shared-core/features/signature.ts";
import { cursorIn, viewOf } from "./views.ts";

/** Label and the parameter that is typed. */
function helped(marked: string): string | undefined {
  const { text, offset } = cursorIn(marked);
  const help = signatureHelp(viewOf(text), offset);
  if (!help) return undefined;
  const active = help.active === undefined ? undefined : help.parameters[help.active];
  return `${help.label} / ${active ? `${help.label.slice(active.span.start, active.span.end)}: ${active.documentation}` : "-"}`;
}

describe("signature help", () => {
  it.each<[string, string]>([
    ["let a = shaft(|", "shaft(G, diameter, length, bore: 0) / G: shear modulus"],
    ["let a = shaft(80 GPa, 3 mm|, ", "shaft(G, diameter, length, bore: 0) / diameter: outer diameter"],
    [
      "let a = shaft(80 GPa, 3 mm, 1 m, bore: |",
      "shaft(G, diameter, length, bore: 0) / bore: 0: inner diameter; left out: 0",
    ],
    [
      "let a = shaft(80 GPa, 3 mm, 1 m, |",
      "shaft(G, diameter, length, bore: 0) / bore: 0: inner diameter; left out: 0",
    ],
    ["let a = series(1 N/m, 2 N/m, 3 N/m, |", "series(k1, k2, …) / …: stiffnesses one behind the other"],
    ["let a = sqrt(2) + max(1, mi|n(2, 3))", "max(x1, x2, …) / x2: numbers of one kind"],
    ["let a = if(1 < 2, |", "if(condition, then, else) / then: the value where it holds"],
    [
      "expect a = peak(run_up, unit.|velocity) <= 1",
      "peak(ask, quantity) / quantity: quantity, as unit.velocity; it need not stand in the ask",
    ],
    ["kit foot(k, c) between a and b\npart p = foot(3 N/m, |", "foot(k, c) / c: a parameter of the kit"],
    ["kit foot(k, c) between a and b\npart p = foot(c: |", "foot(k, c) / c: a parameter of the kit"],
    ["let µ = abs(3 µm, |", "abs(x) / -"],
  ])("%s", (marked, expected) => {
    expect(helped(marked)).toBe(expected);
  });

  it.each(["let a = 3|", "let a = sqrt(2)|", "# sqrt(|", "point p on b at (0, |", "let a = (3 + |"])(
    "says nothing in %s",
    (marked) => {
      expect(helped(marked)).toBeUndefined();
    },
  );

  it("never throws", () => {
    const text = readFileSync("examples/pump-line.thrum", "utf8");
    const view = viewOf(text);
    for (let offset = 0; offset <= text.length; offset += 7) signatureHelp(view, offset);
  });
});
