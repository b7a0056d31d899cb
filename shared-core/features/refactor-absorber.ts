import type { Mode } from "../answers/answer.ts";
import type { Motion } from "../mechanics/builder.ts";
import type { Span } from "../text/span.ts";
import { NUMBER } from "../units/quantity.ts";
import { formatQuantity } from "../units/show.ts";
import type { Measure } from "../vocabulary/description.ts";
import { dimensionOf } from "../vocabulary/measures.ts";
import { type CodeAction, freeName, linesBehind, nameOf, refused, statementAt } from "./refactor-edits.ts";
import type { View } from "./view.ts";

/** Mass of an absorber as a share of the modal mass at its place; common practice, no source. */
const MASS_RATIO = 0.05;
/** Modes in which something hardly moves are none that an absorber on it could calm; chosen by trial. */
const LEAST_SHARE = 0.1;
const MOST_OFFERS = 3;

/**
 * A tuned mass on a damped spring for each of the first modes in which the mass or inertia under the cursor takes
 * part. Frequency ratio 1/(1+mu) and damping ratio sqrt(3 mu / (8 (1+mu)^3)) for a force on one undamped mass:
 * Den Hartog, Mechanical Vibrations, on the damped vibration absorber; from memory, to be verified.
 */
export function absorberActions(view: View, range: Span): readonly CodeAction[] {
  const { model, report, stale } = view;
  const thing = statementAt(model.tree, range);
  if (!thing || !["mass", "inertia"].includes(thing.keyword.text)) return [];
  const name = nameOf(thing);
  const modes = report?.cases[0]?.modes;
  if (!modes?.ok || stale) {
    return [
      refused(
        `Add an absorber on \`${name}\``,
        "refactor.rewrite",
        "the modes of this text are not computed yet",
      ),
    ];
  }
  const coordinate =
    report?.cases[0].instance.assembly.coordinates.findIndex((each) => each.name === name) ?? -1;
  const takesPart = modes.table.modes.filter(
    (mode) => mode.number && Math.abs(mode.shape.re[coordinate] ?? 0) >= LEAST_SHARE,
  );
  return takesPart.slice(0, MOST_OFFERS).flatMap((mode) => absorberFor(view, range, mode, coordinate) ?? []);
}

function absorberFor(
  { model, units }: View,
  range: Span,
  mode: Mode,
  coordinate: number,
): CodeAction | undefined {
  const thing = statementAt(model.tree, range);
  const { frequencyHz, modalMass, shape } = mode;
  if (!thing || !frequencyHz || !modalMass) return undefined;
  const motion: Motion = thing.keyword.text === "inertia" ? "turning" : "sliding";
  const atPlace = modalMass / shape.re[coordinate] ** 2;
  const mass = MASS_RATIO * atPlace;
  const omega = (2 * Math.PI * frequencyHz) / (1 + MASS_RATIO);
  const stiffness = mass * omega ** 2;
  const ratio = Math.sqrt((3 * MASS_RATIO) / (8 * (1 + MASS_RATIO) ** 3));
  const damping = 2 * ratio * mass * omega;
  const shown = (value: number, measure: Measure) =>
    formatQuantity({ ...(dimensionOf(measure, motion) ?? NUMBER), value }, { system: units });
  const name = nameOf(thing);
  const [own, spring, damper] = ["absorber", "absorber_spring", "absorber_damper"].map((each) =>
    freeName(model, `${name}_${each}`),
  );
  const frequency = formatQuantity({ dimension: [0, 0, -1, 0, 0, 0, 0], rate: true, value: frequencyHz });
  const [keyword, measure] =
    motion === "turning" ? (["inertia", "inertia"] as const) : (["mass", "mass"] as const);
  const lines = [
    "",
    `> Absorber for mode ${mode.number} at ${frequency}: ${100 * MASS_RATIO} % of the modal mass at ${name}, tuned for a force on one mass.`,
    `${keyword} ${own} = ${shown(mass, measure)}`,
    `spring ${spring} between ${own} and ${name} = ${shown(stiffness, "stiffness")}`,
    `damper ${damper} between ${own} and ${name} = ${shown(damping, "damping")}`,
  ];
  return {
    title: `Add an absorber on \`${name}\` for mode ${mode.number} at ${frequency}`,
    kind: "refactor.rewrite",
    edits: [linesBehind(model.tree, thing, lines)],
    safe: false,
  };
}
