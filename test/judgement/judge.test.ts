import { describe, expect, test } from "vitest";
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import { judgeWith } from "../../shared-core/judgement/judge-with.ts";
import { evaluateExpression, instantiate } from "../../shared-core/model/instantiate.ts";
import { codesOf, judged, modelOf, saidOf, verdictOf } from "./judged.ts";

const pump = (rest: string, stiffness = "640 N/mm"): string => `
let feet = ${stiffness}
let heavy = 180 kg
mass pump = heavy
spring legs between pump and ground = feet
    loss_factor = 8 %
${rest}`;

const imbalance = (speed: string): string => `force imbalance on pump
    unbalance = 4e-3 kg*m
    speed = ${speed}`;

describe("an expectation of a peak that no damping bounds", () => {
  const undamped = `
mass pump = 180 kg
spring feet between pump and ground = 640 N/mm
force shake on pump
    amplitude = 1 N
ask sweep run
    of = pump.velocity
    by = shake
    from = 2 Hz
    to = 40 Hz
expect held = peak(run, pump.velocity) <= 3 mm/s
`;

  test("is not judged, and an error names it and why, beside the warning of the sweep", () => {
    const report = judged(undamped);
    expect(report.cases[0].verdicts[0]).toMatchObject({ name: "held", holds: null, value: null });
    expect(codesOf(report)).toEqual(["not-damped", "expectation-fails"]);
    const [said] = saidOf(report, "expectation-fails");
    expect(said).toMatchObject({ severity: "error" });
    expect(said.message).toMatch(/^`held` cannot be judged: .*mode 1 at 9.4902 Hz has no damping$/);
  });

  test("is said to fail once more when the warning is accepted", () => {
    const report = judged(undamped.replace("ask sweep", "> accept not-damped: it is short\nask sweep"));
    expect(codesOf(report)).toEqual(["expectation-fails"]);
  });
});

describe("an expectation", () => {
  test("gives value, limit, unit, margin and what matters most", () => {
    const verdict = verdictOf(pump("expect held = natural_frequency(1) <= 12 Hz"));
    const f = Math.sqrt(640e3 / 180) / (2 * Math.PI);
    expect(verdict).toMatchObject({ holds: true, limit: 12, unit: "Hz" });
    expect(verdict.value).toBeCloseTo(f, 9);
    expect(verdict.margin).toBeCloseTo(1 - f / 12, 9);
    expect(verdict.mattersMost?.sensitivity).toBeCloseTo(0.5, 4);
  });

  test("that fails says by how much, and which value would cure it", () => {
    const [said] = saidOf(judged(pump("expect held = natural_frequency(1) <= 9 Hz")), "expectation-fails");
    expect(said.message).toBe(
      "`held` fails: `natural_frequency(1)` is 9.49 Hz, at most 9 Hz wanted, 5.45 % beyond it",
    );
    // k = m (2 pi f)^2 = 180 (2 pi 9)^2 = 575.6 N/mm; closed form, rounded to the side that holds
    expect(said.hint).toBe(
      "it would hold with `feet` at most 575 N/mm (now 640 N/mm), or with `heavy` at least 201 kg (now 180 kg), all else as it is",
    );
    expect(said.fixes?.[0]).toMatchObject({ title: "Set feet to 575 N/mm", safe: false });
  });

  test("with its cure written in holds", () => {
    const text = pump("expect held = natural_frequency(1) <= 9 Hz");
    const report = judged(text);
    const [edit] = saidOf(report, "expectation-fails")[0].fixes?.[0].edits ?? [];
    const source = report.model.tree.text;
    const cured = source.slice(0, edit.span.start) + edit.text + source.slice(edit.span.end);
    expect(judged(cured.replace("thrum 1\n", "")).cases[0].verdicts[0].holds).toBe(true);
  });

  test("names each parameter that cures it alone, the one that moves least first", () => {
    const text = pump("expect held = separation(1, 9.4 Hz) >= 30 %");
    // f = sqrt(k/m) / 2 pi = 9.49 Hz. |9.4/f - 1| >= 0.3 wants f <= 9.4/1.3 Hz or f >= 9.4/0.7 Hz: the shorter way is
    // down, over the resonance. k <= m (2 pi 9.4/1.3)^2 = 371.5 N/mm, m >= k / (2 pi 9.4/1.3)^2 = 310.1 kg.
    const report = judged(text);
    const [said] = saidOf(report, "expectation-fails");
    expect(said.hint).toBe(
      "it would hold with `feet` at most 371 N/mm (now 640 N/mm), or with `heavy` at least 311 kg (now 180 kg), all else as it is",
    );
    const source = report.model.tree.text;
    expect(said.related?.map(({ span }) => source.slice(span.start, span.end))).toEqual(["feet", "heavy"]);
    expect(said.fixes?.map(({ title }) => title)).toEqual(["Set feet to 371 N/mm", "Set heavy to 311 kg"]);
  });

  test("within a band is two", () => {
    const report = judged(pump("expect held = 9 Hz <= natural_frequency(1) <= 9.4 Hz"));
    expect(report.cases[0].verdicts.map(({ name, holds }) => [name, holds])).toEqual([
      ["held.low", true],
      ["held.high", false],
    ]);
  });

  test("inside its margin is thin", () => {
    const [said] = saidOf(
      judged(pump("expect held = natural_frequency(1) <= 9.6 Hz\n    margin = 5 %")),
      "expectation-thin",
    );
    expect(said.message).toContain("holds with 1.14 % left, less than its margin of 5 %");
  });

  test("that cannot be computed fails aloud, once", () => {
    const report = judged(pump("expect held = natural_frequency(2) <= 9 Hz"));
    const said = saidOf(report, "expectation-fails");
    expect(said).toHaveLength(1);
    expect(said[0].message).toBe(
      "`held` cannot be judged: there is no mode 2: the model has one elastic mode",
    );
  });
});

