import { span } from "../text/span.ts";
import type { NoteNode, Token } from "./tree.ts";

const TAG = /^([\p{L}_][\p{L}\p{M}\d_]*)[ \t]*:(?:[ \t]+|$)/u;
const ACCEPT = /^accept[ \t]+([a-z][a-z-]*)[ \t]*(?::[ \t]*|$)/;

/** `> text`, `> key: text` or `> accept code: reason`. */
export function noteOf(text: string, token: Token): NoteNode {
  const end = token.offset + token.length;
  let start = token.offset + 1;
  while (start < end && (text[start] === " " || text[start] === "\t")) start++;
  const written = text.slice(start, end);
  const base = { kind: "note" as const, span: span(token.offset, end), text: written };

  const accepted = ACCEPT.exec(written);
  if (accepted) {
    const codeStart = start + written.indexOf(accepted[1], "accept".length);
    const codeSpan = span(codeStart, codeStart + accepted[1].length);
    return { ...base, accept: { code: accepted[1], codeSpan, reason: written.slice(accepted[0].length) } };
  }
  const tagged = TAG.exec(written);
  if (tagged) {
    const keySpan = span(start, start + tagged[1].length);
    return { ...base, tag: { key: tagged[1], keySpan, text: written.slice(tagged[0].length) } };
  }
  return base;
}
