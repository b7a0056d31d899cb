import type { FileReader } from "../shared-core/index.ts";
import type { Engine } from "./engine.ts";

/** Files as the program that runs the server can reach them by itself. Without one, the client is asked. */
export interface Disk {
  /** Whether it reads files of a folder; all else goes through the client. */
  reads(folder: string): boolean;
  /** What one model may read. Paths are relative to `folder`, a URI; `file` is the model's own. */
  reader(folder: string, file: string): FileReader;
  /** Another text for another state of a file; empty when it is not there. Far cheaper than reading. */
  stamp(folder: string, path: string): string;
  /** Every file below a folder that ends so, as URIs. */
  find(folder: string, endings: readonly string[]): Promise<readonly string[]>;
}

/** What the server runs in. */
export interface Host {
  readonly disk?: Disk;
  /** Starts what computes numbers. Called when the first model is there. */
  startEngine(): Engine;
  readonly version: string;
  /** Where the pages of docs/ lie, ending in `/`, when the client does not say. */
  readonly docs?: string;
}
