/**
 * Every feature of the language on small models, against numbers of NumPy, SciPy and closed forms made by
 * tools/reference/make_features.py. The models stand in features/, each with its source in the note on its title.
 */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { checkJson, type FileReader, holds, judge, understand } from "../../shared-core/index.ts";

interface WantedNumber {
  /** Name of an expectation of the model, or a path in the JSON of its first case (with `/`, of all cases). */
  readonly of?: string;
  readonly says?: string;
  readonly path?: string;
  readonly value: number | string | boolean | null | readonly number[];
  readonly rel: number;
  readonly abs: number;
}

interface FeatureModel {
  readonly name: string;
  readonly how: string;
  readonly numbers: readonly WantedNumber[];
  /** Errors that belong to the model. */
  readonly codes: readonly string[];
  readonly holds: boolean;
}

const at = (path: string): URL => new URL(path, import.meta.url);
const models: readonly FeatureModel[] = JSON.parse(readFileSync(at("data/features.json"), "utf8"));

const folder: FileReader = {
  read(path) {
    try {
      return { ok: true, text: readFileSync(at(`features/${path}`), "utf8") };
    } catch {
      return { ok: false, why: "missing", detail: "" };
    }
  },
};

type Json = ReturnType<typeof checkJson>;
const inside = (json: Json | undefined, key: string): Json | undefined =>
  (json as Readonly<Record<string, Json>> | undefined)?.[key];

/** `answers.s.peaks.[a.displacement].value`: a key that holds points stands in brackets. */
function along(json: Json | undefined, path: string): Json | undefined {
  const keys = path.match(/\[[^\]]*\]|[^.[\]]+/g) ?? [];
  return keys.map((key) => key.replace(/^\[|\]$/g, "")).reduce(inside, json);
}

function found(cases: Json | undefined, { of, path }: WantedNumber): Json | undefined {
  if (path?.startsWith("/")) return along(cases, path.slice(1));
  const first = inside(cases, "0");
  if (of === undefined) return along(first, path ?? "");
  const verdicts = inside(first, "expectations") as readonly Json[];
  return inside(
    verdicts.find((verdict) => inside(verdict, "name") === of),
    "value",
  );
}

function compare(wanted: WantedNumber, got: Json | undefined, where: string): void {
  const { value, rel, abs } = wanted;
  if (typeof value === "number") {
    expect(typeof got, `${where}: ${got}`).toBe("number");
    const allowed = Math.max(rel * Math.abs(value), abs);
    expect(Math.abs((got as number) - value), `${where} = ${value}, found ${got}`).toBeLessThanOrEqual(
      allowed,
    );
  } else if (Array.isArray(value)) {
    // Points that must be among those of an answer, each to the last digits.
    for (const point of value) {
      const nearest = Math.min(...(got as unknown as number[]).map((other) => Math.abs(other - point)));
      expect(nearest, `${where} holds ${point}`).toBeLessThanOrEqual(rel * point);
    }
  } else if (value === "absent") {
    expect(got, where).toBeUndefined();
  } else {
    expect(got, where).toBe(value);
  }
}

describe("features of the language against SciPy and closed forms", () => {
  test.each(models.map((model) => [model.name, model] as const))("%s", (name, model) => {
    const path = `${name}.thrum`;
    const text = readFileSync(at(`features/${path}`), "utf8");
    expect(text).toContain(`> reference: ${model.how}`);
    const report = judge(understand(path, text, folder));
    const errors = new Set(report.diagnostics.filter((d) => d.severity === "error").map((d) => d.code));
    expect([...errors].sort()).toEqual([...model.codes].sort());
    const outcome = { readable: true, path, report } as const;
    expect(holds(outcome)).toBe(model.holds);
    const cases = along(checkJson([outcome]), "files.0.cases");
    for (const wanted of model.numbers) {
      compare(wanted, found(cases, wanted), `${path}: ${wanted.says ?? wanted.path}`);
      if (wanted.of === undefined || wanted.value !== null) continue;
      const verdict = report.cases[0].verdicts.find((v) => v.name === wanted.of);
      expect(verdict?.holds, wanted.says).toBeNull();
      expect(verdict?.reason, `${wanted.says} says why`).toBeTruthy();
    }
  });

  test("the set is whole", () => {
    expect(models.length).toBeGreaterThanOrEqual(60);
    expect(models.reduce((sum, model) => sum + model.numbers.length, 0)).toBeGreaterThan(550);
  });
});
