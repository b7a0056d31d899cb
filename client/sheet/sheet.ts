import {
  readToSheet,
  SHEET_VERSION,
  type SheetContent,
  type ToSheet,
  unpackContent,
} from "../../shared-core/index.ts";
import { Cards } from "./cards.ts";
import { html } from "./dom.ts";
import { Drawing } from "./drawing.ts";
import { Head } from "./head.ts";
import { Knobs } from "./knobs.ts";
import { Ledger } from "./ledger.ts";
import type { Page } from "./page.ts";
import { standalone } from "./png.ts";
import { RulerView } from "./ruler.ts";
import { section } from "./section.ts";
import { TakeAway } from "./take-away.ts";
import { onThemeChange } from "./theme.ts";

/** The page: what comes in is laid out, at most once a frame and the newest only; nothing is computed here. */
export class Sheet {
  readonly element: HTMLElement;
  readonly #page: Page;
  readonly #head: Head;
  readonly #drawing: Drawing;
  readonly #ruler: RulerView;
  readonly #cards: Cards;
  readonly #ledger: Ledger;
  readonly #knobs: Knobs;
  readonly #foot = html("footer");
  readonly #sections: Record<"system" | "ruler" | "ledger" | "knobs", HTMLElement>;
  #content: SheetContent | undefined;
  #next: Extract<ToSheet, { type: "content" }> | undefined;
  #failed: string | undefined;
  #busy = false;

  constructor(page: Page) {
    this.#page = page;
    this.#head = new Head({
      chooseCase: (name) => this.#ask({ case: name }),
      chooseUnits: (units) => this.#ask({ units }),
      chooseEarlier: (id) => {
        this.#page.keep({ earlier: id });
        this.#ask({});
      },
    });
    this.#drawing = new Drawing(page, () => this.#ask({}));
    const chooseMotion = (id: string) => this.#chooseMotion(id);
    this.#ruler = new RulerView(page, chooseMotion);
    this.#cards = new Cards(page, { chooseMotion });
    this.#ledger = new Ledger(page);
    this.#knobs = new Knobs(page, { moved: () => this.#ask({}) });
    this.#sections = {
      system: section(
        "The system",
        this.#drawing.element,
        this.#take("system", () => this.#drawing.picture),
      ).element,
      ruler: section(
        "Frequencies",
        this.#ruler.element,
        this.#take("frequencies", () => this.#ruler.picture),
      ).element,
      ledger: section("What must hold", this.#ledger.element).element,
      knobs: section("Numbers to move", this.#knobs.element).element,
    };
    const { system, ruler, ledger, knobs } = this.#sections;
    this.element = html(
      "main",
      {},
      this.#head.element,
      system,
      ruler,
      this.#cards.element,
      ledger,
      knobs,
      this.#foot,
    );
    this.element.hidden = true;
    onThemeChange(() => this.#cards.recolour());
  }

  /** A message from outside; what it does not know is left alone. */
  hear(data: unknown): void {
    const message = readToSheet(data);
    if (message === undefined) return;
    if (message.protocol !== SHEET_VERSION) this.#outdated();
    else if (message.type === "content") this.#receive(message);
    else if (message.type === "highlight") this.#highlight(message.names);
    else if (message.type === "reveal") this.#cards.show(message.name);
    else if (message.type === "revisions") this.#head.revisions(message.list, this.#page.kept.earlier);
    else this.#state(message);
  }

  #receive(message: Extract<ToSheet, { type: "content" }>): void {
    const waits = this.#next !== undefined;
    this.#next = message;
    if (!waits) requestAnimationFrame(() => this.#show());
  }

  #show(): void {
    const message = this.#next;
    this.#next = undefined;
    if (message === undefined) return;
    let content: SheetContent;
    try {
      content = unpackContent(message.content);
    } catch {
      // The page and its host are of different versions, or the text was cut on its way.
      this.#head.notice("The content of this sheet cannot be read. Close it and open it again.");
      return;
    }
    this.#failed = undefined;
    // A revision of another model is none of this one.
    if (this.#page.kept.uri !== message.uri) this.#page.keep({ earlier: undefined });
    this.#page.keep({ uri: message.uri, case: content.case, units: content.units });
    this.#lay(content);
    performance.mark("thrum-painted");
  }

  #lay(content: SheetContent): void {
    const first = this.#content === undefined;
    this.#content = content;
    this.element.hidden = false;
    this.element.classList.toggle("stale", content.stale);
    const { system, ruler, ledger, knobs } = this.#sections;
    system.hidden = content.scene.coordinates.length === 0 && content.scene.items.length === 0;
    ruler.hidden = content.ruler === null;
    ledger.hidden = content.ledger.length === 0;
    knobs.hidden = content.knobs.length === 0;
    this.#head.update(content);
    this.#drawing.update(content);
    this.#ruler.update(content.ruler);
    this.#cards.update(content, this.#busy);
    this.#ledger.update(content.ledger, content.case);
    this.#knobs.update(content.knobs, content.moved);
    this.#foot.replaceChildren(...content.cautions.map((line) => html("p", {}, line)));
    if (first) this.#restore();
  }

  /** Where the reader was before a reload. */
  #restore(): void {
    const { scroll, selected } = this.#page.kept;
    if (selected !== undefined) this.#highlight([selected]);
    if (scroll !== undefined) scrollTo(0, scroll);
    addEventListener("scroll", () => this.#page.keep({ scroll: Math.round(scrollY) }), { passive: true });
  }

  #state({ state, text }: Extract<ToSheet, { type: "state" }>): void {
    const computed = this.#busy && state !== "busy";
    this.#busy = state === "busy";
    if (computed && this.#content && this.#next === undefined) this.#cards.update(this.#content, false);
    this.#head.busy(this.#busy);
    this.element.setAttribute("aria-busy", String(state === "busy"));
    if (state === "failed") {
      this.#failed = text;
      this.element.hidden = false;
      this.element.classList.add("stale");
      this.#head.notice(text);
    } else if (state === "ready" && this.#failed !== undefined && this.#content) {
      this.#failed = undefined;
      this.element.classList.toggle("stale", this.#content.stale);
      this.#head.update(this.#content);
    }
  }

  #highlight(names: readonly string[]): void {
    const lit = new Set(names);
    this.#drawing.highlight(names);
    this.#cards.highlight(lit);
    this.#ledger.highlight(lit);
    this.#knobs.highlight(lit);
  }

  #chooseMotion(id: string): void {
    this.#drawing.player.choose(id, true);
    this.#sections.system.scrollIntoView({ block: "nearest" });
  }

  /** Another case, other units, moved knobs. */
  #ask(change: { readonly case?: string; readonly units?: SheetContent["units"] }): void {
    const content = this.#content;
    if (content === undefined) return;
    const asked = {
      case: change.case ?? this.#page.kept.case ?? content.case,
      units: change.units ?? this.#page.kept.units ?? content.units,
      knobs: this.#knobs.moved,
      earlier: this.#page.kept.earlier ?? null,
      motion: this.#page.kept.motion || null,
    };
    this.#page.keep({ case: asked.case, units: asked.units });
    this.#page.say({ type: "show", ...asked });
  }

  #take(name: string, picture: () => SVGSVGElement | null): HTMLElement {
    const svg = () => {
      const found = picture();
      return found ? standalone(found) : undefined;
    };
    return html("div", { class: "under" }, new TakeAway(this.#page, { name, svg }).element);
  }

  #outdated(): void {
    this.element.hidden = false;
    this.#head.notice("This sheet is of another version of the extension. Close it and open it again.");
  }
}
