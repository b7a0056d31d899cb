import { describe, expect, it } from "vitest";
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import type { DriveInfo, QuantityRef } from "../../shared-core/mechanics/assembly.ts";
import { combineForms, coordinateForm } from "../../shared-core/mechanics/forms.ts";
import type { HistoryAsk, Instance, SweepAsk } from "../../shared-core/model/model.ts";
import { type SystemSketch, sketch } from "../mechanics/helpers.ts";
import { unwrap } from "../numerics/helpers.ts";

const instance = (system: SystemSketch): Instance =>
  ({ assembly: sketch(system), asks: [], diagnostics: [] }) as Partial<Instance> as Instance;

describe("analysis of an instance", () => {
  it("keeps what it has computed", () => {
    const analysis = analyse(instance({ masses: { m: 1 }, joints: [{ a: "m", stiffness: 4 }] }));
    expect(analysis.modes()).toBe(analysis.modes());
    expect(analysis.statics()).toBe(analysis.statics());
    expect(analysis.sensitivity()).toBe(analysis.sensitivity());
    expect(unwrap(analysis.modes()).modes).toHaveLength(1);
  });

  it("tells which modes a direction excites", () => {
    const analysis = analyse(
      instance({
        masses: { a: 1, b: 1 },
        joints: [{ a: "a", b: "b", stiffness: 4 }],
      }),
    );
    const both = combineForms([coordinateForm(0), coordinateForm(1)], [1, 1]);
    expect(analysis.excites(both, 0)).toBeCloseTo(1, 14);
    expect(analysis.excites(both, 1)).toBeCloseTo(0, 14);
    expect(analysis.excites(coordinateForm(0), 1)).toBeCloseTo(Math.SQRT1_2, 14);
    expect(analysis.excites(coordinateForm(0), 7)).toBe(0);
  });

  it("counts table rows past damper-held motions and roots without a mode", () => {
    const analysis = analyse(
      instance({
        masses: { held: 1, sprung: 1 },
        joints: [
          { a: "held", damping: 3 },
          { a: "sprung", stiffness: 9 },
        ],
      }),
    );
    const rows = unwrap(analysis.modes()).modes;
    expect(rows.map(({ number }) => number)).toEqual([1, null, null]);
    expect(rows.map((_, i) => analysis.excites(coordinateForm(1), i))).toEqual([1, 0, 0]);
  });

  it("answers steady responses and histories of the same model alike, and keeps both", () => {
    // One mass on a spring under a sine: after the start has died out both give k x = F / (1 - r^2 + 2 i z r).
    const system: SystemSketch = { masses: { m: 2 }, joints: [{ a: "m", stiffness: 800, damping: 40 }] };
    const drive: DriveInfo = {
      name: "push",
      keyword: "force",
      on: { kind: "form", form: coordinateForm(0) },
      derivative: 0,
      shape: { kind: "sine", amplitude: 10, frequencyHz: 2, phase: 0, order: 1 },
      unit: "N",
    };
    const made = instance(system);
    const analysis = analyse({ ...made, assembly: { ...made.assembly, drives: [drive] } });
    const place: QuantityRef = {
      text: "m.displacement",
      terms: [{ of: "coordinate", coordinate: 0, derivative: 0, factor: 1 }],
      unit: "m",
    };
    const base = { name: "a", of: [place], by: [0] };
    const sweep = {
      ...base,
      kind: "sweep",
      fromHz: 1,
      toHz: 9,
      points: 20,
      spacing: "log",
    } as unknown as SweepAsk;
    const history = {
      ...base,
      kind: "history",
      lasting: 20,
      accuracy: 1e-6,
      start: "as_written",
    } as unknown as HistoryAsk;
    expect(analysis.sweep(sweep)).toBe(analysis.sweep(sweep));
    expect(analysis.history(history)).toBe(analysis.history(history));
    expect(analysis.frequencyResponse([0])).toBe(analysis.frequencyResponse([0]));
    const r = (2 * 2 * Math.PI) / 20;
    const size = 10 / 800 / Math.hypot(1 - r * r, r);
    const [re, im] = unwrap(unwrap(analysis.frequencyResponse([0])).at(place, 2));
    expect(Math.hypot(re, im)).toBeCloseTo(size, 14);
    const end = unwrap(unwrap(analysis.timeResponse(history)).at(place, 20));
    expect(end).toBeCloseTo(re, 12);
    expect(unwrap(analysis.history(history)).timeS.at(-1)).toBeCloseTo(20, 12);
    expect(unwrap(analysis.sweep(sweep)).series.has("m.displacement")).toBe(true);
  });

  it("hands a reason through", () => {
    const analysis = analyse(instance({ junctions: ["j"], joints: [] }));
    for (const outcome of [analysis.modes(), analysis.sensitivity()]) {
      expect(outcome.ok ? "" : outcome.reason).toBe("nothing holds j");
    }
    expect(analysis.excites(coordinateForm(0), 0)).toBe(0);
  });
});
