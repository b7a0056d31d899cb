import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { Locator } from "playwright-core";

const axeSource = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");

interface Axe {
  run(of: Element): Promise<{
    violations: { id: string; nodes: { html: string; failureSummary?: string }[] }[];
  }>;
}

/** What axe-core finds wrong with a page, from inside its own frame, past the page's policy. */
export async function violations(body: Locator): Promise<string[]> {
  const frame = await (await body.elementHandle())?.ownerFrame();
  if (!frame) throw new Error("there is no page to look at");
  await frame.evaluate(axeSource);
  return frame.evaluate(async () => {
    const { axe } = globalThis as unknown as { axe: Axe };
    const found = (await axe.run(document.body)).violations;
    return found.flatMap(({ id, nodes }) =>
      nodes.map(({ html, failureSummary }) => `${id}: ${html.slice(0, 200)} ${failureSummary ?? ""}`),
    );
  });
}