describe("tolerances", () => {
  test("worst case of two bands is their corner, proven", () => {
    const verdict = verdictOf(
      pump(
        "expect held = natural_frequency(1) <= 10 Hz\n    tolerance = worst_case",
        "640 N/mm +/- 10 %",
      ).replace("180 kg", "180 kg +/- 5 %"),
    );
    const worst = Math.sqrt((640e3 * 1.1) / (180 * 0.95)) / (2 * Math.PI);
    expect(verdict.holds).toBe(true);
    expect(verdict.tolerance).toMatchObject({ kind: "worst_case", holds: false, how: "proven" });
    expect(verdict.tolerance?.worst).toBeCloseTo(worst, 9);
    expect(verdict.tolerance?.at?.feet).toBeCloseTo(704e3, 6);
    expect(verdict.tolerance?.at?.heavy).toBeCloseTo(171, 9);
  });

  test("worst case of a resonance inside the band is found and called searched", () => {
    const verdict = verdictOf(
      pump(
        `${imbalance("570 rpm")}
ask sweep run
    of = pump.displacement
    from = 2 Hz
    to = 40 Hz
expect held = value(run, pump.displacement, at: 9.5 Hz) <= 1 m
    tolerance = worst_case`,
        "640 N/mm +/- 20 %",
      ),
    );
    // largest at k = m w^2: u w^2 / (eta k) = u / (eta m), up to the square of eta; closed form
    expect(verdict.tolerance?.how).toBe("searched");
    expect((verdict.tolerance?.worst ?? 0) / (4e-3 / (0.08 * 180))).toBeCloseTo(1, 2);
  });

  test("a share of draws is counted", () => {
    const verdict = verdictOf(
      pump("expect held = natural_frequency(1) <= 9.7 Hz\n    tolerance = 99 %", "640 N/mm +/- 10 %"),
    );
    // f <= 9.7 Hz for k <= 180 (2 pi 9.7)^2 = 668.6 kN/m, (668.6 - 576)/128 = 72.4 % of the band
    const share = (180 * (2 * Math.PI * 9.7) ** 2 - 576e3) / 128e3;
    expect(verdict.tolerance).toMatchObject({ kind: "share", holds: false, samples: 2000 });
    expect(Math.abs((verdict.tolerance?.share ?? 0) - share)).toBeLessThan(
      4 * Math.sqrt((share * (1 - share)) / 2000),
    );
  });

  test("four in parallel are drawn together at a corner", () => {
    const verdict = verdictOf(`
mass pump = 180 kg
spring legs between pump and ground = 160 N/mm +/- 10 %
    count = 4
expect held = natural_frequency(1) <= 12 Hz
    tolerance = worst_case`);
    expect(verdict.tolerance?.worst).toBeCloseTo(Math.sqrt((640e3 * 1.1) / 180) / (2 * Math.PI), 9);
  });
});

