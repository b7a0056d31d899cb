import type { SheetCard, SheetContent } from "../../shared-core/index.ts";
import { html } from "./dom.ts";
import { ModesCardView } from "./modes-card.ts";
import type { Page } from "./page.ts";
import { PlotCardView } from "./plot-card.ts";
import { section } from "./section.ts";

export interface CardsHost {
  chooseMotion(id: string): void;
}

interface Shown {
  readonly kind: string;
  readonly element: HTMLElement;
  update(card: SheetCard, content: SheetContent): void;
  recolour(): void;
}

/** One section an ask, in file order; a section stays where its ask stays, with its zoom and its focus. */
export class Cards {
  readonly element = html("div", { class: "cards" });
  readonly #page: Page;
  readonly #host: CardsHost;
  readonly #shown = new Map<string, Shown>();

  constructor(page: Page, host: CardsHost) {
    this.#page = page;
    this.#host = host;
  }

  /** @param waits  answers are still being computed: a plot stays, marked, where there is only a reason yet */
  update(content: SheetContent, waits: boolean): void {
    const wanted = new Map(content.cards.map((card) => [card.name, card]));
    const stays = (name: string, kind: string) =>
      waits && kind === "plot" && wanted.get(name)?.kind === "reason";
    for (const [name, shown] of this.#shown) {
      const old = stays(name, shown.kind);
      shown.element.classList.toggle("old", old);
      if (old || familyOf(wanted.get(name)) === shown.kind) continue;
      shown.element.remove();
      this.#shown.delete(name);
    }
    content.cards.forEach((card, i) => {
      const shown = this.#shown.get(card.name) ?? this.#make(card);
      this.#shown.set(card.name, shown);
      if (this.element.children[i] !== shown.element)
        this.element.insertBefore(shown.element, this.element.children[i] ?? null);
      shown.update(card, content);
    });
  }

  recolour(): void {
    for (const shown of this.#shown.values()) shown.recolour();
  }

  highlight(names: ReadonlySet<string>): void {
    for (const [name, { element }] of this.#shown) element.classList.toggle("lit", names.has(name));
  }

  /** Brings the section of an ask into sight. */
  show(name: string): void {
    this.#shown.get(name)?.element.scrollIntoView({ block: "start" });
  }

  #make(card: SheetCard): Shown {
    const { body, update } = this.#body(card);
    const { element, title } = section(card.title, body.element);
    if (card.range)
      title.addEventListener("click", () => this.#page.say({ type: "reveal", name: card.name }));
    return {
      kind: familyOf(card) as string,
      element,
      update: (next, content) => {
        title.replaceChildren(...titleParts(next));
        update(next, content);
      },
      recolour: () => body.recolour(),
    };
  }

  #body(card: SheetCard): {
    body: { readonly element: HTMLElement; recolour(): void };
    update: (card: SheetCard, content: SheetContent) => void;
  } {
    if (card.kind === "modes") {
      const body = new ModesCardView({
        choose: (id) => this.#host.chooseMotion(id),
        saveCsv: () => this.#page.say({ type: "csv", ask: card.name, case: this.#page.kept.case ?? "" }),
      });
      return { body, update: (next, { scene }) => next.kind === "modes" && body.update(next, scene) };
    }
    if (card.kind === "reason") {
      const element = html("p", { class: "reason" });
      const update = (next: SheetCard) => {
        if (next.kind === "reason") element.textContent = next.reason;
      };
      return { body: { element, recolour: () => undefined }, update };
    }
    const body = new PlotCardView(this.#page, card.name);
    return {
      body,
      update: (next, content) =>
        (next.kind === "sweep" || next.kind === "history") && body.update(next, content.case),
    };
  }
}

/** `sweep run_up`: the kind in words, the name as it stands in the text. */
function titleParts({ title, name }: SheetCard): Node[] {
  if (!title.endsWith(` ${name}`)) return [document.createTextNode(capital(title))];
  return [
    document.createTextNode(capital(title.slice(0, -name.length))),
    html("span", { class: "name" }, name),
  ];
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** A sweep becomes no other section when it turns into a history. */
const familyOf = (card: SheetCard | undefined): string | undefined =>
  card?.kind === "sweep" || card?.kind === "history" ? "plot" : card?.kind;
