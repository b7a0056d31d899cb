import { html } from "./dom.ts";
import { type EditorApi, Page } from "./page.ts";
import { Sheet } from "./sheet.ts";

declare function acquireVsCodeApi(): EditorApi;

const live = html("div", { class: "unseen", role: "status", "aria-live": "polite" });
const page = new Page(acquireVsCodeApi(), live);
const sheet = new Sheet(page);
document.body.append(sheet.element, live);
addEventListener("message", ({ data }) => sheet.hear(data));
page.say({ type: "ready" });

// After a reload the same case, units and moved numbers are asked for again.
const { case: of, units, knobs = {}, earlier = null, motion = null } = page.kept;
if (of !== undefined && units !== undefined)
  page.say({ type: "show", case: of, units, knobs, earlier, motion });
