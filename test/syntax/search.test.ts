import { describe, expect, test } from "vitest";
import { lineAt, lineIndexAt, placeAt, tokenAt, tokenIndexAt } from "../../shared-core/syntax/search.ts";
import { read, SAMPLE } from "./helpers.ts";

const { tree } = read(SAMPLE);
const at = (text: string): number => SAMPLE.indexOf(text);

describe("what stands at a place", () => {
  test("every offset lies in the token that holds it", () => {
    for (let offset = 0; offset < SAMPLE.length; offset++) {
      const token = tokenAt(tree, offset);
      expect(token && token.offset <= offset && offset < token.offset + token.length).toBe(true);
    }
    expect(tokenIndexAt(tree, SAMPLE.length)).toBe(tree.tokens.length - 1);
    expect(tokenIndexAt(read("").tree, 0)).toBe(-1);
  });

  test("lines", () => {
    expect(lineIndexAt(tree, 0)).toBe(0);
    expect(lineIndexAt(tree, at("title") - 1)).toBe(0);
    expect(lineIndexAt(tree, at("title"))).toBe(1);
    expect(lineAt(tree, at("count = 4")).role).toBe("detail");
    expect(lineIndexAt(tree, 1e9)).toBe(tree.lines.length - 1);
  });

  test("statement, kit and detail", () => {
    const inKit = placeAt(tree, at("loss_factor = 2 %"));
    expect(inKit?.statement.keyword.text).toBe("kit");
    expect(inKit?.innermost.keyword.text).toBe("spring");
    expect(inKit?.detail?.key.text).toBe("loss_factor");
    expect(placeAt(tree, at("source: weighbridge"))?.statement.keyword.text).toBe("let");
    expect(placeAt(tree, at("mass unit") - 1)).toBeUndefined();
    const head = placeAt(tree, at("mass unit"));
    expect(head?.innermost).toBe(head?.statement);
    expect(head?.detail).toBeUndefined();
  });
});
