import { span } from "../../text/span.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { list, quoted } from "../wording.ts";
import { lonelyCoordinates } from "./unreached.ts";

/** Part of the largest entry of a shape that still counts as moving. */
const MOVES = 1e-6;
/** More names make the sentence unreadable. */
const NAMED = 4;

/** A system that nothing holds: rigid-body modes. */
export const freeMotion: Rule = {
  code: "free-motion",
  cost: "modes",
  check({ model, assembly, modes }) {
    if (!modes.ok) return [];
    const free = modes.value.modes.filter((mode) => mode.number === 0);
    const lonely = new Set(lonelyCoordinates(assembly));
    const moving = assembly.coordinates.filter(
      (coordinate, index) =>
        coordinate.motion !== "charge" &&
        !lonely.has(coordinate.name) &&
        free.some((mode) => Math.hypot(mode.shape.re[index], mode.shape.im[index]) > MOVES),
    );
    if (moving.length === 0) return [];
    const names = moving.map((coordinate) => coordinate.name);
    const shown =
      names.length > NAMED
        ? `${names.slice(0, NAMED).join(", ")} and ${names.length - NAMED} more`
        : list(names.map(quoted));
    const statement = statementOf(model, moving[0].owner);
    const count = free.length === 1 ? "one rigid-body mode" : `${free.length} rigid-body modes`;
    return [
      {
        span: statement === undefined ? span(0, 0) : nameSpan(statement),
        message: `nothing holds ${shown}: ${count}, numbered 0`,
        hint: "join it to ground or to a support if it does not really float",
        key: "free",
      },
    ];
  },
};
