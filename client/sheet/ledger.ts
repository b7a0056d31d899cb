import type { LedgerRow, LedgerVerdict } from "../../shared-core/index.ts";
import { html, svg, wordButton } from "./dom.ts";
import type { Page } from "./page.ts";

/** Each expectation with its value, its limit and what is left, case by case. */
export class Ledger {
  readonly element = html("div", {
    class: "wide",
    tabindex: 0,
    role: "region",
    "aria-label": "Table of what must hold",
  });
  readonly #page: Page;
  #rows = new Map<string, HTMLElement>();

  constructor(page: Page) {
    this.#page = page;
  }

  update(ledger: readonly LedgerRow[], shown: string): void {
    const held = document.activeElement?.getAttribute("data-expect");
    this.#rows = new Map();
    const head = ["", "case", "found", "limit", "left"].map((text, i) =>
      i === 0 ? html("td", {}) : html("th", { scope: "col" }, text),
    );
    const bodies = ledger.map((row) => this.#body(row, shown));
    this.element.replaceChildren(
      html("table", { class: "ledger" }, html("thead", {}, html("tr", {}, ...head)), ...bodies),
    );
    if (held) this.#rows.get(held)?.querySelector<HTMLElement>("button")?.focus();
  }

  highlight(names: ReadonlySet<string>): void {
    for (const [name, row] of this.#rows) row.classList.toggle("lit", names.has(name));
  }

  #body(row: LedgerRow, shown: string): HTMLTableSectionElement {
    const { name, condition, verdicts } = row;
    const reveal = wordButton(name, () => this.#page.say({ type: "reveal", name }), { "data-expect": name });
    const head = html(
      "th",
      { scope: "rowgroup", rowspan: Math.max(1, verdicts.length) },
      reveal,
      html("span", { class: "condition" }, condition),
    );
    const rows = verdicts.map((verdict, i) =>
      html(
        "tr",
        { class: verdict.case === shown ? "shown" : undefined },
        ...(i === 0 ? [head] : []),
        ...cells(verdict),
      ),
    );
    const body = html("tbody", {}, ...(rows.length > 0 ? rows : [html("tr", {}, head)]));
    this.#rows.set(name, body);
    return body;
  }
}

function cells(verdict: LedgerVerdict): HTMLTableCellElement[] {
  const { case: of, holds, thin, value, limit, marginText, message, earlier } = verdict;
  const state = holds === null ? "unknown" : !holds ? "fails" : thin ? "thin" : "holds";
  const words = { unknown: "not computed", fails: "fails", thin: "thin", holds: "holds" }[state];
  const left = html(
    "td",
    { class: `left ${state}`, title: message },
    marginBar(verdict),
    html("span", { class: "state" }, words),
  );
  if (marginText !== "") left.append(html("span", { class: "margin" }, marginText));
  if (holds === null && message !== "") left.append(html("span", { class: "quiet" }, message));
  return [
    html("td", { class: "case" }, of),
    html(
      "td",
      { class: "number" },
      value ?? "–",
      ...(earlier === undefined ? [] : [html("span", { class: "earlier" }, `earlier ${earlier}`)]),
    ),
    html("td", { class: "number" }, limit ?? "–"),
    left,
  ];
}

const BAR = { width: 90, height: 12, zero: 30 };

/** From the limit at the zero line: to the right what is left, to the left what is over, cut at all of it. */
function marginBar({ margin, holds }: LedgerVerdict): SVGSVGElement {
  const share = margin === null || !Number.isFinite(margin) ? 0 : Math.max(-1, Math.min(1, margin));
  const size = share < 0 ? -share * BAR.zero : share * (BAR.width - BAR.zero);
  const x = share < 0 ? BAR.zero - size : BAR.zero;
  const { width, height, zero } = BAR;
  return svg(
    "svg",
    { class: "margin-bar", viewBox: `0 0 ${width} ${height}`, width, height, "aria-hidden": "true" },
    svg("path", { class: "ground", d: `M0,${height / 2}H${width}` }),
    ...(holds === null ? [] : [svg("rect", { x, y: 3, width: Math.max(1.5, size), height: 6 })]),
    svg("path", { class: "zero", d: `M${zero},0V${height}` }),
  );
}
