/** Clients that ask for diagnostics instead of waiting for them. */
import { mkdtempSync, realpathSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, it } from "vitest";
import type {
  FullDocumentDiagnosticReport,
  RelatedFullDocumentDiagnosticReport,
  WorkspaceDiagnosticReport,
} from "vscode-languageserver-protocol";
import { PULLING, TestClient } from "./client.ts";

const MOUNTS = "thrum 1\nlet stiff = 5.4 N/mm\n";
const DRUM = `thrum 1
use "mounts.thrum"
mass drum = 8 kg
spring feet between drum and ground = stiff
expect soft = natural_frequency(1) <= 4 Hz
`;

let folder = "";
let client: TestClient;
beforeAll(async () => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), "thrum-pull-")));
  writeFileSync(join(folder, "mounts.thrum"), MOUNTS);
  writeFileSync(join(folder, "closed.thrum"), "thrum 1\nmass m = 4 lbf\n");
  client = await TestClient.start({
    folder,
    capabilities: PULLING,
    settings: { diagnostics: { closedModels: true } },
  });
});
afterAll(async () => {
  expect(client.logged).toEqual([]);
  expect(client.published).toEqual([]);
  expect(await client.close()).toBe(0);
  rmSync(folder, { recursive: true, force: true });
});

const full = (report: unknown) => report as RelatedFullDocumentDiagnosticReport & { resultId: string };
const codes = ({ items }: FullDocumentDiagnosticReport) => items.map(({ code }) => code);

it("gets the text tier at once, is told to ask again when numbers come, and then gets all", async () => {
  const drum = client.open("drum.thrum", DRUM);
  const first = full(await drum.pulled());
  expect([first.kind, codes(first).filter((code) => code !== "expectation-fails")]).toEqual(["full", []]);
  await drum.settled();
  await client.until("a word that there is more", () =>
    client.refreshed.includes("workspace/diagnostic/refresh"),
  );
  const second = full(await drum.pulled());
  expect(codes(second)).toEqual(["expectation-fails"]);
  const again = await drum.ask<{ kind: string; resultId: string }>("textDocument/diagnostic", undefined, {
    identifier: "thrum",
    previousResultId: second.resultId,
  });
  expect(again).toMatchObject({ kind: "unchanged", resultId: second.resultId });
  drum.edit("<= 4 Hz", "<= 5 Hz");
  await drum.settled();
  expect(codes(full(await drum.pulled()))).toEqual([]);
});

it("gets what an edit means for other open models along with the edited one", async () => {
  const drum = client.open("drum.thrum", DRUM.replace("<= 4 Hz", "<= 5 Hz"));
  await drum.settled();
  const mounts = client.open("mounts.thrum", MOUNTS);
  mounts.edit("5.4 N/mm", "5.4 kg");
  await mounts.settled();
  const { relatedDocuments } = full(await mounts.pulled());
  const related = relatedDocuments?.[drum.uri] as FullDocumentDiagnosticReport;
  expect(codes(related)).toContain("unit-mismatch");
  mounts.close();
  drum.close();
});

it("gets closed models with the workspace, once for each state of them", async () => {
  const pull = (previousResultIds: unknown[]) =>
    client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      identifier: "thrum",
      previousResultIds,
    });
  const { items } = await pull([]);
  const closed = items.find(({ uri }) => uri === client.uri("closed.thrum"));
  expect(codes(closed as FullDocumentDiagnosticReport)).toContain("weight-as-mass");
  const previous = items.map(({ uri, resultId }) => ({ uri, value: resultId }));
  expect((await pull(previous)).items).toEqual([]);
  writeFileSync(join(folder, "closed.thrum"), "thrum 1\nmass m = 4 oz\nlet spare = 1\n");
  client.notify("workspace/didChangeWatchedFiles", {
    changes: [{ uri: client.uri("closed.thrum"), type: 2 }],
  });
  const [anew] = (await pull(previous)).items;
  expect(anew.uri).toBe(client.uri("closed.thrum"));
  expect(codes(anew as FullDocumentDiagnosticReport)).toContain("unused-number");
});
