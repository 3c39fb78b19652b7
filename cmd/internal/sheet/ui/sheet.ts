// The client sheet: moves the target, shows and hides layers, and keeps every figure at the width of its element.

import type { Data, Design, Option, Stop } from "./data";
import { Figure } from "./figure";

const find = <T extends Element>(selector: string, root: ParentNode = document): T | null => root.querySelector<T>(selector);

const paperWidth = { wide: 480, card: 300 }; // Widths that figures are laid out for on paper, px.

interface Card {
  element: HTMLElement;
  option: Option;
  figure: Figure;
  slots: Map<string, HTMLElement>;
  texts: Map<string, HTMLElement>;
  bar: HTMLElement | null;
}

class Sheet {
  private stop: number;
  private row = -1;
  private existing: Figure | null = null;
  private cards: Card[] = [];
  private most: number;

  constructor(private data: Data) {
    this.stop = data.specified;
    this.most = Math.max(1e-9, ...data.options.flatMap((o) => o.designs.map((d) => d.cut + d.fill)));
    const asIs = find<HTMLElement>('[data-figure="existing"]');
    if (asIs) this.existing = new Figure(data, asIs, find<HTMLElement>(".readout", asIs.parentElement!)!, "e", hint);
    for (const element of document.querySelectorAll<HTMLElement>(".card")) this.cards.push(this.card(element));
    this.listen();
    this.layOut();
    this.reserve();
    this.show();
  }

  private card(element: HTMLElement): Card {
    const index = Number(element.dataset.option);
    const collect = (key: "slot" | "text") => {
      const out = new Map<string, HTMLElement>();
      for (const e of element.querySelectorAll<HTMLElement>(`[data-${key}]`)) out.set(e.dataset[key]!, e);
      return out;
    };
    const host = find<HTMLElement>(".section", element)!;
    return {
      element, option: this.data.options[index], figure: new Figure(this.data, host, find<HTMLElement>(".readout", element)!, `o${index}`, ""),
      slots: collect("slot"), texts: collect("text"), bar: find<HTMLElement>(".bar", element),
    };
  }

  private listen(): void {
    const target = find<HTMLInputElement>("#target");
    const move = (to: number) => {
      this.stop = Math.min(this.data.stops.length - 1, Math.max(0, to));
      if (target) target.value = String(this.stop);
      this.show();
    };
    target?.addEventListener("input", () => move(Number(target.value)));
    find("#less")?.addEventListener("click", () => move(this.stop - 1));
    find("#more")?.addEventListener("click", () => move(this.stop + 1));
    find("#reset")?.addEventListener("click", () => {
      move(this.data.specified);
      target?.focus();
    });
    for (const layer of ["water", "slips", "limits"]) {
      const box = find<HTMLInputElement>(`#${layer}`);
      const apply = () => document.body.classList.toggle(`no-${layer}`, !box!.checked);
      box?.addEventListener("change", apply);
      if (box) apply(); // A browser may bring back what was ticked before.
    }
    const check = find<HTMLSelectElement>("#check");
    check?.addEventListener("change", () => {
      this.row = Number(check.value);
      this.show();
    });
    if (check) check.value = "-1";
    if (target) target.value = String(this.stop);
    for (const c of this.cards) {
      const button = find<HTMLButtonElement>(".enlarge", c.element)!;
      button.addEventListener("click", () => {
        const wide = c.element.classList.toggle("wide");
        button.setAttribute("aria-pressed", String(wide));
        button.textContent = wide ? "Make smaller" : "Enlarge";
        this.refit();
      });
    }
    this.watchWidth();
  }

  private watchWidth(): void {
    let width = window.innerWidth;
    window.addEventListener("resize", () => {
      if (window.innerWidth === width) return; // Only the height changed: a phone's bars come and go.
      width = window.innerWidth;
      this.refit();
    });
    window.addEventListener("beforeprint", () => this.layOut(true));
    window.addEventListener("afterprint", () => this.refit());
  }

  private refit(): void {
    this.layOut();
    this.reserve();
    this.show();
  }

  // layOut fits the figures to their elements, or to paper.
  private layOut(paper = false): void {
    this.existing?.fit(paper ? paperWidth.wide : this.existing.host.clientWidth);
    for (const c of this.cards) c.figure.fit(paper ? paperWidth.card : c.figure.host.clientWidth);
    if (paper) this.show();
  }

