import { describe, expect, test } from "vitest";
import { dimension, kindOf, NUMBER, RATE } from "../../shared-core/units/quantity.ts";
import {
  argumentKinds,
  FUNCTIONS,
  functionOf,
  resultKind,
  signature,
} from "../../shared-core/vocabulary/functions.ts";
import cases from "../reference/data/cases.json" with { type: "json" };

/** SI numbers in the order of the parameters. */
function value(name: string, ...numbers: readonly number[]): number {
  const found = functionOf(name)?.evaluate?.(numbers);
  if (found === undefined) throw new Error(`${name} has no value of its own`);
  return found;
}

/** A row of the sourced cases (test/reference/data/cases.json), which carry their citations. */
function reference(id: string, quantity: string): { readonly value: number; readonly tolerance: number } {
  const row = cases.find((each) => each.id === id)?.expected.find((each) => each.quantity === quantity);
  if (row === undefined) throw new Error(`${id}: ${quantity}`);
  return { value: row.value, tolerance: row.rel_tol };
}

function expectNear(found: number, { value: wanted, tolerance }: { value: number; tolerance: number }): void {
  expect(Math.abs(found / wanted - 1)).toBeLessThanOrEqual(tolerance);
}

describe("helpers against the sourced cases", () => {
  // p65: closed forms G d^4/(8 D^3 n), 3EI/L^3, 48EI/L^3, 192EI/L^3, GJ/L.
  test("stiffness of springs, beams and shafts", () => {
    const p65 = (quantity: string) => reference("p65-handbook-stiffness", quantity);
    expectNear(value("helical_spring", 0.004, 0.032, 8, 79e9), p65("(a) spring rate"));
    const secondMoment = (0.02 * 0.01 ** 3) / 12;
    expectNear(secondMoment, p65("(b) second moment of area"));
    expectNear(value("cantilever", 210e9, secondMoment, 0.5), p65("(b) cantilever"));
    expectNear(value("simply_supported", 210e9, secondMoment, 0.5), p65("(b) simply supported, centre"));
    expectNear(value("fixed_fixed", 210e9, secondMoment, 0.5), p65("(b) fixed-fixed, centre"));
    expectNear(value("shaft", 80e9, 0.025, 0.8, 0), p65("(c) torsional stiffness"));
    expectNear(value("series", 300, 600), p65("(d) series"));
    expectNear(value("parallel", 300, 600), p65("(d) parallel"));
  });

  // p31: shaft 1.5 in, 40 in, 11.5e6 psi, 16144.43729 N m/rad; 1 psi = 6894.757293168 Pa.
  test("a shaft in inch units", () => {
    const found = value("shaft", 11.5e6 * 6894.757293168361, 1.5 * 0.0254, 40 * 0.0254, 0);
    expectNear(found, reference("p31-two-disc-imperial", "torsional stiffness in SI"));
  });

  // p32: 70 mm, 1.5 m, 84 GPa.
  test("a shaft between rotors", () => {
    expectNear(value("shaft", 84e9, 0.07, 1.5, 0), reference("p32-three-disc", "stiffness 1"));
  });

  // p21: zeta = (a/w + b w)/2 fitted at 2 Hz and 15 Hz.
  test("Rayleigh damping through two points", () => {
    const points = [0.02, 2, 0.05, 15];
    expectNear(value("mass_damping_for", ...points), reference("p21-rayleigh-damping", "a"));
    expectNear(value("stiffness_damping_for", ...points), reference("p21-rayleigh-damping", "b"));
  });

  // p01: m = 8 kg, k = 5400 N/m, c = 40 N s/m; exact logarithmic decrement and damping ratio.
  test("critical damping, and the damping ratio from the decrement", () => {
    const p01 = (quantity: string) => reference("p01-sdof-basics", quantity);
    expectNear(value("critical_damping", 5400, 8), p01("critical damping coefficient"));
    const decrement = p01("logarithmic decrement (exact)").value;
    expectNear(value("decay_ratio", 1, Math.exp(-5 * decrement), 5), p01("damping ratio"));
  });

  // p01 read backwards: 5400 N/m under 8 kg gives 4.134966716 Hz.
  test("stiffness for a natural frequency", () => {
    const { value: hertz } = reference("p01-sdof-basics", "undamped natural frequency");
    expectNear(value("stiffness_for", hertz, 8), { value: 5400, tolerance: 1e-8 });
  });
});

