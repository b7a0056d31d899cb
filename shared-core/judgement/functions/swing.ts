import type { TimeResponse } from "../../answers/analysis.ts";
import type { Assembly, QuantityRef, QuantityTerm } from "../../mechanics/assembly.ts";
import type { Motion } from "../../mechanics/builder.ts";
import { fail, type Outcome, succeed } from "../../numerics/outcome.ts";
import type { Found } from "../found.ts";

/**
 * What is left of a difference of equal motions is rounding: shares of 1e-16 a term, some hundred terms a value, and
 * four digits to spare; chosen by trial on symmetric chains.
 */
const ROUNDING = 1e-12;
/** Instants of a history that are looked at for how much anything moves. */
const INSTANTS = 16;
/** Spreads the instants without a rhythm: the golden section. */
const SPREAD = (Math.sqrt(5) - 1) / 2;

/**
 * Fails where a quantity of a history moves by no more than the rounding of what it is made of: relative to how much
 * the coordinates and supports of the same kind move. Powers and energies are no such sum, and are not looked at.
 */
export function swings(
  response: TimeResponse,
  assembly: Assembly,
  quantity: QuantityRef,
  lasting: number,
): Found<void> {
  const [high, low] = [response.highest(quantity), response.lowest(quantity)];
  if (!high.ok) return high;
  if (!low.ok) return low;
  let scale = 0;
  for (const term of quantity.terms) {
    const size = termSize(response, assembly, term, lasting);
    if (!size.ok) return size;
    scale += Math.abs(term.factor) * size.value;
  }
  const swing = high.value.value - low.value.value;
  return swing > ROUNDING * scale ? succeed(undefined) : fail(`\`${quantity.text}\` stays where it is`);
}

function termSize(
  response: TimeResponse,
  assembly: Assembly,
  term: QuantityTerm,
  lasting: number,
): Outcome<number> {
  const moved = (motion: Motion, derivative: 0 | 1 | 2) =>
    largestMotion(response, assembly, motion, derivative, lasting);
  if (term.of === "coordinate") return moved(assembly.coordinates[term.coordinate].motion, term.derivative);
  if (term.of === "support") return moved(assembly.supports[term.support].motion, term.derivative);
  const { motion, stiffness, damping, inertance } = assembly.elements[term.element];
  if (term.measure === "travel") return moved(motion, 0);
  if (term.measure === "rate") return moved(motion, 1);
  if (term.measure !== "force") return succeed(0);
  let sum = 0;
  for (const [value, derivative] of [
    [stiffness, 0] as const,
    [damping, 1] as const,
    [inertance, 2] as const,
  ]) {
    const size = value === 0 ? succeed(0) : moved(motion, derivative);
    if (!size.ok) return size;
    sum += Math.abs(value) * size.value;
  }
  return succeed(sum);
}

/** The largest motion of that kind among all coordinates and supports at the instants that are looked at. */
function largestMotion(
  response: TimeResponse,
  { coordinates, supports }: Assembly,
  motion: Motion,
  derivative: 0 | 1 | 2,
  lasting: number,
): Outcome<number> {
  const terms: QuantityTerm[] = [];
  coordinates.forEach((each, coordinate) => {
    if (each.motion === motion) terms.push({ of: "coordinate", coordinate, derivative, factor: 1 });
  });
  supports.forEach((each, support) => {
    if (each.motion === motion) terms.push({ of: "support", support, derivative, factor: 1 });
  });
  let largest = 0;
  for (const term of terms) {
    for (let k = 0; k < INSTANTS; k++) {
      const at = response.at({ text: "", terms: [term], unit: "" }, lasting * ((k * SPREAD) % 1));
      if (!at.ok) return at;
      largest = Math.max(largest, Math.abs(at.value));
    }
  }
  return succeed(largest);
}
