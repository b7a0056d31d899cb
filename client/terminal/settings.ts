import type { UnitSystem } from "../../shared-core/index.ts";
import { type Call, UsageError } from "./call.ts";

/** What `--unit` says; the words are checked while the arguments are read. */
export function unitSystem(call: Call): UnitSystem {
  return (call.value("unit") ?? "as-written") as UnitSystem;
}

/** The value of an option that a command cannot do without. */
export function needed(call: Call, option: string, example: string): string {
  const value = call.value(option);
  if (value === undefined) throw new UsageError(`--${option} is needed: --${option} ${example}`);
  return value;
}