describe("helpers against closed forms", () => {
  // Moments of inertia of plain shapes: any textbook of mechanics.
  test("disc, rod and ring", () => {
    expect(value("disc", 85, 0.3)).toBeCloseTo(3.825, 12);
    expect(value("rod", 120, 6)).toBeCloseTo(360, 12);
    expect(value("ring", 40, 0.2, 0.3)).toBeCloseTo(2.6, 12);
    // A ring without a hole is a disc; a thin one has all its mass at the radius.
    expect(value("ring", 85, 0, 0.3)).toBeCloseTo(value("disc", 85, 0.3), 12);
    expect(value("ring", 40, 0.3, 0.3)).toBeCloseTo(40 * 0.09, 12);
  });

  test("a bored shaft is the solid one less its core", () => {
    const bored = value("shaft", 80e9, 0.06, 1.2, 0.02);
    expect(bored).toBeCloseTo(value("shaft", 80e9, 0.06, 1.2, 0) - value("shaft", 80e9, 0.02, 1.2, 0), 6);
  });

  // From p V^n = constant: the force A p(V - A x) has the slope n p A^2/V at x = 0; compared with its difference.
  test("a gas spring is the slope of the adiabat", () => {
    const [pressure, area, volume, exponent] = [6e5, 0.012, 0.0045, 1.4];
    const forceAt = (x: number) => pressure * area * (volume / (volume - area * x)) ** exponent;
    const slope = (forceAt(1e-6) - forceAt(-1e-6)) / 2e-6;
    expect(value("gas_spring", pressure, area, volume, exponent) / slope).toBeCloseTo(1, 7);
  });
});

describe("validity", () => {
  const outside = (name: string, ...numbers: readonly number[]) => functionOf(name)?.outside?.(numbers);

  test("is stated where a helper is used outside its range", () => {
    expect(outside("helical_spring", 0.008, 0.06, 6.5, 79e9)).toBeUndefined();
    expect(outside("helical_spring", 0.03, 0.06, 6.5, 79e9)).toBe("coil over wire is 2, outside 4 to 20");
    expect(outside("helical_spring", 0.008, 0.06, 1, 79e9)).toBe("1 active turns are fewer than 2");
    expect(outside("shaft", 80e9, 0.06, 1, 0.07)).toBe("the bore is not smaller than the diameter");
    expect(outside("ring", 1, 0.3, 0.2)).toBe("the inner radius is larger than the outer one");
    expect(outside("gas_spring", 6e5, 0.01, 0.004, 2)).toBe(
      "an exponent of 2 lies outside 1 to 5/3, what a gas can have",
    );
    expect(outside("decay_ratio", 1, 2, 5)).toBe("the later peak is the larger one: this grows");
    expect(outside("mass_damping_for", 0.02, 2, 0.5, 15)).toContain("mass_damping is negative");
    expect(outside("stiffness_damping_for", 0.05, 2, 0.001, 15)).toContain("stiffness_damping is negative");
    expect(outside("mass_damping_for", 0.02, 2, 0.05, 15)).toBeUndefined();
  });

  test("what has no meaning is not finite", () => {
    expect(value("mass_damping_for", 0.02, 2, 0.05, 2)).not.toSatisfy(Number.isFinite);
    expect(value("decay_ratio", 1, -1, 5)).toBeNaN();
    expect(value("critical_damping", -1, 8)).toBeNaN();
    expect(value("ln", 0)).toBeNaN();
    expect(value("log10", -1)).toBeNaN();
  });
});

