import type { Host } from "./host.ts";

/** A command as it was called: operands in order, options by name. */
export interface Call {
  readonly host: Host;
  readonly operands: readonly string[];
  has(name: string): boolean;
  /** The last value given; undefined when the option is not there. */
  value(name: string): string | undefined;
}

/** Thrown by a command that cannot run as it was called; ends with exit status 2. */
export class UsageError extends Error {}

/** A word that is none of those known; what is told names the nearest of them, or `otherwise`. */
export class UnknownWord extends UsageError {
  constructor(
    message: string,
    readonly word: string,
    readonly known: readonly string[],
    readonly otherwise: string,
  ) {
    super(message);
  }
}

/** Exit statuses of every command. */
export const EXIT = { holds: 0, fails: 1, cannotRun: 2, interrupted: 130 } as const;
