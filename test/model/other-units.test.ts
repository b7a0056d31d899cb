import { expect, test } from "vitest";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import { learnUnits } from "../../shared-core/model/other-units.ts";
import { understand } from "../../shared-core/model/understand.ts";

const nothing = { read: () => ({ ok: false, why: "missing", detail: "" }) as const };
const read = (text: string) => understand("units.thrum", text, nothing);

test("a unit that only the large table knows is read once it has been learned", async () => {
  const text = "thrum 1\nmass float = 3 stone\nspring line between float and ground = 12 N/yard\n";
  const before = read(text);
  expect(before.diagnostics.map(({ code }) => code)).toContain("unknown-unit");
  expect(await learnUnits(before)).toBe(true);
  const after = read(text);
  expect(after.diagnostics).toEqual([]);
  // 1 stone = 14 lb = 6.35029318 kg, 1 yard = 0.9144 m: international yard and pound agreement of 1959.
  const { assembly } = instantiate(after, 0);
  expect(assembly.inertias[0].value).toBeCloseTo(3 * 6.35029318, 9);
  expect(assembly.elements[0].stiffness).toBeCloseTo(12 / 0.9144, 9);
  expect(await learnUnits(after)).toBe(false);
});

test("what is no unit stays unknown", async () => {
  expect(await learnUnits(read("thrum 1\nmass float = 3 blorps\n"))).toBe(false);
  expect(await learnUnits(read("thrum 1\nmass float = 3 kg\n"))).toBe(false);
});
