const DIGITS = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
const CODES = Uint8Array.from(DIGITS, (digit) => digit.charCodeAt(0));
const VALUES = new Uint8Array(128);
CODES.forEach((code, value) => {
  VALUES[code] = value;
});

/** Rows of numbers as base64 (RFC 4648, section 4) of their bytes, least significant first. */
export function toBase64(row: Float64Array): string {
  const bytes = bytesOf(row);
  const { length } = bytes;
  const whole = length - (length % 3);
  const out = new Uint8Array(4 * Math.ceil(length / 3)).fill(PAD);
  let at = 0;
  // The shapes of a history are megabytes: each step is written out.
  for (let i = 0; i < whole; i += 3) {
    const three = (bytes[i] << 16) | (bytes[i + 1] << 8) | bytes[i + 2];
    out[at++] = CODES[three >> 18];
    out[at++] = CODES[(three >> 12) & 63];
    out[at++] = CODES[(three >> 6) & 63];
    out[at++] = CODES[three & 63];
  }
  if (whole < length) {
    const rest = (bytes[whole] << 8) | (whole + 1 < length ? bytes[whole + 1] : 0);
    out[at++] = CODES[rest >> 10];
    out[at++] = CODES[(rest >> 4) & 63];
    if (whole + 1 < length) out[at++] = CODES[(rest << 2) & 63];
  }
  let text = "";
  for (let i = 0; i < out.length; i += CHUNK) {
    text += String.fromCharCode.apply(undefined, out.subarray(i, i + CHUNK) as unknown as number[]);
  }
  return text;
}

/** The row of `toBase64`; bytes that make no whole number are left out. */
export function fromBase64(text: string): Float64Array {
  const end = text.indexOf("=");
  const digits = end < 0 ? text.length : end;
  const bytes = new Uint8Array(8 * Math.floor((digits * 3) / 32));
  const { length } = bytes;
  for (let i = 0, at = 0; i < length; i += 3, at += 4) {
    const four =
      (valueAt(text, at) << 18) |
      (valueAt(text, at + 1) << 12) |
      (valueAt(text, at + 2) << 6) |
      valueAt(text, at + 3);
    // What lies behind the end is not kept.
    bytes[i] = four >> 16;
    bytes[i + 1] = four >> 8;
    bytes[i + 2] = four;
  }
  if (LEAST_FIRST) return new Float64Array(bytes.buffer);
  const view = new DataView(bytes.buffer);
  return Float64Array.from({ length: length / 8 }, (_, i) => view.getFloat64(8 * i, true));
}

const PAD = "=".charCodeAt(0);
/** Arguments that a call takes in every host. */
const CHUNK = 8192;
/** How this machine keeps its numbers. */
const LEAST_FIRST = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;

/** 0 for what is no digit, and behind the end of the text, where there is no code. */
const valueAt = (text: string, at: number): number => VALUES[text.charCodeAt(at) & 127];

function bytesOf(row: Float64Array): Uint8Array {
  if (LEAST_FIRST) return new Uint8Array(row.buffer, row.byteOffset, row.byteLength);
  const bytes = new Uint8Array(8 * row.length);
  const view = new DataView(bytes.buffer);
  row.forEach((value, i) => {
    view.setFloat64(8 * i, value, true);
  });
  return bytes;
}
