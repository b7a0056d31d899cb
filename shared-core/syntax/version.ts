import { span } from "../text/span.ts";
import type { Cursor } from "./cursor.ts";
import { ROLE, type Tree } from "./tree.ts";

/** The language versions this build reads. */
export const VERSIONS: readonly number[] = [1];

/** "thrum" NUMBER; the cursor stands at `thrum`. */
export function versionLine(c: Cursor): Tree["version"] {
  c.take(ROLE.keyword);
  const place = c.span;
  if (c.kind !== "number") {
    const edits = [{ span: span(c.taken, c.taken), text: ` ${VERSIONS.at(-1)}` }];
    const fixes = [{ title: "Add the version", edits, safe: true }];
    c.expected("the version of the language, as in `thrum 1`", { fixes });
    return undefined;
  }
  const written = c.word;
  const number = Number(written);
  c.take();
  c.expectEnd();
  if (!VERSIONS.includes(number)) {
    c.state.say({
      code: "version-unknown",
      severity: "error",
      message: `this build reads version ${VERSIONS.join(", ")} of the language, the file says ${written}`,
      span: place,
    });
  }
  return { number, span: place };
}
