/** The facade: what other packages may use of the core, read as a list of what it can do. */
export type { FileContent, FileReader } from "./model/model.ts";
export { nearest } from "./text/nearest.ts";
export { type Ink, PLAIN } from "./writing/ink.ts";
