import type { SheetContent, UnitSystem } from "../../shared-core/index.ts";
import { Choices, html } from "./dom.ts";

export interface HeadHost {
  chooseCase(name: string): void;
  chooseUnits(units: UnitSystem): void;
}

const UNITS: readonly { value: UnitSystem; text: string }[] = [
  { value: "as-written", text: "as written" },
  { value: "si", text: "SI" },
  { value: "inch", text: "inch" },
];

/** Title, verdict, and what the rest of the page is about: which case, in which units. */
export class Head {
  readonly element: HTMLElement;
  readonly #title = html("h1");
  readonly #file = html("p", { class: "file" });
  readonly #summary = html("p", { class: "verdict" });
  readonly #notice = html("p", { class: "notice", role: "status" });
  readonly #busy = html("span", { class: "busy" }, "computing");
  readonly #cases: Choices<string>;
  readonly #units: Choices<UnitSystem>;

  constructor(host: HeadHost) {
    this.#cases = new Choices("case", (name) => host.chooseCase(name));
    this.#units = new Choices<UnitSystem>("units", (units) => host.chooseUnits(units));
    this.element = html(
      "header",
      {},
      this.#file,
      this.#title,
      this.#summary,
      html("p", { class: "choices" }, this.#cases.element, this.#units.element, this.#busy),
      this.#notice,
    );
    this.#notice.hidden = true;
  }

  update(content: SheetContent): void {
    this.#title.textContent = content.title;
    this.#file.textContent = content.file;
    this.#summary.textContent = content.summary;
    this.#cases.update(
      content.cases.map((name) => ({ value: name, text: name })),
      content.case,
    );
    this.#cases.element.hidden = content.cases.length < 2;
    this.#units.update(UNITS, content.units);
    this.notice(content.notice ?? (content.stale ? "The numbers below are of an earlier text." : undefined));
  }

  /** undefined: there is nothing to say. */
  notice(text: string | undefined): void {
    this.#notice.hidden = text === undefined || text === "";
    if (this.#notice.textContent !== (text ?? "")) this.#notice.textContent = text ?? "";
  }

  busy(busy: boolean): void {
    this.#busy.classList.toggle("on", busy);
  }
}
