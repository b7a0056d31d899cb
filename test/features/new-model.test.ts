import { describe, expect, it } from "vitest";
import { formatDocument } from "../../shared-core/features/format.ts";
import { NEW_MODELS, newModel } from "../../shared-core/features/new-model.ts";
import { viewOf } from "./views.ts";

describe.each(NEW_MODELS)("the start model $kind", ({ kind }) => {
  const view = viewOf(newModel(kind), { judged: true });

  it("has nothing to be said against it, and its expectations hold", () => {
    const said = view.report?.diagnostics.filter(({ severity }) => severity !== "hint") ?? [];
    expect(said.map(({ code, message }) => `${code}: ${message}`)).toEqual([]);
    const verdicts = view.report?.cases[0].verdicts ?? [];
    expect(verdicts.length).toBeGreaterThan(1);
    expect(verdicts.filter(({ holds }) => holds !== true)).toEqual([]);
  });

  it("is laid out canonically", () => {
    expect(formatDocument(view)).toEqual([]);
  });
});
