const DIGITS = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
const CODES = Uint8Array.from(DIGITS, (digit) => digit.charCodeAt(0));
const VALUES = new Uint8Array(128);
CODES.forEach((code, value) => {
  VALUES[code] = value;
});

/** Rows of numbers as base64 (RFC 4648, section 4) of their bytes, least significant first. */
export function toBase64(row: Float64Array): string {
  const bytes = bytesOf(row);
  const out = new Uint8Array(4 * Math.ceil(bytes.length / 3)).fill(PAD);
  for (let i = 0, at = 0; i < bytes.length; i += 3, at += 4) {
    const three = (bytes[i] << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    const digits = Math.min(3, bytes.length - i) + 1;
    for (let digit = 0; digit < digits; digit++) out[at + digit] = CODES[(three >> (18 - 6 * digit)) & 63];
  }
  let text = "";
  for (let i = 0; i < out.length; i += CHUNK) {
    text += String.fromCharCode(...out.subarray(i, i + CHUNK));
  }
  return text;
}

/** The row of `toBase64`; bytes that make no whole number are left out. */
export function fromBase64(text: string): Float64Array {
  const end = text.indexOf("=");
  const digits = end < 0 ? text.length : end;
  const bytes = new Uint8Array(8 * Math.floor((digits * 3) / 32));
  for (let i = 0; i < bytes.length; i++) {
    const at = Math.floor((i * 8) / 6);
    const pair = (valueAt(text, at) << 6) | valueAt(text, at + 1);
    bytes[i] = (pair >> (4 - ((i * 8) % 6))) & 255;
  }
  const view = new DataView(bytes.buffer);
  return Float64Array.from({ length: bytes.length / 8 }, (_, i) => view.getFloat64(8 * i, true));
}

const PAD = "=".charCodeAt(0);
/** Arguments that a call takes in every host. */
const CHUNK = 8192;

const valueAt = (text: string, at: number): number => VALUES[text.charCodeAt(at) & 127] ?? 0;

function bytesOf(row: Float64Array): Uint8Array {
  const bytes = new Uint8Array(8 * row.length);
  const view = new DataView(bytes.buffer);
  row.forEach((value, i) => {
    view.setFloat64(8 * i, value, true);
  });
  return bytes;
}
