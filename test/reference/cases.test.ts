import { describe, expect, test } from "vitest";
import { type FileReport, judge, understand } from "../../shared-core/index.ts";
import {
  type ExpectedNumber,
  FROM_MODES,
  modelsOf,
  NOT_EXPRESSIBLE,
  type ReferenceCase,
  referenceCases,
  unitFactor,
  WAITING,
} from "./cases.ts";

const nothing = { read: () => ({ ok: false, why: "missing", detail: "" }) as const };

interface Found {
  readonly value: number;
  readonly where: string;
}

/** Values of the expectations tagged with `> reference: QUANTITY`, and of what is read from the mode table. */
function answersOf(reference: ReferenceCase): Map<string, Found> {
  const found = new Map<string, Found>();
  for (const { part, path, text } of modelsOf(reference.id)) {
    const report = judge(understand(path, text, nothing));
    expect(
      report.diagnostics.filter((d) => d.severity === "error" && !EXPECTED_ERRORS.has(d.code)),
      path,
    ).toEqual([]);
    readTags(report, path, found);
    for (const [key, read] of Object.entries(FROM_MODES[reference.id] ?? {})) {
      const [of, quantity] = [key.slice(0, key.indexOf(":")), key.slice(key.indexOf(":") + 2)];
      if (of === part) found.set(quantity, { value: read(report.cases[0]), where: `${path}, mode table` });
    }
  }
  return found;
}

/** Errors that belong to the physics of a case: a growing mode is one. */
const EXPECTED_ERRORS = new Set(["unstable-mode"]);

function readTags(report: FileReport, path: string, found: Map<string, Found>): void {
  for (const verdict of report.cases[0].verdicts) {
    for (const { tag } of verdict.expectation.node.notes) {
      const value = tag?.key === "reference_worst" ? verdict.tolerance?.worst : verdict.value;
      if (tag?.key.startsWith("reference")) {
        found.set(tag.text, {
          value: value ?? Number.NaN,
          where: `${path}, ${verdict.name} ${verdict.reason ?? ""}`,
        });
      }
    }
  }
}

function errorOf(
  wanted: ExpectedNumber,
  factor: number,
  found: Found,
): { readonly error: number; readonly allowed: number } {
  const si = wanted.value * factor;
  const relative = wanted.value === 0 ? 0 : wanted.rel_tol * Math.abs(si);
  return {
    error: Math.abs(found.value - si),
    allowed: Math.max(relative, (wanted.abs_tol ?? 0) * factor),
  };
}

const whole = (table: Readonly<Record<string, Readonly<Record<string, string>>>>, id: string) =>
  table[id]?.["*"];

describe("check cases with sources", () => {
  const covered = referenceCases.filter((c) => !whole(WAITING, c.id) && !whole(NOT_EXPRESSIBLE, c.id));

  test.each(covered.map((c) => [c.id, c] as const))("%s", (id, reference) => {
    const answers = answersOf(reference);
    for (const wanted of reference.expected) {
      const found = answers.get(wanted.quantity);
      const excused = WAITING[id]?.[wanted.quantity] ?? NOT_EXPRESSIBLE[id]?.[wanted.quantity];
      expect(found === undefined, `${wanted.quantity}: covered, or excused, and not both`).toBe(
        excused !== undefined,
      );
      if (!found) continue;
      const { error, allowed } = errorOf(wanted, unitFactor(id, wanted.unit), found);
      const said = `${wanted.quantity} = ${wanted.value} ${wanted.unit} (${reference.source.citation}); ${found.where}: ${found.value}`;
      expect(error, said).toBeLessThanOrEqual(allowed);
    }
  });

  test("every id is covered, waits for a named statement, or is not expressible with a reason", () => {
    const count = { covered: 0, waiting: 0, inexpressible: 0 };
    for (const { id, expected } of referenceCases) {
      for (const { quantity } of expected) {
        if (WAITING[id]?.["*"] ?? WAITING[id]?.[quantity]) count.waiting += 1;
        else if (NOT_EXPRESSIBLE[id]?.["*"] ?? NOT_EXPRESSIBLE[id]?.[quantity]) count.inexpressible += 1;
        else count.covered += 1;
      }
      const whole_ = whole(WAITING, id) ?? whole(NOT_EXPRESSIBLE, id);
      expect(modelsOf(id).length > 0 || whole_ !== undefined, id).toBe(true);
    }
    const ids = new Set(referenceCases.map((c) => c.id));
    for (const id of [...Object.keys(WAITING), ...Object.keys(NOT_EXPRESSIBLE)])
      expect(ids.has(id), id).toBe(true);
    process.stdout.write(
      `check cases: ${count.covered} numbers covered, ${count.waiting} waiting, ${count.inexpressible} not expressible\n`,
    );
  });

  test("what waits says so: a model of it would give not-yet-computed", () => {
    const said = (text: string) =>
      judge(understand("waiting.thrum", `thrum 1\n${text}`, nothing)).diagnostics;
    for (const text of ["body block = 3 kg\n", "pendulum bob = 1 kg\n    length = 1 m\n", "loop coil\n"]) {
      expect(said(text).map((d) => d.code)).toContain("not-yet-computed");
    }
  });
});
