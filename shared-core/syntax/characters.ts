/** What single characters are to the lexer. Codes are UTF-16 units. */

/** Byte order mark: allowed once, at the very start, and kept. */
export const BYTE_ORDER_MARK = 0xfeff;

export const isNewline = (code: number): boolean => code === 10 || code === 13;

/**
 * Blanks: space and tab, and the blanks that come along when text is copied from a document (no-break, figure,
 * thin and narrow no-break space, form feed). The formatter turns them into plain ones.
 */
export function isBlank(code: number): boolean {
  return code === 32 || code === 9 || (code > 126 ? COPIED_BLANKS.has(code) : code === 11 || code === 12);
}

export const isDigit = (code: number): boolean => 48 <= code && code <= 57;

/** Length in UTF-16 units of the letter (any script, or `_`) at a place; 0 when none is there. */
export function letterLength(text: string, offset: number): number {
  const code = text.charCodeAt(offset);
  if (code < 128) return isAsciiLetter(code) ? 1 : 0;
  return wideLength(text, offset, LETTER);
}

/** As `letterLength`, also for digits and the marks that combine with a letter. */
export function nameLength(text: string, offset: number): number {
  const code = text.charCodeAt(offset);
  if (code < 128) return isAsciiLetter(code) || isDigit(code) ? 1 : 0;
  return wideLength(text, offset, LETTER_OR_MARK);
}

/** Characters that look like one the language knows, with what is meant. */
export const LOOKALIKES: ReadonlyMap<string, string> = new Map([
  ["−", "-"],
  ["–", "-"],
  ["—", "-"],
  ["×", "*"],
  ["⋅", "·"],
  ["÷", "/"],
  ["∕", "/"],
  ["≤", "<="],
  ["≥", ">="],
  ["≠", "!="],
  ["°", " deg"],
  ["²", "^2"],
  ["³", "^3"],
  ["⁴", "^4"],
  ["“", '"'],
  ["”", '"'],
  ["„", '"'],
  ["'", '"'],
  ["’", '"'],
  ["[", "("],
  ["]", ")"],
  ["{", "("],
  ["}", ")"],
]);

const COPIED_BLANKS: ReadonlySet<number> = new Set([0xa0, 0x2007, 0x2009, 0x202f]);
const LETTER = /^\p{L}/u;
const LETTER_OR_MARK = /^[\p{L}\p{M}]/u;

function isAsciiLetter(code: number): boolean {
  return (97 <= code && code <= 122) || (65 <= code && code <= 90) || code === 95;
}

function wideLength(text: string, offset: number, pattern: RegExp): number {
  const point = text.codePointAt(offset);
  if (point === undefined) return 0;
  const character = String.fromCodePoint(point);
  return pattern.test(character) ? character.length : 0;
}