describe("kinds", () => {
  const stiffness = kindOf(dimension(0, 1, -2));
  const torsional = kindOf(dimension(2, 1, -2));
  const kind = (name: string, ...kinds: Parameters<typeof resultKind>[1]) => {
    const fn = functionOf(name);
    return fn && resultKind(fn, kinds);
  };

  test("a helper of something that turns gives something that turns", () => {
    expect(kind("series", stiffness, stiffness)).toEqual(stiffness);
    expect(kind("series", torsional, torsional)).toEqual(torsional);
    expect(kind("stiffness_for", RATE, kindOf(dimension(2, 1)))).toEqual(torsional);
    expect(kind("stiffness_for", RATE, kindOf(dimension(0, 1)))).toEqual(stiffness);
    expect(kind("critical_damping", torsional, kindOf(dimension(2, 1)))).toEqual(kindOf(dimension(2, 1, -1)));
    const pressure = kindOf(dimension(-1, 1, -2));
    expect(kind("shaft", pressure, kindOf(dimension(1)), kindOf(dimension(1)))).toEqual(torsional);
  });

  test("math functions keep, halve or drop the dimension", () => {
    expect(kind("abs", RATE)).toEqual(RATE);
    expect(kind("max", stiffness, stiffness)).toEqual(stiffness);
    expect(kind("max", stiffness, torsional)).toBeUndefined();
    expect(kind("sqrt", kindOf(dimension(0, 0, -2)))).toEqual(kindOf(dimension(0, 0, -1)));
    expect(kind("sqrt", RATE)).toBeUndefined();
    expect(kind("sin", NUMBER)).toEqual(NUMBER);
    expect(kind("natural_frequency", NUMBER)).toEqual(RATE);
  });

  test("every number of a measure has kinds to check", () => {
    for (const { name, parameters } of FUNCTIONS) {
      for (const { content } of parameters) {
        if (content.is !== "number" || content.measure === "any") continue;
        expect(argumentKinds(content).length, name).toBe(content.motions?.length ?? 1);
      }
    }
  });
});

describe("the list of functions", () => {
  // The functions of language.md, sections 2 and 3, in its order.
  const named = `sqrt exp ln log10 sin cos tan asin acos atan atan2 abs min max floor ceil round sign
    natural_frequency damped_frequency damping_ratio effective_mass static_deflection static_force
    peak highest lowest rms peak_at least least_at value phase residual primary transmissibility
    settling_time bandwidth period_of crossing_rate expected_peak correlation separation clear_of_modes below
    stability_margin period sensitivity
    helical_spring cantilever simply_supported fixed_fixed shaft disc rod ring series parallel gas_spring
    stiffness_for critical_damping decay_ratio mass_damping_for stiffness_damping_for`.split(/\s+/);

  test("is that of the language, each once", () => {
    expect(FUNCTIONS.map(({ name }) => name).sort()).toEqual([...named].sort());
  });

  test("only what needs pendulums, random or shock answers is not yet computed", () => {
    const later = FUNCTIONS.filter(({ notYet }) => notYet).map(({ name }) => name);
    expect(later.sort()).toEqual([
      "correlation",
      "crossing_rate",
      "expected_peak",
      "period",
      "primary",
      "residual",
    ]);
  });

  test("math functions and helpers compute, helpers say where they hold", () => {
    for (const fn of FUNCTIONS) {
      expect(fn.evaluate !== undefined, fn.name).toBe(fn.group !== "answer");
      if (fn.group === "helper") expect(fn.formula && fn.source, fn.name).toBeTruthy();
      expect(fn.example, fn.name).toContain(`${fn.name}(`);
      expect(fn.says, fn.name).not.toMatch(/\.$/);
    }
  });

  test("signatures read as the language has them", () => {
    const shown = (name: string) => signature(functionOf(name) ?? FUNCTIONS[0]);
    expect(shown("shaft")).toBe("shaft(G, diameter, length, bore: 0)");
    expect(shown("series")).toBe("series(k1, k2, …)");
    expect(shown("value")).toBe("value(ask, quantity, at: …)");
    expect(shown("effective_mass")).toBe("effective_mass(mode, [direction])");
    expect(shown("stability_margin")).toBe("stability_margin()");
  });
});
