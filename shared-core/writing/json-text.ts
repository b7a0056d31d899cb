/** A value that JSON can hold. Keys keep the order in which they were put in. */
export type Json =
  | null
  | boolean
  | number
  | string
  | readonly Json[]
  | { readonly [key: string]: Json | undefined };

/** Longest list of plain values on one line, in characters; longer lists still stand on one line when numeric. */
const SHORT = 100;

/**
 * JSON text with two blanks of indentation, in which a list of numbers stands on one line. Keys whose value is
 * undefined are left out. A number that is not finite becomes null: JSON has no other word for it.
 */
export function jsonText(value: Json): string {
  return `${written(value, "")}\n`;
}

function written(value: Json, indent: string): string {
  if (value === null || typeof value !== "object") return plain(value);
  if (isList(value)) return listText(value, indent);
  const entries = Object.entries(value).filter((entry): entry is [string, Json] => entry[1] !== undefined);
  const lines = entries.map(
    ([key, item]) => `${indent}  ${JSON.stringify(key)}: ${written(item, `${indent}  `)}`,
  );
  return lines.length === 0 ? "{}" : `{\n${lines.join(",\n")}\n${indent}}`;
}

function listText(list: readonly Json[], indent: string): string {
  if (list.every((item) => typeof item === "number" || item === null))
    return `[${list.map(plain).join(", ")}]`;
  if (list.every((item) => typeof item === "string")) {
    const line = `[${list.map(plain).join(", ")}]`;
    if (line.length <= SHORT) return line;
  }
  return `[\n${list.map((item) => `${indent}  ${written(item, `${indent}  `)}`).join(",\n")}\n${indent}]`;
}

const isList = (value: object): value is readonly Json[] => Array.isArray(value);

function plain(value: Json): string {
  return typeof value === "number" && !Number.isFinite(value) ? "null" : JSON.stringify(value);
}
