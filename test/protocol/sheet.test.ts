import { describe, expect, it } from "vitest";
import type { SheetContent } from "../../shared-core/features/sheet.ts";
import { fromBase64, toBase64 } from "../../shared-core/protocol/packed-rows.ts";
import {
  packContent,
  readFromSheet,
  readToSheet,
  SHEET_VERSION,
  unpackContent,
} from "../../shared-core/protocol/sheet.ts";

const row = Float64Array.of(0, -0, 1.5, -1e300, 5e-324, Number.POSITIVE_INFINITY, Number.NaN, Math.PI);

describe("rows as text", () => {
  it("agrees with the base64 of the host at every length", () => {
    for (let length = 0; length <= row.length; length++) {
      const part = row.slice(0, length);
      const bytes = Buffer.from(part.buffer);
      expect(toBase64(part)).toBe(bytes.toString("base64"));
      expect(fromBase64(toBase64(part))).toEqual(part);
    }
  });

  it("reads damaged text without failing", () => {
    for (const text of ["", "=", "A", "@@@@@@@@@@@@@@", "é".repeat(30)]) {
      expect(fromBase64(text)).toBeInstanceOf(Float64Array);
    }
  });
});

describe("content", () => {
  it("comes back as it went", () => {
    const content = {
      title: "float64",
      motions: [{ kind: "mode", id: "mode:1", label: "mode 1", re: row, im: new Float64Array(3) }],
    } as unknown as SheetContent;
    expect(unpackContent(packContent(content))).toEqual(content);
  });
});

describe("messages", () => {
  const protocol = SHEET_VERSION;
  it("lets known ones through", () => {
    const from = [
      { type: "ready", protocol },
      { type: "reveal", protocol, name: "unit" },
      { type: "point", protocol, name: null },
      {
        type: "show",
        protocol,
        case: "as written",
        units: "si",
        knobs: { mount: 26500 },
        earlier: null,
        motion: null,
      },
      {
        type: "show",
        protocol,
        case: "as written",
        units: "si",
        knobs: {},
        earlier: "4f0c",
        motion: "mode:1",
      },
      { type: "write", protocol, name: "mount", value: 1 },
      { type: "csv", protocol, ask: "run_up", case: "as written" },
      { type: "picture", protocol, name: "run_up", format: "svg", data: "<svg/>" },
    ];
    for (const message of from) expect(readFromSheet(message)).toBe(message);
    const to = [
      { type: "content", protocol, uri: "file:///a", version: 3, content: "{}" },
      { type: "state", protocol, state: "busy", text: "" },
      { type: "highlight", protocol, names: ["a"] },
      { type: "reveal", protocol, name: "run_up" },
      { type: "revisions", protocol, list: [{ id: "4f0c", label: "softer mounts" }] },
      { type: "revisions", protocol, list: [] },
    ];
    for (const message of to) expect(readToSheet(message)).toBe(message);
  });

  it("drops what it does not know", () => {
    const wrong = [
      null,
      7,
      "ready",
      {},
      { type: "ready" },
      { type: "ready", protocol: protocol + 1 },
      { type: "erase", protocol },
      { type: "write", protocol, name: "mount", value: Number.NaN },
      { type: "write", protocol, name: "mount", value: "1" },
      {
        type: "show",
        protocol,
        case: "as written",
        units: "si",
        knobs: { mount: "1" },
        earlier: null,
        motion: null,
      },
      { type: "show", protocol, case: "as written", units: "miles", knobs: {}, earlier: null, motion: null },
      { type: "show", protocol, case: "as written", units: "si", knobs: {}, earlier: 3, motion: null },
      { type: "show", protocol, case: "as written", units: "si", knobs: {}, earlier: null },
      { type: "picture", protocol, name: "run_up", format: "exe", data: "" },
    ];
    for (const message of wrong) expect(readFromSheet(message)).toBeUndefined();
    expect(readToSheet({ type: "state", protocol, state: "odd", text: "" })).toBeUndefined();
    expect(readToSheet({ type: "highlight", protocol, names: [1] })).toBeUndefined();
    expect(readToSheet({ type: "revisions", protocol, list: [{ id: 1, label: "" }] })).toBeUndefined();
  });
});
