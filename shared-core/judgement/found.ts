/** A value or the reason why there is none. Any `Outcome` fits, whatever it reached before it failed. */
export type Found<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly reason: string };
