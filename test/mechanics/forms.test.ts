import { describe, expect, it } from "vitest";
import type { LinearForm } from "../../shared-core/mechanics/assembly.ts";
import { combineForms, groundForm, subtractForms, supportForm } from "../../shared-core/mechanics/forms.ts";

const form = (entries: Readonly<Record<number, number>>): LinearForm => ({
  coordinates: Object.keys(entries).map(Number),
  factors: Object.values(entries),
  supports: [],
  supportFactors: [],
});

describe("the travel between two ends", () => {
  const ends: readonly LinearForm[] = [
    groundForm,
    form({ 0: 1 }),
    form({ 2: 1 }),
    form({ 2: -0.5 }),
    form({ 1: 0 }),
    form({ 0: 2, 3: -1 }),
    supportForm(1),
  ];
  const pairs = ends.flatMap((a, i) => ends.map((b, j) => [`${i} - ${j}`, a, b] as const));

  it.each(pairs)("%s is the sum of both, taken 1 and -1 times", (_, a, b) => {
    expect(subtractForms(a, b)).toEqual(combineForms([a, b], [1, -1]));
  });
});
