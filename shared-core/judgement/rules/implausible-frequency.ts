import { span } from "../../text/span.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { elasticModes, stiffestShare } from "../shapes.ts";
import { rate } from "../wording.ts";

/**
 * Bounds in Hz outside which a mode of masses and springs is more often a slip of units: slower than anything
 * moored, faster than what is heard. Common practice, no source.
 */
const SLOWEST = 1e-3;
const FASTEST = 20e3;

/** A natural frequency that no machine or structure of lumped masses has. */
export const implausibleFrequency: Rule = {
  code: "implausible-frequency",
  cost: "modes",
  check({ model, assembly, modes }) {
    if (!modes.ok) return [];
    return elasticModes(modes.value).flatMap((mode) => {
      const { frequencyHz } = mode;
      // 0 Hz is a mode that buckles; static-instability speaks of it.
      if (frequencyHz === 0 || (SLOWEST <= frequencyHz && frequencyHz <= FASTEST)) return [];
      let mover = 0;
      mode.shape.re.forEach((value, i) => {
        if (Math.abs(value) > Math.abs(mode.shape.re[mover])) mover = i;
      });
      const coordinate = assembly.coordinates[mover];
      if (coordinate === undefined || coordinate.motion === "charge") return [];
      const statement = statementOf(model, coordinate.owner);
      const holder = stiffestShare(mode);
      const held = holder === undefined ? undefined : statementOf(model, holder);
      const bound = frequencyHz < SLOWEST ? `slower than ${rate(SLOWEST)}` : `faster than ${rate(FASTEST)}`;
      return [
        {
          span: statement === undefined ? span(0, 0) : nameSpan(statement),
          message: `mode ${mode.number}, mostly \`${coordinate.name}\`${holder === undefined ? "" : ` on \`${holder}\``}, lies at ${rate(frequencyHz)}, ${bound}`,
          hint: "look at the units of that mass and that stiffness (g or kg, N/m or N/mm)",
          related:
            held === undefined
              ? undefined
              : [{ span: nameSpan(held), message: `\`${holder}\` holds most of its strain energy` }],
        },
      ];
    });
  },
};
