/** Texts through the TextMate grammar, as an editor without a server colours them. */

import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import oniguruma from "vscode-oniguruma";
import textmate from "vscode-textmate";
import { read } from "../house/files.ts";

export interface Scoped {
  readonly line: number;
  readonly start: number;
  readonly end: number;
  readonly text: string;
  /** Without `source.thrum`. */
  readonly scopes: readonly string[];
}

const wasm = createRequire(import.meta.url).resolve("vscode-oniguruma/release/onig.wasm");

export async function grammarOf(): Promise<(text: string) => readonly Scoped[]> {
  await oniguruma.loadWASM(readFileSync(wasm));
  const registry = new textmate.Registry({
    onigLib: Promise.resolve({
      createOnigScanner: (patterns) => new oniguruma.OnigScanner(patterns),
      createOnigString: (text) => new oniguruma.OnigString(text),
    }),
    loadGrammar: async () =>
      textmate.parseRawGrammar(read("syntaxes/thrum.tmLanguage.json"), "thrum.tmLanguage.json"),
  });
  const grammar = await registry.loadGrammar("source.thrum");
  if (!grammar) throw new Error("The grammar did not load");
  return (text) => {
    let state = textmate.INITIAL;
    return text.split("\n").flatMap((source, line) => {
      const { tokens, ruleStack } = grammar.tokenizeLine(source, state);
      state = ruleStack;
      return tokens.map(({ startIndex: start, endIndex: end, scopes }) => ({
        line,
        start,
        end,
        text: source.slice(start, end),
        scopes: scopes.slice(1),
      }));
    });
  };
}
