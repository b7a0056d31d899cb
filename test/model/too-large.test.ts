import { expect, test } from "vitest";
import { judge, understand } from "../../shared-core/index.ts";

const nothing = { read: () => ({ ok: false, why: "missing", detail: "" }) as const };

/** A chain of so many masses, two lines each. */
function chain(masses: number): string {
  const lines = ["thrum 1"];
  for (let i = 0; i < masses; i++) {
    lines.push(`mass m${i} = ${(i % 7) + 1} kg`);
    lines.push(`spring k${i} between m${i} and ${i === 0 ? "ground" : `m${i - 1}`} = 1 kN/m`);
  }
  return `${lines.join("\n")}\n`;
}

test("a file of 100,000 lines is read whole, and what is too large to compute is said once", () => {
  const text = `${chain(50_000)}let spare = 3 kilo\n`;
  const model = understand("long.thrum", text, nothing);
  expect(model.diagnostics.map(({ code }) => code)).toEqual(["too-large", "unknown-unit"]);
  const [{ span, message }] = model.diagnostics;
  expect(text.slice(span.start, span.end)).toBe("m2000");
  expect(message).toBe("the model has 50000 free coordinates, at most 2000 are computed");
  expect(judge(model).cases).toEqual([]);
});

test("what is below the limit is computed", () => {
  expect(understand("fits.thrum", chain(2000), nothing).buildable).toBe(true);
});
