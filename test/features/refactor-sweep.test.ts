import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { codeActions } from "../../shared-core/features/fixes.ts";
import { judge } from "../../shared-core/judgement/judge.ts";
import type { Model } from "../../shared-core/model/model.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { edited, viewOf } from "./views.ts";

const examples: readonly (readonly [string, string])[] = [
  ...readdirSync("examples")
    .filter((file) => file.endsWith(".thrum"))
    .map((file) => [file, readFileSync(`examples/${file}`, "utf8")] as const),
  ...[...STATEMENTS, ...ASKS]
    .filter(({ exampleFiles }) => !exampleFiles)
    .map(({ variant, keyword, example }) => [variant ?? keyword, example] as const),
];

/** Every so many of the names and numbers of a text; primes, so that all kinds of lines are met. */
const every = (text: string): number => (text.length > 1500 ? 11 : 3);

const frequencies = (model: Model): readonly number[] => {
  const modes = judge(model, { upTo: "modes" }).cases[0]?.modes;
  return modes?.ok ? modes.table.modes.flatMap(({ frequencyHz }) => frequencyHz ?? []) : [];
};

const errors = (model: Model): readonly string[] =>
  model.diagnostics
    .filter(({ severity }) => severity === "error")
    .map(({ code, message }) => `${code}: ${message}`);

describe.each(examples)("every refactor over %s", (_, text) => {
  const view = viewOf(text);
  const before = frequencies(view.model);
  const places = [...text.matchAll(/(?<![\w.])(?:\d[\d.e]*|[a-z_]\w*)/g)].filter(
    (_, i) => i % every(text) === 0,
  );

  it("leaves no new error, and the modes where it says that it is safe", () => {
    let tried = 0;
    for (const { index } of places) {
      const at = { start: index, end: index };
      for (const action of codeActions(view, at, [], {
        only: tried === 0 ? ["refactor", "source"] : ["refactor"],
      })) {
        const { title, edits, safe, disabled } = action;
        expect(disabled === undefined ? edits.length > 0 : edits.length === 0 && disabled !== "").toBe(true);
        if (disabled !== undefined || (!safe && tried % 5 > 0)) {
          tried++;
          continue;
        }
        tried++;
        const { model } = viewOf(edited(text, edits));
        expect({ title, index, errors: errors(model) }).toEqual({ title, index, errors: errors(view.model) });
        if (!safe) continue;
        const after = frequencies(model);
        const worst = Math.max(
          ...after.map((frequency, i) => Math.abs(frequency - before[i]) / (before[i] || 1)),
        );
        expect({ title, index, same: after.length === before.length && worst < 1e-9 }).toEqual({
          title,
          index,
          same: true,
        });
      }
    }
    expect(tried).toBeGreaterThan(0);
  });
});
