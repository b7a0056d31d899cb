import { type Figure, figureSvg, type PlotCard } from "../../shared-core/index.ts";
import { html, wordButton } from "./dom.ts";
import type { Page, PlotView } from "./page.ts";
import { Plot } from "./plot.ts";
import { TableBehind } from "./table.ts";
import { TakeAway } from "./take-away.ts";

/** A sweep or a history. */
export class PlotCardView {
  readonly element: HTMLElement;
  readonly #page: Page;
  readonly #plot: Plot;
  readonly #table = new TableBehind();
  readonly #peaks = html("ul", { class: "peaks" });
  readonly #scales = html("span", { class: "acts" });
  #card: PlotCard | undefined;
  #case = "";

  constructor(page: Page, name: string) {
    this.#page = page;
    this.#plot = new Plot(page, name);
    const take = new TakeAway(page, {
      name,
      svg: () => this.#card && figureSvg(figureOf(this.#card), { width: 900, height: heightOf(this.#card) }),
      csv: () => page.say({ type: "csv", ask: name, case: this.#case }),
    });
    const acts = html("div", { class: "under" }, this.#scales, this.#table.element, take.element);
    this.element = html("div", { class: "card" }, this.#peaks, this.#plot.element, acts);
  }

  update(card: PlotCard, of: string): void {
    this.#card = card;
    this.#case = of;
    this.#peaks.replaceChildren(...card.peaks.map((peak) => html("li", {}, peak)));
    this.#table.update(card.table, card.title);
    this.#draw();
  }

  recolour(): void {
    this.#plot.recolour();
  }

  get #view(): PlotView {
    return (this.#card && this.#page.kept.views?.[this.#card.name]) ?? {};
  }

  #draw(): void {
    const card = this.#card;
    if (card === undefined) return;
    const { linearX = false, linearY = false, continued = false } = this.#view;
    const phase = card.phase && (continued ? card.phase.unwrapped : card.phase.wrapped);
    this.#plot.update({
      panels: phase ? [...card.panels, phase] : card.panels,
      description: card.description,
      linearX,
      linearY,
    });
    this.#fillScales(card);
  }

  #fillScales(card: PlotCard): void {
    const { linearX = false, linearY = false, continued = false } = this.#view;
    const logX = card.panels.some(({ x }) => x.scale === "log");
    const logY = card.panels.some(({ y }) => y.scale === "log");
    const held = document.activeElement?.getAttribute("data-act");
    const act = (name: string, pressed: boolean, text: string, change: PlotView) =>
      wordButton(text, () => this.#look(change), {
        "aria-pressed": String(pressed),
        "data-act": `${card.name} ${name}`,
      });
    this.#scales.replaceChildren(
      ...(logX ? [act("x", linearX, "linear frequency", { linearX: !linearX })] : []),
      ...(logY ? [act("y", linearY, "linear amplitude", { linearY: !linearY })] : []),
      ...(card.phase ? [act("phase", continued, "continued phase", { continued: !continued })] : []),
    );
    if (held?.startsWith(`${card.name} `)) {
      const again = [...this.#scales.children].find((button) => button.getAttribute("data-act") === held);
      if (again instanceof HTMLElement) again.focus();
    }
  }

  #look(change: PlotView): void {
    const name = this.#card?.name;
    if (name === undefined) return;
    this.#page.keep({ views: { ...this.#page.kept.views, [name]: { ...this.#view, ...change } } });
    this.#draw();
  }
}

const panelsOf = ({ panels, phase }: PlotCard): Figure["panels"] =>
  phase === undefined ? panels : [...panels, phase.wrapped];

const figureOf = (card: PlotCard): Figure => ({
  title: card.title,
  description: card.description,
  panels: panelsOf(card),
});

/** A copy is about as tall as the picture on the page. */
const heightOf = (card: PlotCard): number =>
  90 + 100 * panelsOf(card).reduce((sum, { share }) => sum + share, 0);
