import { expect, describe as group, test } from "vitest";
import type { End, Motion, SystemBuilder } from "../../shared-core/mechanics/builder.ts";
import type { StatementValues } from "../../shared-core/vocabulary/description.ts";
import { describe, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";

interface Given {
  readonly numbers?: Readonly<Record<string, number>>;
  readonly ratio?: { readonly value: number; readonly atHz: number };
  readonly count?: number;
  readonly motion?: Motion;
}

const form = (coordinate: number): End => ({
  coordinates: [coordinate],
  factors: [1],
  supports: [],
  supportFactors: [],
});
const ENDS: Readonly<Record<string, End>> = { name: form(0), a: form(1), b: form(2) };

/** What a statement puts into the builder, call by call. */
function assembled(
  keyword: string,
  { numbers = {}, ratio, count = 1, motion = "sliding" }: Given,
): unknown[] {
  const calls: unknown[] = [];
  const values: StatementValues = {
    name: "x",
    motion,
    count,
    has: (key) => key in numbers,
    number: (key) => numbers[key],
    at: () => ratio,
    word: () => undefined,
    end: (slot) => ENDS[slot],
  };
  const builder: SystemBuilder = {
    inertia: (...args) => void calls.push(["inertia", ...args]),
    element: (...args) => void calls.push(["element", ...args]),
    sharedMass: (...args) => void calls.push(["sharedMass", ...args]),
    drive: (...args) => void calls.push(["drive", ...args]),
  };
  const { assemble } = describe(keyword) ?? {};
  if (assemble === undefined) throw new Error(`${keyword} puts nothing into the equations`);
  assemble(values, builder);
  return calls;
}

group("what statements put into the equations", () => {
  test("a mass and a moment of inertia stand on their own coordinate", () => {
    expect(assembled("mass", { numbers: { mass: 8 } })).toEqual([["inertia", "x", ENDS.name, 8]]);
    expect(assembled("inertia", { numbers: { inertia: 0.4 }, motion: "turning" })).toEqual([
      ["inertia", "x", ENDS.name, 0.4],
    ]);
  });

  test("junctions and supports put nothing", () => {
    expect(assembled("junction", {})).toEqual([]);
    expect(assembled("support", {})).toEqual([]);
  });

  test("a spring with all that it may have", () => {
    const numbers = { stiffness: 5400, loss_factor: 0.03, preload: 20, rated_travel: 0.004, mass: 0.5 };
    expect(assembled("spring", { numbers, count: 4 })).toEqual([
      [
        "element",
        "x",
        "sliding",
        ENDS.a,
        ENDS.b,
        {
          keyword: "spring",
          stiffness: 5400,
          damping: undefined,
          lossFactor: 0.03,
          preload: 20,
          ratedTravel: 0.004,
          count: 4,
        },
      ],
      ["sharedMass", "x", ENDS.a, ENDS.b, 2],
    ]);
  });

  // 2 zeta k / omega with k = 5400 N/m, zeta = 5 %, 12 Hz: 540/(24 pi) = 7.16197 N s/m.
  test("a damping ratio is a damper 2 zeta k / omega beside it, per spring", () => {
    const [call] = assembled("spring", {
      numbers: { stiffness: 5400 },
      ratio: { value: 0.05, atHz: 12 },
      count: 3,
    }) as [string, string, string, End, End, { damping: number; count: number }][];
    expect(call[5].damping).toBeCloseTo(7.161972439135292, 12);
    expect(call[5].count).toBe(3);
  });

  test("a damper and an inerter", () => {
    const damper = assembled("damper", { numbers: { damping: 40, rated_force: 900 }, motion: "turning" });
    expect(damper).toEqual([
      [
        "element",
        "x",
        "turning",
        ENDS.a,
        ENDS.b,
        { keyword: "damper", damping: 40, ratedForce: 900, count: 1 },
      ],
    ]);
    const inerter = assembled("inerter", { numbers: { inertance: 120 } });
    expect(inerter).toEqual([
      ["element", "x", "sliding", ENDS.a, ENDS.b, { keyword: "inerter", inertance: 120, count: 1 }],
    ]);
  });

  test("whatever moves or joins and is computed assembles", () => {
    for (const { keyword, family, notYet, assemble } of STATEMENTS) {
      if (notYet || !["moves", "joins"].includes(family) || ["bind", "group"].includes(keyword)) continue;
      expect(assemble, keyword).toBeDefined();
    }
  });
});
