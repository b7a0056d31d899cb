/** What a numerical routine hands back: a value, or a reason with whatever was reached until then. */
export type Outcome<T> = { ok: true; value: T } | { ok: false; reason: string; upTo?: T };

/** Wraps a finished value. */
export function succeed<T>(value: T): { ok: true; value: T } {
  return { ok: true, value };
}

/** Wraps a failure: the reason in plain words and, where useful, what was computed so far. */
export function fail<T = never>(reason: string, upTo?: T): { ok: false; reason: string; upTo?: T } {
  return upTo === undefined ? { ok: false, reason } : { ok: false, reason, upTo };
}
