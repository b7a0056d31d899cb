import { PARSING } from "../model/parsing.ts";
import { format as formatTree } from "../syntax/formatter.ts";
import { parse } from "../syntax/parser.ts";

/** A text in the canonical layout of the language; lines that cannot be read stay as they are. */
export const format = (text: string): string => formatTree(parse(text, PARSING).tree);
