import { describe, expect, it } from "vitest";
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import { combineForms, coordinateForm } from "../../shared-core/mechanics/forms.ts";
import type { Instance } from "../../shared-core/model/model.ts";
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

  it("hands a reason through", () => {
    const analysis = analyse(instance({ junctions: ["j"], joints: [] }));
    for (const outcome of [analysis.modes(), analysis.sensitivity()]) {
      expect(outcome.ok ? "" : outcome.reason).toBe("nothing holds j");
    }
    expect(analysis.excites(coordinateForm(0), 0)).toBe(0);
  });
});
