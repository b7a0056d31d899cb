import type { Readable, Writable } from "node:stream";

/** What a command sees of the world around it; tests put their own in its place. */
export interface Host {
  readonly cwd: string;
  readonly env: Readonly<Record<string, string | undefined>>;
  readonly stdin: Readable;
  readonly stdout: Screen;
  readonly stderr: Screen;
  /** Starts the language server, which takes standard input and output for itself. */
  readonly serve?: () => Promise<unknown>;
}

/** A stream for text, with what is known of the terminal behind it. */
export interface Screen {
  write(text: string): void;
  readonly isTerminal: boolean;
  /** Columns of the terminal; a plain 100 where there is none. */
  readonly width: number;
}

const PLAIN_WIDTH = 100;

/** The world of this process. A stream is opened when it is first used: each costs a start of a few milliseconds. */
export function processHost(): Host {
  return {
    cwd: process.cwd(),
    env: process.env,
    get stdin() {
      return process.stdin;
    },
    stdout: screen(() => process.stdout),
    stderr: screen(() => process.stderr),
  };
}

type Stream = Writable & { isTTY?: boolean; columns?: number };

/** A stream that was closed at the other end (`| head`) ends the work quietly. */
function screen(open: () => Stream): Screen {
  let opened: Stream | undefined;
  const stream = (): Stream => {
    if (opened !== undefined) return opened;
    opened = open();
    opened.on("error", (error: NodeJS.ErrnoException) => {
      if (error.code === "EPIPE") process.exit(0);
      throw error;
    });
    return opened;
  };
  return {
    write: (text) => void stream().write(text),
    get isTerminal() {
      return stream().isTTY === true;
    },
    get width() {
      return stream().columns ?? PLAIN_WIDTH;
    },
  };
}
