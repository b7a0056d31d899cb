import type { SheetTable } from "../../shared-core/index.ts";
import { html } from "./dom.ts";

/** The numbers behind a picture, folded away; its rows are made when it is first opened. */
export class TableBehind {
  readonly element: HTMLDetailsElement;
  readonly #room = html("div", { class: "wide", tabindex: 0, role: "region" });
  #table: SheetTable | undefined;
  #filled: SheetTable | undefined;

  constructor() {
    this.element = html("details", { class: "behind" }, html("summary", {}, "table"), this.#room);
    this.element.addEventListener("toggle", () => this.#fill());
  }

  update(table: SheetTable, title: string): void {
    this.#table = table;
    this.#room.setAttribute("aria-label", `Table of ${title}`);
    this.#fill();
  }

  #fill(): void {
    const table = this.#table;
    if (!this.element.open || table === undefined || table === this.#filled) return;
    this.#filled = table;
    const head = html("tr", {}, ...table.head.map((text) => html("th", { scope: "col" }, text)));
    const rows = table.rows.map((row) =>
      html(
        "tr",
        {},
        ...row.map((text, i) => (i === 0 ? html("th", { scope: "row" }, text) : html("td", {}, text))),
      ),
    );
    const left = table.left === undefined ? [] : [html("p", { class: "quiet" }, table.left)];
    this.#room.replaceChildren(
      html("table", { class: "numbers" }, html("thead", {}, head), html("tbody", {}, ...rows)),
      ...left,
    );
  }
}