describe("cases", () => {
  const both = pump(`${imbalance("1470 rpm")}
case stiff
    feet = 4.1 MN/m
expect held = natural_frequency(1) <= 12 Hz`);
  test("say what is wrong in them and not as written", () => {
    const report = judged(both);
    expect(report.cases.map(({ name }) => name)).toEqual(["as written", "stiff"]);
    const near = saidOf(report, "near-resonance");
    expect(near.map((diagnostic) => diagnostic.case)).toEqual(["stiff"]);
    expect(near[0].message).toContain("mode 1 at 24.02 Hz");
    expect(saidOf(report, "expectation-fails").map((diagnostic) => diagnostic.case)).toEqual(["stiff"]);
  });
  test("are left out by an expectation that names others", () => {
    const report = judged(`${both}\n    cases = stiff`);
    expect(report.cases.map(({ verdicts }) => verdicts.length)).toEqual([0, 1]);
  });
  test("do not repeat what holds as written too", () => {
    const report = judged(`mass trolley = 90 kg
let soft = 3 kN/m
mass load = 20 kg
spring rope between load and trolley = soft
case stiff
    soft = 30 kN/m`);
    expect(codesOf(report).filter((code) => code === "free-motion")).toHaveLength(1);
  });
});

describe("acceptances", () => {
  const near = (note: string): string => pump(`${note}\n${imbalance("600 rpm")}`);
  test("silence their code on their statement and are kept with the reason", () => {
    expect(codesOf(judged(near("# no note")))).toContain("near-resonance");
    const report = judged(near("> accept near-resonance: passed in two seconds"));
    expect(codesOf(report)).not.toContain("near-resonance");
    expect(report.accepted).toHaveLength(1);
    expect(report.accepted[0]).toMatchObject({
      reason: "passed in two seconds",
      diagnostic: { code: "near-resonance" },
    });
  });
  test("on another statement silence nothing and are hinted at", () => {
    const report = judged(
      pump(`${imbalance("600 rpm")}`).replace("mass pump", "> accept near-resonance: no\nmass pump"),
    );
    expect(codesOf(report)).toContain("near-resonance");
    expect(codesOf(report)).toContain("unused-accept");
  });
  test("of an error are refused", () => {
    const report = judged(
      pump("> accept expectation-fails: it is fine\nexpect held = natural_frequency(1) <= 9 Hz"),
    );
    expect(codesOf(report)).toContain("expectation-fails");
    expect(report.accepted).toEqual([]);
  });
});

describe("instability", () => {
  const fed = pump(`damper leak between pump and ground = -3 kN*s/m
${imbalance("1470 rpm")}
ask sweep run
    of = pump.velocity
    from = 2 Hz
    to = 40 Hz
expect held = peak(run, pump.velocity) <= 1 m/s`);
  test("leaves modes and takes sweeps and what reads them away, with one error", () => {
    const report = judged(fed);
    expect(report.cases[0].modes.ok).toBe(true);
    expect(report.cases[0].answers.get("run")).toMatchObject({ ok: false, kind: "sweep" });
    expect(report.cases[0].verdicts[0]).toMatchObject({ holds: null, value: null });
    expect(report.diagnostics.filter(({ severity }) => severity === "error").map(({ code }) => code)).toEqual(
      ["unstable-mode"],
    );
  });
});

describe("judging", () => {
  const text = pump(`${imbalance("600 rpm")}\nexpect held = natural_frequency(1) <= 9 Hz`);
  const sources = { instantiate, analyse, evaluate: evaluateExpression };
  test("a bug in one rule costs that rule and is handed to the caller", () => {
    const broken = {
      ...sources,
      analyse: (instance: Parameters<typeof analyse>[0]) => {
        const analysis = analyse(instance);
        return new Proxy(analysis, {
          get(target, key) {
            if (key === "statics") throw new Error("a bug");
            const value = Reflect.get(target, key, target);
            return typeof value === "function" ? value.bind(target) : value;
          },
        });
      },
    };
    const report = judgeWith(broken, modelOf(text));
    expect(report.faults).toEqual([
      { where: "implausible-deflection", case: "as written", error: new Error("a bug") },
    ]);
    expect(codesOf(report)).toEqual(expect.arrayContaining(["near-resonance", "expectation-fails"]));
  });
  test("as far as modes leaves answers and expectations out", () => {
    const report = judged(text, { upTo: "modes" });
    expect(codesOf(report)).toContain("near-resonance");
    expect(report.cases[0].verdicts).toEqual([]);
  });
  test("ends when cancelled, and says nothing about acceptances then", () => {
    const report = judged(text.replace("force", "> accept near-resonance: passed\nforce"), {
      cancelled: () => true,
    });
    expect(report.cases).toEqual([]);
    expect(codesOf(report)).not.toContain("unused-accept");
  });
  test("gives the same report twice", () => {
    const print = () => JSON.stringify(judged(text).diagnostics);
    expect(print()).toBe(print());
  });
});
