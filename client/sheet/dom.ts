/** Elements without markup: what a model says only ever becomes text. */

export type Attributes = Readonly<Record<string, string | number | boolean | undefined>>;
export type Child = Node | string;

export function html<K extends keyof HTMLElementTagNameMap>(
  tag: K,
  attributes: Attributes = {},
  ...children: readonly Child[]
): HTMLElementTagNameMap[K] {
  return filled(document.createElement(tag), attributes, children);
}

export function svg<K extends keyof SVGElementTagNameMap>(
  tag: K,
  attributes: Attributes = {},
  ...children: readonly Child[]
): SVGElementTagNameMap[K] {
  return filled(document.createElementNS("http://www.w3.org/2000/svg", tag), attributes, children);
}

/** A button that looks like a word. */
export function wordButton(text: string, press: () => void, attributes: Attributes = {}): HTMLButtonElement {
  const button = html("button", { type: "button", class: "word", ...attributes }, text);
  button.addEventListener("click", press);
  return button;
}

export interface Choice<T extends string> {
  readonly value: T;
  readonly text: string;
}

let choices = 0;

/** A labelled list to choose from; `update` exchanges its entries and keeps the focus. */
export class Choices<T extends string> {
  readonly element: HTMLSpanElement;
  readonly #select: HTMLSelectElement;
  #shown = "";

  constructor(label: string, choose: (value: T) => void) {
    const id = `choice${++choices}`;
    this.#select = html("select", { id });
    this.#select.addEventListener("change", () => choose(this.#select.value as T));
    this.element = html("span", { class: "choice" }, html("label", { for: id }, label), this.#select);
  }

  update(entries: readonly Choice<T>[], chosen: T): void {
    const shown = JSON.stringify(entries);
    if (shown !== this.#shown) {
      this.#shown = shown;
      this.#select.replaceChildren(...entries.map(({ value, text }) => html("option", { value }, text)));
    }
    this.#select.value = chosen;
  }
}

function filled<E extends Element>(element: E, attributes: Attributes, children: readonly Child[]): E {
  for (const [name, value] of Object.entries(attributes)) {
    if (value === undefined || value === false) continue;
    element.setAttribute(name, value === true ? "" : String(value));
  }
  element.append(...children);
  return element;
}
