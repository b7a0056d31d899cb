import { Readable } from "node:stream";
import type { Host, Screen } from "../../client/terminal/host.ts";

export interface TestHost extends Host {
  readonly out: () => string;
  readonly err: () => string;
}

export interface HostOptions {
  readonly cwd?: string;
  readonly env?: Readonly<Record<string, string>>;
  readonly stdin?: string;
  readonly isTerminal?: boolean;
}

/** A host whose streams are kept for looking at. */
export function testHost(options: HostOptions = {}): TestHost {
  const written = { out: "", err: "" };
  const screen = (to: "out" | "err"): Screen => ({
    write: (text) => {
      written[to] += text;
    },
    isTerminal: options.isTerminal ?? false,
    width: 80,
  });
  return {
    cwd: options.cwd ?? process.cwd(),
    env: options.env ?? {},
    stdin: Readable.from([Buffer.from(options.stdin ?? "")]),
    stdout: screen("out"),
    stderr: screen("err"),
    out: () => written.out,
    err: () => written.err,
  };
}
