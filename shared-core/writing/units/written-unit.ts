import type { WrittenUnit } from "../../units/unit-of.ts";

/** Reads a unit text without parentheses, as our own tables hold them: `N*s/m`, `kg*m^2`, `1/s`. */
export function writtenUnit(text: string): WrittenUnit {
  const factors = text.split(/(?=[*/])/).map((part) => {
    const sign = part.startsWith("/") ? -1 : 1;
    const [name, power = "1"] = part.replace(/^[*/]/, "").split("^");
    return { name, power: sign * Number(power) };
  });
  return { text, factors };
}
