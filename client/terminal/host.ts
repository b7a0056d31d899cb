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
export interface ProcessHost extends Host {
  /** Resolves when all that was written has left the process, or never will. */
  flush(): Promise<void>;
}

export function processHost(): ProcessHost {
  const [stdout, stderr] = [lazy(() => process.stdout), lazy(() => process.stderr)];
  return {
    cwd: process.cwd(),
    env: process.env,
    get stdin() {
      return process.stdin;
    },
    stdout: screen(stdout),
    stderr: screen(stderr),
    async flush() {
      for (const { opened } of [stdout, stderr]) {
        if (opened) await new Promise((done) => opened.write("", done));
      }
    },
  };
}

type Stream = Writable & { isTTY?: boolean; columns?: number };

interface LazyStream {
  opened: Stream | undefined;
  open(): Stream;
}

/** A stream that was closed at the other end (`| head`) ends the work quietly. */
function lazy(open: () => Stream): LazyStream {
  const stream: LazyStream = {
    opened: undefined,
    open() {
      if (stream.opened) return stream.opened;
      stream.opened = open();
      stream.opened.on("error", (error: NodeJS.ErrnoException) => {
        if (error.code === "EPIPE") process.exit(0);
        throw error;
      });
      return stream.opened;
    },
  };
  return stream;
}

function screen(stream: LazyStream): Screen {
  return {
    write: (text) => void stream.open().write(text),
    get isTerminal() {
      return stream.open().isTTY === true;
    },
    get width() {
      return stream.open().columns ?? PLAIN_WIDTH;
    },
  };
}
