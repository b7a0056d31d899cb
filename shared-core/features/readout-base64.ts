const DIGITS = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";

/** Base64 (RFC 4648, section 4) of the UTF-8 bytes of a text. The core sees no host that would do it. */
export function base64(text: string): string {
  const bytes = utf8(text);
  let out = "";
  for (let i = 0; i < bytes.length; i += 3) {
    const three = (bytes[i] << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    const left = Math.min(3, bytes.length - i);
    for (let digit = 0; digit < 4; digit++) {
      out += digit <= left ? DIGITS[(three >> (18 - 6 * digit)) & 63] : "=";
    }
  }
  return out;
}

/** Length of `base64(text)`. */
export const base64Length = (text: string): number => 4 * Math.ceil(utf8(text).length / 3);

/** UTF-8 (RFC 3629); half of a surrogate pair that stands alone becomes U+FFFD. */
function utf8(text: string): number[] {
  const bytes: number[] = [];
  for (const character of text) {
    const point = character.codePointAt(0) ?? 0;
    const code = 0xd800 <= point && point <= 0xdfff ? 0xfffd : point;
    if (code < 0x80) bytes.push(code);
    else if (code < 0x800) bytes.push(0xc0 | (code >> 6), tail(code, 0));
    else if (code < 0x10000) bytes.push(0xe0 | (code >> 12), tail(code, 6), tail(code, 0));
    else bytes.push(0xf0 | (code >> 18), tail(code, 12), tail(code, 6), tail(code, 0));
  }
  return bytes;
}

const tail = (code: number, shift: number): number => 0x80 | ((code >> shift) & 0x3f);
