import { html } from "./dom.ts";

export interface RovingItem {
  /** Stable over updates. */
  readonly key: string;
  readonly element: SVGElement;
  readonly says: string;
}

export interface RovingOptions {
  readonly label: string;
  /** The pointer or the arrow keys stand on it; null: on none. */
  readonly over: (key: string | null) => void;
  readonly pick: (key: string) => void;
}

let lists = 0;

/** A picture whose parts are the entries of a list: one tab stop, arrow keys inside, a click or Enter picks. */
export class Roving {
  readonly element: HTMLDivElement;
  readonly #options: RovingOptions;
  readonly #id = `list${++lists}`;
  #items: readonly RovingItem[] = [];
  #at = -1;

  constructor(options: RovingOptions) {
    this.#options = options;
    this.element = html("div", {
      class: "roving",
      role: "listbox",
      tabindex: 0,
      "aria-label": options.label,
    });
    this.element.addEventListener("keydown", (event) => this.#key(event));
    this.element.addEventListener("focus", () => {
      // A click stands where it points.
      if (this.element.matches(":focus-visible")) this.#stand(Math.max(0, this.#at));
    });
    this.element.addEventListener("blur", () => this.#mark(undefined));
    this.element.addEventListener("pointerleave", () => this.#options.over(null));
  }

  /** The picture, and its parts in reading order. */
  update(picture: SVGSVGElement, items: readonly RovingItem[], label: string): void {
    const key = this.#items[this.#at]?.key;
    this.#items = items;
    picture.setAttribute("role", "presentation");
    items.forEach(({ element, says, key }, i) => {
      element.setAttribute("role", "option");
      element.setAttribute("id", `${this.#id}-${i}`);
      element.setAttribute("aria-label", says);
      element.setAttribute("aria-selected", "false");
      element.addEventListener("pointerenter", () => this.#options.over(key));
      element.addEventListener("click", () => {
        this.#at = i;
        this.#options.pick(key);
      });
    });
    this.element.setAttribute("aria-label", label);
    this.element.replaceChildren(picture);
    this.#at = items.findIndex((item) => item.key === key);
    this.element.removeAttribute("aria-activedescendant");
    if (document.activeElement === this.element) this.#mark(this.#items[this.#at]);
  }

  #key(event: KeyboardEvent): void {
    const { key } = event;
    if (key === "ArrowRight" || key === "ArrowDown") this.#stand(this.#at + 1);
    else if (key === "ArrowLeft" || key === "ArrowUp") this.#stand(this.#at - 1);
    else if (key === "Home") this.#stand(0);
    else if (key === "End") this.#stand(this.#items.length - 1);
    else if ((key === "Enter" || key === " ") && this.#items[this.#at])
      this.#options.pick(this.#items[this.#at].key);
    else if (key === "Escape") this.#options.over(null);
    else return;
    event.preventDefault();
  }

  #stand(at: number): void {
    if (this.#items.length === 0) return;
    this.#at = Math.max(0, Math.min(this.#items.length - 1, at));
    const item = this.#items[this.#at];
    this.#mark(item);
    this.#options.over(item.key);
  }

  #mark(item: RovingItem | undefined): void {
    for (const each of this.#items) {
      each.element.classList.toggle("at", each === item);
      each.element.setAttribute("aria-selected", String(each === item));
    }
    if (item) this.element.setAttribute("aria-activedescendant", item.element.id);
    else this.element.removeAttribute("aria-activedescendant");
  }
}