  // reserve gives every text that changes with the target the height of its longest, so that nothing moves when it changes.
  private reserve(): void {
    const room = (e: HTMLElement | null | undefined, texts: string[]) => {
      if (!e) return;
      e.style.minHeight = "";
      const box = e.cloneNode(false) as HTMLElement;
      box.removeAttribute("id");
      box.removeAttribute("aria-live");
      box.classList.add("measured");
      box.style.width = `${e.getBoundingClientRect().width}px`;
      e.after(box);
      let high = 0;
      for (const t of new Set(texts)) {
        box.textContent = t;
        high = Math.max(high, box.getBoundingClientRect().height);
      }
      box.remove();
      e.style.minHeight = `${Math.ceil(high)}px`;
    };
    const data = this.data;
    const stops = data.stops;
    room(find<HTMLElement>("#answer"), stops.map((s) => s.answer));
    room(find<HTMLElement>("#long"), stops.map((s) => s.long));
    for (const c of this.cards) {
      for (const key of ["dims", "change", "land", "cost", "carbon", "loads"]) room(c.texts.get(key), c.option.designs.map((d) => d.texts[key]));
      const where = find<HTMLElement>(".where", c.element);
      const whereText = where?.textContent ?? "";
      const check = c.texts.get("check")?.textContent ?? "";
      room(where, [data.existing, ...c.option.designs].map((d) => whereText.replace(check, d.texts.check)));
      room(c.slots.get("note"), c.option.stops.map((s) => s.note));
    }
  }


  private show(): void {
    const data = this.data;
    const now = data.stops[this.stop];
    const moved = this.stop !== data.specified;
    document.body.classList.toggle("moved", moved);
    const set = (selector: string, text: string) => {
      const e = find(selector);
      if (e && e.textContent !== text) e.textContent = text;
    };
    set("#short", now.short);
    set("#long", now.long);
    set("#printed", now.long);
    set("#printed-note", moved ? "(not the specified target)" : "(as specified)");
    set("#answer", now.answer);
    find("#target")?.setAttribute("aria-valuetext", now.long + (moved ? "" : ", as specified"));
    const reset = find<HTMLButtonElement>("#reset");
    if (reset) reset.disabled = !moved;
    this.existing?.draw(data.existing, { row: this.row, ghost: null, named: true });
    for (const [i, c] of this.cards.entries()) this.showCard(c, c.option.stops[this.stop], now.least === i, moved);
    this.showMatrix();
  }

  private showCard(c: Card, stop: Stop, least: boolean, moved: boolean): void {
    const none = stop.design < 0;
    const design = none ? this.data.existing : c.option.designs[stop.design];
    for (const state of ["meets", "short", "nothing", "open"]) c.element.classList.toggle(state, stop.state === state);
    c.element.classList.toggle("least", least);
    c.slots.get("status")!.textContent = stop.status;
    c.slots.get("note")!.textContent = stop.note;
    c.slots.get("required")!.textContent = design.governing >= 0 ? this.data.stops[this.stop].required[design.governing] : "-";
    for (const [key, e] of c.texts) {
      const text = design.texts[key] ?? "";
      if (e.textContent !== text) e.textContent = text;
    }
    this.showBar(c, design);
    c.figure.draw(design, {
      row: this.row, ghost: moved ? c.option.designs[0] : null, named: c.element.classList.contains("wide"),
    });
  }

  private showBar(c: Card, design: Design): void {
    if (!c.bar) return;
    c.bar.replaceChildren();
    for (const kind of ["cut", "fill"] as const) {
      const part = document.createElement("i");
      part.className = kind;
      part.style.width = `${(100 * design[kind]) / this.most}%`;
      c.bar.append(part);
    }
  }

  private showMatrix(): void {
    const now = this.data.stops[this.stop];
    const words: Record<string, string> = { p: "passes", f: "falls short", u: "unresolved", "-": "not checked" };
    for (const e of document.querySelectorAll<HTMLElement>(".asked")) e.textContent = now.required[Number(e.dataset.row)];
    for (const e of document.querySelectorAll<HTMLElement>("[data-cell]")) {
      const [row, column] = e.dataset.cell!.split(" ").map(Number);
      const stop = column < 0 ? null : this.data.options[column].stops[this.stop];
      const design = !stop || stop.design < 0 ? this.data.existing : this.data.options[column].designs[stop.design];
      const mark = (stop ? stop.marks : now.existing)[row];
      e.dataset.mark = mark;
      find(".fs", e)!.textContent = design.answers[row]?.fs ?? "";
      find(".mark", e)!.textContent = words[mark];
    }
  }
}

const hint = "Point at a section, or use the arrow keys on it, to read off offset and level.";
const source = document.getElementById("data");
if (source?.textContent) new Sheet(JSON.parse(source.textContent) as Data);
