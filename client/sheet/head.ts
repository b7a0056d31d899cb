import type { SheetContent, SheetRevision, UnitSystem } from "../../shared-core/index.ts";
import { Choices, html } from "./dom.ts";

export interface HeadHost {
  chooseCase(name: string): void;
  chooseUnits(units: UnitSystem): void;
  /** undefined: none. */
  chooseEarlier(id: string | undefined): void;
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
  readonly #revisions: Choices<string>;
  readonly #moved = html("p", { class: "verdict quiet" });
  readonly #earlier = html("p", { class: "verdict quiet" });

  constructor(host: HeadHost) {
    this.#cases = new Choices("case", (name) => host.chooseCase(name));
    this.#units = new Choices<UnitSystem>("units", (units) => host.chooseUnits(units));
    this.#revisions = new Choices("drawn under it", (id) => host.chooseEarlier(id === "" ? undefined : id));
    this.#revisions.element.hidden = true;
    this.element = html(
      "header",
      {},
      this.#file,
      this.#title,
      this.#summary,
      this.#moved,
      this.#earlier,
      html(
        "p",
        { class: "choices" },
        this.#cases.element,
        this.#units.element,
        this.#revisions.element,
        this.#busy,
      ),
      this.#notice,
    );
    this.#notice.hidden = true;
  }

  update(content: SheetContent): void {
    this.#title.textContent = content.title;
    this.#file.textContent = content.file;
    this.#summary.textContent = content.summary;
    fill(this.#moved, content.moved && `with moved numbers: ${content.moved}`);
    const { earlier } = content;
    fill(this.#earlier, earlier && `${earlier.label}: ${earlier.reason ?? earlier.summary}`);
    this.#cases.update(
      content.cases.map((name) => ({ value: name, text: name })),
      content.case,
    );
    this.#cases.element.hidden = content.cases.length < 2;
    this.#units.update(UNITS, content.units);
    this.notice(content.notice ?? (content.stale ? "The numbers below are of an earlier text." : undefined));
  }

  /** Revisions that can be drawn under today's answer; one that was chosen and is not among them stays chosen. */
  revisions(list: readonly SheetRevision[], chosen: string | undefined): void {
    const known = list.map(({ id, label }) => ({ value: id, text: label }));
    const gone = chosen !== undefined && !list.some(({ id }) => id === chosen);
    const entries = [
      { value: "", text: "nothing" },
      ...(gone ? [{ value: chosen, text: chosen.slice(0, 7) }] : []),
      ...known,
    ];
    this.#revisions.update(entries, chosen ?? "");
    this.#revisions.element.hidden = entries.length < 2;
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

function fill(line: HTMLElement, text: string | undefined): void {
  line.hidden = text === undefined || text === "";
  line.textContent = text ?? "";
}
