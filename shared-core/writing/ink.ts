/** How the parts of a text are set apart on a terminal; elsewhere they are left as they are. */
export interface Ink {
  strong(text: string): string;
  quiet(text: string): string;
  good(text: string): string;
  bad(text: string): string;
  warn(text: string): string;
  hint(text: string): string;
}

const same = (text: string): string => text;

/** No escape bytes. */
export const PLAIN: Ink = { strong: same, quiet: same, good: same, bad: same, warn: same, hint: same };
