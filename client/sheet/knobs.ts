import { formatNumber, type Knob } from "../../shared-core/index.ts";
import { html, wordButton } from "./dom.ts";
import type { Page } from "./page.ts";

export interface KnobHost {
  /** All moved values, SI; asks for the moved answer. */
  moved(values: Readonly<Record<string, number>>): void;
}

/** Numbers of the text that can be moved without touching the text. */
export class Knobs {
  readonly element = html("div", { class: "knobs" });
  readonly #page: Page;
  readonly #host: KnobHost;
  readonly #rows = new Map<string, KnobRow>();
  readonly #resetAll = wordButton("reset all", () => this.reset());
  /** The answers may be out of sight from here. */
  readonly #answer = html("p", { class: "verdict answer" });
  #moved: Record<string, number>;

  constructor(page: Page, host: KnobHost) {
    this.#page = page;
    this.#host = host;
    this.#moved = { ...page.kept.knobs };
    this.#resetAll.hidden = true;
  }

  get moved(): Readonly<Record<string, number>> {
    return this.#moved;
  }

  /** @param answer what the moved numbers lead to, in one line */
  update(knobs: readonly Knob[], answer: string | undefined): void {
    const names = knobs.map(({ name }) => name);
    for (const [name, row] of this.#rows) {
      if (names.includes(name)) continue;
      row.element.remove();
      this.#rows.delete(name);
      delete this.#moved[name];
    }
    knobs.forEach((knob, i) => {
      const row = this.#rows.get(knob.name) ?? this.#newRow(knob.name);
      // Written into the text, or written there as it stands: nothing is moved any more.
      if (this.#moved[knob.name] !== undefined && isSame(knob, this.#moved[knob.name], knob.written))
        delete this.#moved[knob.name];
      row.update(knob, this.#moved[knob.name]);
      if (this.element.children[i] !== row.element)
        this.element.insertBefore(row.element, this.element.children[i] ?? null);
    });
    this.#answer.textContent = answer === undefined ? "" : `with moved numbers: ${answer}`;
    this.element.append(this.#answer, this.#resetAll);
    this.#kept();
  }

  highlight(names: ReadonlySet<string>): void {
    for (const [name, { element }] of this.#rows) element.classList.toggle("lit", names.has(name));
  }

  reset(): void {
    this.#moved = {};
    for (const row of this.#rows.values()) row.reset();
    this.#tell();
  }

  #newRow(name: string): KnobRow {
    const row = new KnobRow({
      move: (value) => {
        if (value === undefined) delete this.#moved[name];
        else this.#moved[name] = value;
        this.#tell();
      },
      write: (value) => this.#page.say({ type: "write", name, value }),
      reveal: () => this.#page.say({ type: "reveal", name }),
    });
    this.#rows.set(name, row);
    return row;
  }

  #tell(): void {
    this.#kept();
    this.#host.moved(this.#moved);
  }

  #kept(): void {
    this.#resetAll.hidden = Object.keys(this.#moved).length < 2;
    this.#page.keep({ knobs: this.#moved });
  }
}

/** Closer than half a step: the text has fewer digits than a knob. */
const isSame = ({ step }: Knob, a: number, b: number): boolean => Math.abs(a - b) <= step / 2;

interface RowHost {
  /** SI; undefined: back to what is written. */
  move(value: number | undefined): void;
  write(value: number): void;
  reveal(): void;
}

class KnobRow {
  readonly element: HTMLElement;
  readonly #host: RowHost;
  readonly #slider = html("input", { type: "range" });
  readonly #number = html("input", { type: "number", class: "number" });
  readonly #unit = html("span", { class: "number" });
  readonly #written = html("span", { class: "written number" });
  readonly #note = html("span", { class: "quiet" });
  readonly #name: HTMLButtonElement;
  readonly #acts: HTMLElement;
  #knob: Knob | undefined;
  #value: number | undefined;

  constructor(host: RowHost) {
    this.#host = host;
    this.#name = wordButton("", () => host.reveal());
    this.#slider.addEventListener("input", () => this.#moveTo(Number(this.#slider.value)));
    this.#number.addEventListener("change", () => this.#typed());
    this.#acts = html(
      "span",
      { class: "acts" },
      wordButton("write to source", () => this.#value !== undefined && host.write(this.#value)),
      wordButton("reset", () => {
        this.reset();
        host.move(undefined);
      }),
    );
    this.element = html(
      "div",
      { class: "knob" },
      html("span", { class: "name" }, this.#name),
      this.#slider,
      html("span", { class: "value" }, this.#number, this.#unit),
      html("span", { class: "rest" }, this.#written, this.#note, this.#acts),
    );
  }

  update(knob: Knob, moved: number | undefined): void {
    this.#knob = knob;
    this.#value = moved;
    this.#name.textContent = knob.name;
    this.#unit.textContent = knob.unit;
    this.#written.textContent = `written ${knob.text}`;
    this.#note.textContent = knob.note ?? "";
    this.#slider.setAttribute("aria-label", `${knob.name} in ${knob.unit || "1"}`);
    this.#number.setAttribute("aria-label", `${knob.name} in ${knob.unit || "1"}, as a number`);
    for (const input of [this.#slider, this.#number]) {
      input.min = String(knob.from / knob.factor);
      input.max = String(knob.to / knob.factor);
    }
    this.#slider.step = String(Math.abs(knob.step / knob.factor));
    this.#number.step = "any";
    this.#show();
  }

  reset(): void {
    this.#value = undefined;
    this.#show();
  }

  #show(): void {
    const knob = this.#knob;
    if (knob === undefined) return;
    const value = (this.#value ?? knob.written) / knob.factor;
    if (document.activeElement !== this.#slider) this.#slider.value = String(value);
    if (document.activeElement !== this.#number) this.#number.value = formatNumber(value, DIGITS);
    this.#slider.setAttribute("aria-valuetext", `${formatNumber(value)} ${knob.unit}`.trim());
    this.element.classList.toggle("moved", this.#value !== undefined);
    this.#acts.hidden = this.#value === undefined;
  }

  #typed(): void {
    const { valueAsNumber } = this.#number;
    if (!Number.isFinite(valueAsNumber) || this.#knob === undefined) return;
    const shown = Math.max(Number(this.#number.min), Math.min(Number(this.#number.max), valueAsNumber));
    this.#number.value = formatNumber(shown, DIGITS);
    this.#slider.value = String(shown);
    this.#moveTo(shown);
  }

  #moveTo(shown: number): void {
    const knob = this.#knob;
    if (knob === undefined) return;
    const value = shown * knob.factor;
    this.#value = isSame(knob, value, knob.written) ? undefined : value;
    if (document.activeElement !== this.#number) this.#number.value = formatNumber(shown, DIGITS);
    this.#show();
    this.#host.move(this.#value);
  }
}

/** Enough to set a step of any knob. */
const DIGITS = 5;
