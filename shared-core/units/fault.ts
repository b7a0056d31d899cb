/**
 * Why an expression or a unit has no value. The caller knows the place; `hint` says what to do, `replace` holds
 * texts that would cure it (a unit name, or ` as rad/s` behind the expression).
 */
export interface Fault {
  readonly code: "unit-mismatch" | "unknown-unit" | "ambiguous-rate";
  readonly message: string;
  readonly hint?: string;
  readonly replace?: readonly string[];
}

export function isFault(result: object): result is Fault {
  return "code" in result;
}
