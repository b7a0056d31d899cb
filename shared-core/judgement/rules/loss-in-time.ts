import { nameSpan, relatedTo } from "../places.ts";
import type { Rule } from "../rule.ts";
import { list, percent, quoted } from "../wording.ts";

/** Structural damping has no exact form in time: it stands as the modal damping of the mode table. */
export const lossInTime: Rule = {
  code: "loss-in-time",
  cost: "text",
  check({ model, assembly, instance }) {
    const lossy = assembly.elements.filter((element) => element.lossFactor !== 0);
    if (lossy.length === 0) return [];
    const first = lossy[0];
    const names = lossy.map((element) => element.name);
    const half = percent(first.lossFactor / 2);
    return instance.asks
      .filter((ask) => ask.kind === "history")
      .map((ask) => ({
        span: nameSpan(ask.node),
        message: `the structural damping of ${list(names.map(quoted))} stands in \`${ask.name}\` as modal damping: a loss factor of ${percent(first.lossFactor)} as at most ${half} in a mode`,
        hint: "give a damper or damping_ratio where the damping between resonances matters",
        related: relatedTo(model, first.name, `loss factor ${percent(first.lossFactor)}`),
        key: ask.name,
      }));
  },
};
